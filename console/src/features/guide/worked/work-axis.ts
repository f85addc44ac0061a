import type { AlignmentExample } from "../api/get-worked-example.ts";
import { put, type Check } from "./check.ts";

const planes = ["h", "v"] as const;

interface Measured {
  readonly z: number;
  readonly centre: { readonly h: number; readonly v: number };
  readonly target: { readonly h: number; readonly v: number };
}

/** A station with the centre that the fit of its bore answered. */
export function measuredAt({ request, result }: AlignmentExample, id: string): Measured | null {
  const station = request.stations.find((each) => each.id === id);
  const bore = request.bores.findIndex((each) => each.station === id);
  const centre = result.fits[bore]?.centre;
  return station && centre ? { z: station.z, centre, target: station.target ?? { h: 0, v: 0 } } : null;
}

/** The axis through two stations, slope and height; none for another method. */
export function checkAxis(
  example: AlignmentExample,
  decimals: number,
): { slopes: Check[]; heights: Check[] } {
  const { axis } = example.result;
  const [first, second] = axis.through.map((id) => measuredAt(example, id));
  if (axis.method !== "two_station" || !first || !second) return { slopes: [], heights: [] };
  const rows = planes.map((plane) => {
    const low = first.centre[plane] - first.target[plane];
    const high = second.centre[plane] - second.target[plane];
    const slope = (high - low) / (second.z - first.z);
    return { plane, low, high, slope, at0: low - slope * first.z };
  });
  return {
    slopes: rows.map(({ plane, low, high, slope }) => ({
      what: `slope in ${plane}`,
      working: `(${put(high, decimals)} − ${put(low, decimals)}) / (${second.z} − ${first.z})`,
      here: slope,
      answered: axis[plane].slope,
    })),
    heights: rows.map(({ plane, low, slope, at0 }) => ({
      what: `at z = 0 in ${plane}`,
      working: `${put(low, decimals)} − ${put(slope, decimals + 2)} · ${first.z}`,
      here: at0,
      answered: axis[plane].at0,
    })),
  };
}

/** Centre − target − axis of one station, and how it is judged against a radial tolerance. */
export function checkDeviation(example: AlignmentExample, id: string, decimals: number): Check[] {
  const { axis, stations } = example.result;
  const measured = measuredAt(example, id);
  const answered = stations.find((station) => station.id === id);
  if (!measured || !answered) return [];
  const found = (plane: "h" | "v"): Check => {
    const height = axis[plane].at0 + axis[plane].slope * measured.z;
    return {
      what: `deviation in ${plane}`,
      working: `${put(measured.centre[plane], decimals)} − ${put(measured.target[plane], decimals)} − ${put(height, decimals)}`,
      here: measured.centre[plane] - measured.target[plane] - height,
      answered: answered.deviation[plane],
    };
  };
  const [h, v] = [found("h"), found("v")];
  return [
    h,
    v,
    {
      what: "radial",
      working: `√(${put(h.here, decimals)}² + ${put(v.here, decimals)}²)`,
      here: Math.hypot(h.here, v.here),
      answered: answered.deviation.radial,
    },
    ...checkUncertainty(answered, decimals),
  ];
}

function checkUncertainty(
  { covariance, expandedUncertainty }: AlignmentExample["result"]["stations"][number],
  decimals: number,
): Check[] {
  const [[hh = 0, hv = 0] = [], [, vv = 0] = []] = covariance ?? [];
  if (!covariance || !expandedUncertainty) return [];
  const larger = (hh + vv) / 2 + Math.hypot((hh - vv) / 2, hv);
  const { kRadial, radial } = expandedUncertainty;
  return [
    {
      what: "U of radial",
      working: `k2 · √(larger eigenvalue) = ${kRadial.toFixed(4)} · ${put(Math.sqrt(larger), decimals)}`,
      here: kRadial * Math.sqrt(larger),
      answered: radial,
    },
  ];
}

/** How the guarded rule came to the station's verdict, in words with numbers. */
export function verdictInWords(example: AlignmentExample, id: string, decimals: number): string | null {
  const station = example.result.stations.find((each) => each.id === id);
  const tolerance = example.request.stations.find((each) => each.id === id)?.tolerance;
  if (!station?.expandedUncertainty || !tolerance || !("radial" in tolerance)) return null;
  const [d, spread, most] = [station.deviation.radial, station.expandedUncertainty.radial, tolerance.radial];
  const write = (value: number): string => put(value, decimals);
  if (d + spread <= most) return `|d| + U = ${write(d + spread)} ≤ T = ${write(most)}: conforms.`;
  if (d - spread > most) return `|d| − U = ${write(d - spread)} > T = ${write(most)}: exceeds.`;
  return `|d| − U = ${write(d - spread)} ≤ T = ${write(most)} < |d| + U = ${write(d + spread)}: undecided.`;
}
