import { ComputeError, type ComputeErrorCode } from "../../server/compute/compute-error.ts";
import type { BoreFit } from "../../server/compute/bore/bore-fit.ts";
import type {
  BoreInput,
  PointsInput,
  RotatingTargetInput,
  TurnedGaugeInput,
  WallPoint,
  WireInput,
} from "../../server/compute/bore/bore-input.ts";
import { fitBore } from "../../server/compute/bore/fit-bore.ts";
import type { PlaneVector } from "../../server/compute/plane.ts";

const common = {
  seen: "downstream",
  level: 0.95,
  readingUncertaintyMm: null,
  nominalDiameterMm: null,
} as const;

export const wallPoint = (hMm: number, vMm: number, rest: Partial<WallPoint> = {}): WallPoint => ({
  hMm,
  vMm,
  zMm: null,
  uMm: null,
  ...rest,
});

/** Points on a wall, nothing stated. */
export function pointsInput(points: readonly WallPoint[], rest: Partial<PointsInput> = {}): PointsInput {
  return { ...common, form: "points", points, taper: null, outliers: null, ...rest };
}

export function pairsInput(pairs: readonly (readonly [number, number])[], rest: Partial<PointsInput> = {}) {
  return pointsInput(
    pairs.map(([h, v]) => wallPoint(h, v)),
    rest,
  );
}

export function gaugeInput(rest: Partial<TurnedGaugeInput>): TurnedGaugeInput {
  return {
    ...common,
    form: "turned_gauge",
    nominalDiameterMm: 1200,
    sense: "larger_is_farther",
    zero: "nominal",
    gaugeSagMm: 0,
    readings: [],
    outliers: null,
    ...rest,
  };
}

export function targetInput(rest: Partial<RotatingTargetInput>): RotatingTargetInput {
  return { ...common, form: "rotating_target", sense: "spot_on_target", spots: [], ...rest };
}

export function wireInput(rest: Partial<WireInput>): WireInput {
  return {
    ...common,
    form: "wire",
    leftMm: 200,
    rightMm: 200,
    bottomMm: 200,
    topMm: null,
    sagMm: 0,
    touchedWireDiameterMm: null,
    ...rest,
  };
}

/** Clock angles `count` equal steps apart, the first at `fromDeg`; over less than a turn both ends are read. */
export function clockAngles(count: number, fromDeg = 0, overDeg = 360): number[] {
  const step = overDeg / (overDeg >= 360 ? count : count - 1);
  return Array.from({ length: count }, (_, i) => fromDeg + i * step);
}

/** A point on a ring, its radius enlarged by `off`. */
export function onRing(centre: PlaneVector, radiusMm: number, clockDeg: number, off = 0): WallPoint {
  const angle = (clockDeg * Math.PI) / 180;
  const radius = radiusMm + off;
  return wallPoint(centre.hMm + radius * Math.sin(angle), centre.vMm + radius * Math.cos(angle));
}

/** The code of the refusal; a fit instead of one, or another error, fails the test. */
export function refusalOf(input: BoreInput): { code: ComputeErrorCode; at: string } {
  let fit: BoreFit;
  try {
    fit = (fitBore as (input: BoreInput) => BoreFit)(input);
  } catch (error) {
    if (error instanceof ComputeError) return { code: error.code, at: (error.details.at ?? []).join("/") };
    throw error;
  }
  throw new Error(`No refusal but a centre at ${fit.centre.hMm}, ${fit.centre.vMm}.`);
}
