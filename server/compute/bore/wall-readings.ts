import { ComputeError } from "../compute-error.ts";
import type { PointsInput, Seen, TurnedGaugeInput, WallInput, WireInput } from "./bore-input.ts";
import { clockDirection } from "./clock-direction.ts";
import { columns } from "./columns.ts";
import { statedUncertainties } from "./stated-uncertainties.ts";

/** Wall points in columns, downstream view, in the order sent. */
export interface WallReadings {
  readonly hMm: Float64Array;
  readonly vMm: Float64Array;
  /** From the station's plane; null where not every point states it. */
  readonly zMm: Float64Array | null;
  /** Null where no uncertainty is stated. */
  readonly uMm: Float64Array | null;
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
  const [hMm, vMm, zMm] = columns(n, 3) as [Float64Array, Float64Array, Float64Array];
  let withZ = 0;
  for (let i = 0; i < n; i++) {
    const point = points[i]!;
    hMm[i] = side * point.hMm;
    vMm[i] = point.vMm;
    if (point.zMm === null) continue;
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
  return { readings: { hMm, vMm, zMm: n > 0 && withZ === n ? zMm : null, uMm }, refusals };
}

function fromGauge(input: TurnedGaugeInput): GatheredWall {
  const { readings, seen, sense, nominalDiameterMm, gaugeSagMm } = input;
  const side = sign(seen);
  const growth = sense === "larger_is_farther" ? 1 : -1;
  const n = readings.length;
  const [hMm, vMm] = columns(n, 2) as [Float64Array, Float64Array];
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
      hMm: Float64Array.from(sides, ({ h, distanceMm }) => h * distanceMm),
      vMm: Float64Array.from(sides, ({ v, distanceMm }) => v * distanceMm - input.sagMm),
      zMm: null,
      uMm: readingUncertaintyMm === null ? null : new Float64Array(sides.length).fill(readingUncertaintyMm),
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
