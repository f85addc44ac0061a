import {
  numberCell,
  numberColumn,
  signedCell,
  type FigureTable,
} from "../../../../../shared/figures/figure-table.ts";
import { convertLength, decimalsAcross } from "../../../../../shared/figures/write-number.ts";
import type { AlignmentExample } from "../api/get-worked-example.ts";
import { put, type Check } from "./check.ts";

type Bore = AlignmentExample["request"]["bores"][number];
type Fit = AlignmentExample["result"]["fits"][number];
type Units = AlignmentExample["request"]["units"];

interface WallPoint {
  readonly clockDeg: number;
  readonly reading: number;
  readonly distance: number;
  readonly h: number;
  readonly v: number;
}

/** The wall points that a turned gauge's readings make, in the offset unit; null for another form of reading. */
export function gaugePoints(bore: Bore, units: Units, seen: "downstream" | "upstream"): WallPoint[] | null {
  if (bore.form !== "turned_gauge") return null;
  const radius = convertLength(bore.nominalDiameter / 2, units.bore, units.offset);
  const sense = bore.sense === "larger_is_farther" ? 1 : -1;
  const side = (bore.seen ?? seen) === "downstream" ? 1 : -1;
  return bore.readings.map(({ clockDeg, reading }) => {
    const distance = radius + sense * reading;
    const angleRad = (clockDeg * Math.PI) / 180;
    return {
      clockDeg,
      reading,
      distance,
      h: side * distance * Math.sin(angleRad),
      v: distance * Math.cos(angleRad) - (bore.gaugeSag ?? 0),
    };
  });
}

export function tabulatePoints(points: readonly WallPoint[], units: Units): FigureTable {
  const decimals = decimalsAcross(units.offset);
  return {
    caption: "Readings, and the wall points they make",
    columns: [
      numberColumn("clock angle", "\u00b0"),
      numberColumn("reading", units.offset),
      numberColumn("distance", units.offset),
      numberColumn("h", units.offset),
      numberColumn("v", units.offset),
    ],
    rows: points.map(({ clockDeg, reading, distance, h, v }) => [
      numberCell(clockDeg, 1),
      signedCell(reading, decimals),
      numberCell(distance, decimals),
      signedCell(h, decimals),
      signedCell(v, decimals),
    ]),
  };
}

/**
 * What holds at the centre of least squares with equal weights: the radius is the mean distance, and the residuals have
 * the scatter answered and pull to neither side.
 */
export function checkFit(
  points: readonly WallPoint[],
  { centre, statistics, residuals }: Fit,
  decimals: number,
): Check[] {
  const seen = points.map(({ h, v }) => {
    const [across, up] = [h - centre.h, v - centre.v];
    const distance = Math.hypot(across, up);
    return { distance, across: across / distance, up: up / distance };
  });
  const mean = seen.reduce((sum, { distance }) => sum + distance, 0) / seen.length;
  const left = seen.map(({ distance }) => distance - mean);
  const [first] = seen;
  const [answered] = residuals;
  const pull = (part: "across" | "up"): number =>
    left.reduce((sum, residual, index) => sum + residual * (seen[index]?.[part] ?? 0), 0);
  return [
    {
      what: "first residual",
      working: `|p − c| − R = ${put(first?.distance ?? 0, decimals)} − ${put(mean, decimals)}`,
      here: left[0] ?? 0,
      answered: typeof answered === "number" ? answered : 0,
    },
    {
      what: "root mean square",
      working: `√(Σ r² / ${left.length})`,
      here: Math.sqrt(left.reduce((sum, residual) => sum + residual * residual, 0) / left.length),
      answered: statistics.rms,
    },
    { what: "pull in h", working: "Σ r · sin, 0 at the best centre", here: pull("across"), answered: 0 },
    { what: "pull in v", working: "Σ r · cos, 0 at the best centre", here: pull("up"), answered: 0 },
  ];
}
