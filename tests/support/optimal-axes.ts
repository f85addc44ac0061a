import fc from "fast-check";
import type { AxisMethod, AxisStation, AxisZone } from "../../server/compute/axis/axis-input.ts";
import type { AxisDeviations, LineEvidence } from "../../server/compute/axis/axis-result.ts";
import { deviationsFromAxis } from "../../server/compute/axis/deviations-from-axis.ts";
import { axisInput, stationAt } from "./axis-stations.ts";
import type { OracleLine, OracleStation } from "./line-oracles.ts";

export type OptimalMethod = "minimum_zone" | "least_absolute";
export const optimalCases = [
  ["minimum_zone", "planes"],
  ["minimum_zone", "cylinder"],
  ["least_absolute", "planes"],
  ["least_absolute", "cylinder"],
] as const satisfies readonly (readonly [AxisMethod, AxisZone])[];

/** Solves for an axis through all stations. */
export function solveOptimal(
  method: OptimalMethod,
  zone: AxisZone,
  stations: readonly AxisStation[],
): AxisDeviations {
  return deviationsFromAxis(axisInput(method, [...stations.keys()], stations, { zone }));
}

/** The evidence in each plane; of a cylinder the same twice. */
export function evidenceOf({ axis }: AxisDeviations): { h: LineEvidence; v: LineEvidence } {
  const { optimum } = axis;
  if (!optimum) throw new Error("An optimal axis has evidence.");
  return optimum.zone === "planes" ? optimum : { h: optimum.both, v: optimum.both };
}

export const lineOf = ({ axis }: AxisDeviations): OracleLine => [
  axis.h.at0Mm,
  axis.h.slope,
  axis.v.at0Mm,
  axis.v.slope,
];

export const toOracle = (stations: readonly AxisStation[]): OracleStation[] =>
  stations.map(({ zMm, centre, target, weight }) => ({
    z: zMm,
    h: centre.hMm - target.hMm,
    v: centre.vMm - target.vMm,
    weight: weight ?? 1,
  }));

/** One plane's oracle stations: that plane in h, nothing in v. */
export const inPlane = (stations: readonly OracleStation[], plane: "h" | "v"): OracleStation[] =>
  stations.map((station) => ({ ...station, h: station[plane], v: 0 }));

/** Whole nanometres, mm: real readings, and none so near 0 that it is rounding. */
const offset = fc.integer({ min: -2e6, max: 2e6 }).map((nanometres) => nanometres / 1e6);

interface Survey {
  readonly weighted?: boolean;
  readonly most?: number;
}

/** Surveys of distinct z at least 50 mm apart, of centres anywhere within 2 mm. */
export function survey({ weighted = false, most = 12 }: Survey = {}): fc.Arbitrary<AxisStation[]> {
  return fc
    .array(
      fc.record({
        step: fc.double({ min: 50, max: 900, noNaN: true }),
        h: offset,
        v: offset,
        weight: fc.double({ min: 0.2, max: 5, noNaN: true }),
      }),
      { minLength: 3, maxLength: most },
    )
    .map((parts) => {
      let zMm = -1000;
      return parts.map(({ step, h, v, weight }) => {
        zMm += step;
        return stationAt(zMm, h, v, weighted ? { weight } : {});
      });
    });
}

/** Whole numbers, or a 0 as often as not: readings that tie. */
const coarse = fc.oneof(
  fc.integer({ min: 0, max: 3 }),
  fc.constant(0),
  fc.integer({ min: 0, max: 1000 }).map((thousandths) => thousandths / 1000),
);

/** Surveys read coarsely, on few z: ties, stations at one z, lines through many stations. */
export const coarseSurvey: fc.Arbitrary<AxisStation[]> = coarseOf(12);
export const longCoarseSurvey: fc.Arbitrary<AxisStation[]> = coarseOf(40);

function coarseOf(most: number): fc.Arbitrary<AxisStation[]> {
  return fc
    .array(fc.record({ z: fc.integer({ min: 0, max: 5 }), h: coarse, v: coarse }), {
      minLength: 3,
      maxLength: most,
    })
    .filter((parts) => new Set(parts.map(({ z }) => z)).size > 1)
    .map((parts) => parts.map(({ z, h, v }) => stationAt(100 * z, h, v)));
}
