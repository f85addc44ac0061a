import { writeNumber } from "../../../../../shared/figures/write-number.ts";
import type { ConfirmationExample } from "../api/get-job-example.ts";
import { put, type Check } from "./check.ts";

const planes = ["h", "v"] as const;
type Matrix = readonly (readonly number[])[];
type Moved = ConfirmationExample["result"]["moved"][number];

/** The station whose achieved move agrees least with the planned one; null where none was read in both surveys. */
export function worstMoved({ result }: ConfirmationExample): Moved | null {
  const read = result.moved.filter(({ planned, achieved }) => planned !== null && achieved !== null);
  return read.reduce<Moved | null>(
    (worst, one) => (worst === null || (one.statistic ?? 0) > (worst.statistic ?? 0) ? one : worst),
    null,
  );
}

const surveyed = ({ stations }: ConfirmationExample["request"]["before"], id: string) =>
  stations.find((station) => station.id === id);

/** What a station was to do, from the moves of its component at two supports: straight between them. */
export function checkPlanned({ request }: ConfirmationExample, moved: Moved, decimals: number): Check[] {
  const part = request.components?.find(({ stations }) => stations?.includes(moved.id));
  const [first, second, ...more] = (part?.supports ?? []).map(({ id, z }) => ({
    z,
    move: request.moves?.find(({ component, support }) => component === part?.id && support === id),
  }));
  const z = surveyed(request.before, moved.id)?.z;
  const { planned } = moved;
  if (z === undefined || !planned || !first?.move || !second?.move || more.length > 0) return [];
  return planes.map((plane) => {
    const [from, to] = [first.move?.[plane] ?? 0, second.move?.[plane] ?? 0];
    return {
      what: `planned ${plane}`,
      working: `${put(from, decimals)} + (${put(to, decimals)} − ${put(from, decimals)}) · (${z} − ${first.z}) / (${second.z} − ${first.z})`,
      here: from + ((to - from) * (z - first.z)) / (second.z - first.z),
      answered: planned[plane],
    };
  });
}

/** What it did, as read in both surveys, and what an indication at that moment would leave it to do. */
export function checkAchieved({ request }: ConfirmationExample, moved: Moved, decimals: number): Check[] {
  const [before, after] = [surveyed(request.before, moved.id), surveyed(request.after, moved.id)];
  const { planned, achieved, difference } = moved;
  if (!before || !after || !planned || !achieved || !difference) return [];
  return [
    ...planes.map((plane) => ({
      what: `achieved ${plane}`,
      working: `after − before = ${put(after.centre[plane], decimals)} − ${put(before.centre[plane], decimals)}`,
      here: after.centre[plane] - before.centre[plane],
      answered: achieved[plane],
    })),
    ...planes.map((plane) => ({
      what: `left ${plane}`,
      working: `planned − achieved = ${put(planned[plane], decimals)} − ${put(achieved[plane], decimals)}`,
      here: planned[plane] - achieved[plane],
      answered: 0 - difference[plane],
    })),
  ];
}

/** How much of it was done, and whether what is missing can be chance. Numbers without a unit. */
export function checkAgreement({ request }: ConfirmationExample, moved: Moved, decimals: number): Check[] {
  const { planned, achieved, difference, ratio, statistic } = moved;
  const spread = spreadOf(request, moved.id);
  if (!planned || !achieved || !difference || ratio === null) return [];
  const [along, whole] = [
    achieved.h * planned.h + achieved.v * planned.v,
    planned.h * planned.h + planned.v * planned.v,
  ];
  return [
    {
      what: "ratio",
      working: `(achieved · planned) / |planned|² = ${put(along, decimals + 2)} / ${put(whole, decimals + 2)}`,
      here: along / whole,
      answered: ratio,
    },
    ...(spread === null || statistic === null
      ? []
      : [
          {
            what: "statistic",
            working: `D = achieved − planned = ${writePair(difference, decimals)}`,
            here: quadratic(difference, spread),
            answered: statistic,
          },
        ]),
  ];
}

/** Whether each reference station repeats: its change against the covariances of both surveys. */
export function checkReferences({ request, result }: ConfirmationExample, decimals: number): Check[] {
  return result.reference.perStation.flatMap(({ id, statistic, limit }) => {
    const [before, after] = [surveyed(request.before, id), surveyed(request.after, id)];
    const spread = spreadOf(request, id);
    if (!before || !after || spread === null || statistic === null || limit === null) return [];
    const change = { h: after.centre.h - before.centre.h, v: after.centre.v - before.centre.v };
    return [
      {
        what: id,
        working: `D = ${writePair(change, decimals)}; limit ${put(limit, decimals)}`,
        here: quadratic(change, spread),
        answered: statistic,
      },
    ];
  });
}

export interface OpenPoint {
  readonly code: string;
  readonly words: string;
}

/** What of the example would stand in the way of a signature, and what is told beside it. */
export function openPoints({ request, result }: ConfirmationExample): OpenPoint[] {
  const reference = new Set(request.reference ?? []);
  const repeats = { true: [], false: ["reference_does_not_repeat"], null: ["reference_repeat_unknown"] }[
    `${result.reference.repeats}`
  ];
  return [
    ...result.outstanding.map((id) => ({
      code: reference.has(id) ? "reference_not_remeasured" : "station_not_remeasured",
      words: `${id} is to be measured again.`,
    })),
    ...repeats.map((code) => ({ code, words: "The reference stations are not shown to repeat." })),
    ...result.verdicts
      .filter(({ verdict }) => verdict === "exceeds" || verdict === "undecided")
      .map(({ id, verdict }) => ({
        code: "station_does_not_conform",
        words: `${id} ${verdict === "exceeds" ? "exceeds its tolerance" : "is undecided"}.`,
      })),
  ];
}

function writePair({ h, v }: { readonly h: number; readonly v: number }, decimals: number): string {
  return `(${writeNumber(h, decimals)}, ${writeNumber(v, decimals)})`;
}

function spreadOf({ before, after }: ConfirmationExample["request"], id: string): Matrix | null {
  const [one, other] = [surveyed(before, id)?.covariance, surveyed(after, id)?.covariance];
  if (!one || !other) return null;
  return one.map((row, i) => row.map((value, j) => value + (other[i]?.[j] ?? 0)));
}

/** D^T · S^{−1} · D, S inverted by hand. */
function quadratic({ h, v }: { readonly h: number; readonly v: number }, spread: Matrix): number {
  const [[hh = 0, hv = 0] = [], [, vv = 0] = []] = spread;
  return (vv * h * h - 2 * hv * h * v + hh * v * v) / (hh * vv - hv * hv);
}
