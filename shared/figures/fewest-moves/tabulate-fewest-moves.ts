import type { FewestMovesRequest, FewestMovesResult } from "../../schemas/fewest-moves.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { tabulateFoundAndPredicted } from "../move-sheet/tabulate-predicted.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";

/** Which parts move, and how far at every support; what each costs. */
export function tabulateChoice(
  { units, components }: FewestMovesRequest,
  result: FewestMovesResult,
): FigureTable {
  const decimals = decimalsFor(
    result.components.flatMap(({ moves }) => moves.flatMap(({ h, v }) => [h, v])),
    decimalsAcross(units.offset),
  );
  const costOf = new Map(components.map(({ id, cost }) => [id, cost ?? 1]));
  return {
    caption: "Parts to move",
    columns: [
      textColumn("component"),
      textColumn("moves"),
      numberColumn("cost", null),
      textColumn("support"),
      numberColumn("h", units.offset),
      numberColumn("v", units.offset),
    ],
    rows: result.components.flatMap(({ id, moved, fixed, moves }) => {
      const part = [
        textCell(id),
        textCell(moved ? "moves" : fixed ? "may not" : "stays"),
        numberCell(costOf.get(id), 3),
      ];
      if (!moved) return [[...part, textCell("–"), signedCell(null, decimals), signedCell(null, decimals)]];
      return moves.map(({ support, h, v }) => [
        ...part,
        textCell(support),
        signedCell(h, decimals),
        signedCell(v, decimals),
      ]);
    }),
  };
}

/** Where the new axis runs at the reference stations; null where none floats. */
export function tabulateFloat(
  { units, reference = [] }: FewestMovesRequest,
  { axis }: FewestMovesResult,
): FigureTable | null {
  if (axis.float.length === 0) return null;
  const decimals = decimalsFor(
    axis.float.flatMap(({ h, v }) => [h, v]),
    decimalsAcross(units.offset),
  );
  const range = (id: string, plane: "h" | "v") => {
    const [least = 0, most = 0] = reference.find((each) => each.id === id)?.float?.[plane] ?? [];
    return textCell(`${least.toFixed(decimals)} to ${most.toFixed(decimals)}`);
  };
  return {
    caption: "The new axis, from the one surveyed",
    columns: [
      textColumn("reference"),
      numberColumn("h", units.offset),
      { heading: "within", unit: units.offset, align: "end" },
      numberColumn("v", units.offset),
      { heading: "within", unit: units.offset, align: "end" },
    ],
    rows: axis.float.map(({ id, h, v }) => [
      textCell(id),
      signedCell(h, decimals),
      range(id, "h"),
      signedCell(v, decimals),
      range(id, "v"),
    ]),
  };
}

/** Every station as found, from the axis as surveyed, and after the moves, from the new one. */
export function tabulateFewestPredicted(
  { units, stations }: FewestMovesRequest,
  { infeasible, axis, predicted }: FewestMovesResult,
): FigureTable {
  return tabulateFoundAndPredicted({
    caption: infeasible
      ? "Deviations as found"
      : "Deviations as found, and after the moves from the new axis",
    judged: infeasible ? "as found" : "predicted",
    units,
    stations,
    references: new Set(axis.float.map(({ id }) => id)),
    predicted,
  });
}
