import type { ShimMoveResult } from "../../schemas/shim-moves.ts";
import type { Units } from "../../units.ts";
import {
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type Cell,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";

/** How far the bore line moves at every support: the move asked for, and the one that the shims chosen make. */
export function tabulateComponents(result: ShimMoveResult, units: Units): FigureTable {
  const decimals = decimalsFor(
    result.components.flatMap(({ moves, realised }) => [...moves, ...realised].flatMap(({ h, v }) => [h, v])),
    decimalsAcross(units.offset),
  );
  const pair = (move: { h: number; v: number } | undefined): Cell[] => [
    signedCell(move?.h, decimals),
    signedCell(move?.v, decimals),
  ];
  return {
    caption: "Moves at the supports",
    columns: [
      textColumn("component"),
      textColumn("support"),
      numberColumn("ideal h", units.offset),
      numberColumn("ideal v", units.offset),
      numberColumn("realised h", units.offset),
      numberColumn("realised v", units.offset),
    ],
    rows: result.components.flatMap((component) => {
      if (component.moves.length === 0)
        return [[textCell(component.id), textCell("stays"), ...pair(undefined), ...pair(undefined)]];
      return component.moves.map((ideal) => [
        textCell(component.id),
        textCell(component.fixed ? `${ideal.support}, stays` : ideal.support),
        ...pair(ideal),
        ...pair(component.realised.find(({ support }) => support === ideal.support)),
      ]);
    }),
  };
}
