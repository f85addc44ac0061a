import type { MoveStationRequest, ShimMoveResult } from "../../schemas/shim-moves.ts";
import type { Units } from "../../units.ts";
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

interface FoundAndPredicted {
  readonly caption: string;
  /** Heading of the verdicts. */
  readonly judged: string;
  readonly units: Units;
  readonly stations: readonly Pick<MoveStationRequest, "id" | "z" | "deviation">[];
  readonly references: ReadonlySet<string>;
  readonly predicted: readonly Pick<ShimMoveResult["predicted"][number], "id" | "deviation" | "verdict">[];
}

/** Every station before and after: as found, and as the shims chosen are predicted to leave it. */
export function tabulatePredicted(call: MoveCall, result: ShimMoveResult): FigureTable {
  return tabulateFoundAndPredicted({
    caption: "Deviations as found, and as left by prediction",
    judged: "predicted",
    units: call.units,
    stations: call.stations,
    references: new Set(call.reference ?? []),
    predicted: result.predicted,
  });
}

/** One row a station in the order sent: where it was found, where it is predicted to be, and the verdict on that. */
export function tabulateFoundAndPredicted(told: FoundAndPredicted): FigureTable {
  const { caption, judged, units, stations, references } = told;
  const decimals = decimalsFor(
    [...stations, ...told.predicted].flatMap(({ deviation }) => [deviation.h, deviation.v]),
    decimalsAcross(units.offset),
  );
  const predicted = new Map(told.predicted.map((station) => [station.id, station]));
  return {
    caption,
    columns: [
      textColumn("station"),
      textColumn(judged),
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
