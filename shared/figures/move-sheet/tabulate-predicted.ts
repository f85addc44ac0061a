import type { ShimMoveResult } from "../../schemas/shim-moves.ts";
import type { MoveCall } from "../plan-elevation/plan-elevation-of-moves.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, decimalsFor } from "../write-number.ts";

/** Every station before and after: as found, and as the shims chosen are predicted to leave it. */
export function tabulatePredicted(call: MoveCall, result: ShimMoveResult): FigureTable {
  const { units, stations } = call;
  const references = new Set(call.reference ?? []);
  const decimals = decimalsFor(
    [...stations, ...result.predicted].flatMap(({ deviation }) => [deviation.h, deviation.v]),
    decimalsAcross(units.offset),
  );
  const predicted = new Map(result.predicted.map((station) => [station.id, station]));
  return {
    caption: "Deviations as found, and as left by prediction",
    columns: [
      textColumn("station"),
      textColumn("predicted"),
      numberColumn("z", units.axial),
      numberColumn("found h", units.offset),
      numberColumn("found v", units.offset),
      numberColumn("radial", units.offset),
      numberColumn("left h", units.offset),
      numberColumn("left v", units.offset),
      numberColumn("radial", units.offset),
    ],
    rows: stations.map(({ id, z, deviation: { h, v } }) => {
      const left = predicted.get(id);
      return [
        textCell(references.has(id) ? `${id} (ref.)` : id),
        left?.verdict ? { kind: "verdict", verdict: left.verdict } : textCell("not judged"),
        numberCell(z, decimalsAlong(units.axial)),
        signedCell(h, decimals),
        signedCell(v, decimals),
        numberCell(Math.hypot(h, v), decimals),
        signedCell(left?.deviation.h, decimals),
        signedCell(left?.deviation.v, decimals),
        numberCell(left?.deviation.radial, decimals),
      ];
    }),
  };
}
