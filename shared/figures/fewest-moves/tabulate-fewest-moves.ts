import type { FewestMovesRequest, FewestMovesResult } from "../../schemas/fewest-moves.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, decimalsFor } from "../write-number.ts";

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
  result: FewestMovesResult,
): FigureTable {
  const decimals = decimalsFor(
    [...stations, ...result.predicted].flatMap(({ deviation }) => [deviation.h, deviation.v]),
    decimalsAcross(units.offset),
  );
  const predicted = new Map(result.predicted.map((station) => [station.id, station]));
  const float = new Set(result.axis.float.map(({ id }) => id));
  return {
    caption: result.infeasible
      ? "Deviations as found"
      : "Deviations as found, and after the moves from the new axis",
    columns: [
      textColumn("station"),
      textColumn(result.infeasible ? "as found" : "predicted"),
      numberColumn("z", units.axial),
      numberColumn("found h", units.offset),
      numberColumn("found v", units.offset),
      numberColumn("left h", units.offset),
      numberColumn("left v", units.offset),
      numberColumn("radial", units.offset),
    ],
    rows: stations.map(({ id, z, deviation: { h, v } }) => {
      const left = predicted.get(id);
      return [
        textCell(float.has(id) ? `${id} (ref.)` : id),
        left?.verdict ? { kind: "verdict", verdict: left.verdict } : textCell("not judged"),
        numberCell(z, decimalsAlong(units.axial)),
        signedCell(h, decimals),
        signedCell(v, decimals),
        signedCell(left?.deviation.h, decimals),
        signedCell(left?.deviation.v, decimals),
        numberCell(left?.deviation.radial, decimals),
      ];
    }),
  };
}
