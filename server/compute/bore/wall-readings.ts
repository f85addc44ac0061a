import { ComputeError } from "../compute-error.ts";
import type { PointsInput, Seen, TurnedGaugeInput, WallInput, WireInput } from "./bore-input.ts";
import { clockDirection } from "./clock-direction.ts";
import { statedUncertainties } from "./stated-uncertainties.ts";

/**
 * Wall points in columns, downstream view, in the order sent. Plain arrays: a typed one of a few dozen numbers takes
 * longer to allocate than to fit.
 */
export interface WallReadings {
  readonly hMm: readonly number[];
  readonly vMm: readonly number[];
  /** From the station's plane; null where not every point states it. */
  readonly zMm: readonly number[] | null;
  /** Null where no uncertainty is stated. */
  readonly uMm: readonly number[] | null;
}

export interface GatheredWall {
  readonly readings: WallReadings;
  /** Everything that forbids a fit and can be seen reading by reading. */
  readonly refusals: readonly ComputeError[];
}

/** The member of each form that holds its readings: where a refusal points. */
export const readingsMember = {
  points: "points",
  turned_gauge: "readings",
  wire: "wire",
  rotating_target: "spots",
} as const;

/**
 * Reduces a form of reading to points on the wall: from the points' own origin, about the gauge's axis, or about the
 * straight chord of the wire. Exact, not the small-offset harmonic shortcut.
 */
export function gatherWall(input: WallInput): GatheredWall {
  switch (input.form) {
    case "points":
      return fromPoints(input);
    case "turned_gauge":
      return fromGauge(input);
    case "wire":
      return fromWire(input);
  }
}

/** Mirrors what was read looking upstream: the other side of the bore is on the right. */
function sign(seen: Seen): 1 | -1 {
  return seen === "downstream" ? 1 : -1;
}

function fromPoints(input: PointsInput): GatheredWall {
  const { points, seen } = input;
  const side = sign(seen);
  const n = points.length;
  const hMm = new Array<number>(n);
  const vMm = new Array<number>(n);
  let zMm: number[] | null = null;
  let withZ = 0;
  for (let i = 0; i < n; i++) {
    const point = points[i]!;
    hMm[i] = side * point.hMm;
    vMm[i] = point.vMm;
    if (point.zMm === null) continue;
    zMm ??= new Array<number>(n).fill(0);
    zMm[i] = point.zMm;
    withZ++;
  }
  const refusals: ComputeError[] = [];
  if (withZ > 0 && withZ < n) {
    const index = points.findIndex((point) => point.zMm === null);
    refusals.push(
      new ComputeError(
        "combination_invalid",
        `z is stated for ${withZ} of ${n} points; point ${index} has none.`,
        {
          at: ["points"],
        },
      ),
    );
  }
  if (input.taper !== null && withZ === 0) {
    refusals.push(
      new ComputeError("combination_invalid", "A taper needs the z of every point.", { at: ["taper"] }),
    );
  }
  const uMm = statedUncertainties(points, input.readingUncertaintyMm, "points", refusals);
  return { readings: { hMm, vMm, zMm: withZ === n ? zMm : null, uMm }, refusals };
}

function fromGauge(input: TurnedGaugeInput): GatheredWall {
  const { readings, seen, sense, nominalDiameterMm, gaugeSagMm } = input;
  const side = sign(seen);
  const growth = sense === "larger_is_farther" ? 1 : -1;
  const n = readings.length;
  const hMm = new Array<number>(n);
  const vMm = new Array<number>(n);
  const refusals: ComputeError[] = [];
  for (let i = 0; i < n; i++) {
    const { clockDeg, readingMm } = readings[i]!;
    const distanceMm = nominalDiameterMm / 2 + growth * readingMm;
    if (!(distanceMm > 0)) refusals.push(distanceRefusal(["readings", i, "reading"]));
    const direction = clockDirection(clockDeg);
    hMm[i] = side * distanceMm * direction.h;
    vMm[i] = distanceMm * direction.v - gaugeSagMm;
  }
  const uMm = statedUncertainties(readings, input.readingUncertaintyMm, "readings", refusals);
  return { readings: { hMm, vMm, zMm: null, uMm }, refusals };
}

/** Left, right, bottom and, where read, top, as seen by the reader: that order is kept in the answer. */
function fromWire(input: WireInput): GatheredWall {
  const addedMm = (input.touchedWireDiameterMm ?? 0) / 2;
  const side = sign(input.seen);
  const sides = [
    { member: "left", readMm: input.leftMm, h: -side, v: 0 },
    { member: "right", readMm: input.rightMm, h: side, v: 0 },
    { member: "bottom", readMm: input.bottomMm, h: 0, v: -1 },
    ...(input.topMm === null ? [] : [{ member: "top", readMm: input.topMm, h: 0, v: 1 }]),
  ].map((one) => ({ ...one, distanceMm: one.readMm + addedMm }));
  const { readingUncertaintyMm } = input;
  return {
    readings: {
      hMm: sides.map(({ h, distanceMm }) => h * distanceMm),
      vMm: sides.map(({ v, distanceMm }) => v * distanceMm - input.sagMm),
      zMm: null,
      uMm: readingUncertaintyMm === null ? null : sides.map(() => readingUncertaintyMm),
    },
    refusals: sides
      .filter(({ distanceMm }) => !(distanceMm > 0))
      .map(({ member }) => distanceRefusal(["wire", member])),
  };
}

function distanceRefusal(at: readonly (string | number)[]): ComputeError {
  return new ComputeError(
    "radius_not_positive",
    "The wall would lie at or beyond the axis it was measured from.",
    {
      at,
    },
  );
}
