import { stepAtMost } from "../pick-step.ts";
import { lettering, textWidth } from "../shape.ts";
import { convertLength, writeTick } from "../write-number.ts";
import type { Plane, PlanElevationModel } from "./plan-elevation-model.ts";

/** One plane's strip: where it lies on the sheet, and what stretch of offsets it shows. */
export interface Strip {
  readonly plane: Plane;
  readonly top: number;
  readonly bottom: number;
  readonly placeY: (offset: number) => number;
  readonly low: number;
  readonly high: number;
}

export interface PlanElevationScale {
  readonly left: number;
  readonly right: number;
  readonly placeX: (z: number) => number;
  readonly elevation: Strip;
  readonly plan: Strip;
  /** Offset between two grid lines. */
  readonly step: number;
  /** Half the width of a station's tolerance gate. */
  readonly gateHalfWidth: number;
  /** Rows of station names between the strips. */
  readonly labelRows: readonly number[];
  readonly labelsTop: number;
  readonly labelsHeight: number;
  /** Magnification of offsets against z as drawn. */
  readonly exaggeration: number;
}

const headingHeight = lettering.height * 2.2;
export const labelRowHeight = lettering.height * 1.5;

/** Lays the two strips over one z: same z, same scale of offsets in both, so that plan and elevation compare. */
export function scalePlanElevation(model: PlanElevationModel, width: number): PlanElevationScale {
  const ranges = { v: rangeOf(model, "v"), h: rangeOf(model, "h") };
  const stripHeight = Math.min(64, Math.max(40, width * 0.25));
  const span = Math.max(ranges.v.span, ranges.h.span) || convertLength(0.001, "mm", model.offsetUnit);
  const perOffset = (stripHeight * 0.86) / span;
  const step = stepAtMost(span / 3.5);
  const left = widestTick(ranges, span, step) + 3;
  const right = width - 6;
  const zs = model.stations.map((station) => station.z);
  const zLow = Math.min(...zs);
  const zSpan = Math.max(...zs) - zLow || 1;
  const inset = 7;
  const perZ = (right - left - 2 * inset) / zSpan;
  const placeX = (z: number): number => left + inset + (z - zLow) * perZ;
  const xs = zs.map(placeX);
  const labelRows = stackLabels(
    model.stations.map((station) => station.id),
    xs,
    width,
  );
  const labelsHeight = (Math.max(0, ...labelRows) + 1) * labelRowHeight + 4;
  const elevationTop = headingHeight;
  const planTop = elevationTop + stripHeight + labelsHeight + headingHeight;
  const closest = xs
    .toSorted((a, b) => a - b)
    .reduce((least, x, index, all) => Math.min(least, x - (all[index - 1] ?? -Infinity)), Infinity);
  return {
    left,
    right,
    placeX,
    elevation: placeStrip("v", elevationTop, stripHeight, ranges.v.middle, perOffset),
    plan: placeStrip("h", planTop, stripHeight, ranges.h.middle, perOffset),
    step,
    gateHalfWidth: Math.min(2.6, Math.max(0.9, closest * 0.36)),
    labelRows,
    labelsTop: elevationTop + stripHeight,
    labelsHeight,
    exaggeration: perOffset / convertLength(1, model.offsetUnit, model.axialUnit) / perZ,
  };
}

/** Elevation: up is high. Plan, seen from above with downstream to the right: down is right. */
function placeStrip(plane: Plane, top: number, height: number, middle: number, perOffset: number): Strip {
  const sense = plane === "v" ? -1 : 1;
  const half = height / 2 / perOffset;
  return {
    plane,
    top,
    bottom: top + height,
    placeY: (offset) => top + height / 2 + sense * (offset - middle) * perOffset,
    low: middle - half,
    high: middle + half,
  };
}

/** Everything drawn in a plane: the axis, tolerance gates, deviations with their bars. */
function rangeOf(model: PlanElevationModel, plane: Plane): { middle: number; span: number } {
  const targets = new Map(model.stations.map((station) => [station.id, station.target[plane]]));
  const offsets = [
    0,
    ...model.stations.flatMap((station) => {
      const [least, most] = station.allowed?.[plane] ?? [0, 0];
      return [station.target[plane] + least, station.target[plane] + most];
    }),
    ...model.surveys.flatMap((survey) =>
      survey.stations.flatMap((station) => {
        const at = station.deviation[plane] + (targets.get(station.id) ?? 0);
        const bar = station.uncertainty?.[plane] ?? 0;
        return [at - bar, at + bar];
      }),
    ),
  ];
  const low = offsets.reduce((least, offset) => Math.min(least, offset), Infinity);
  const high = offsets.reduce((most, offset) => Math.max(most, offset), -Infinity);
  return { middle: (low + high) / 2, span: high - low };
}

function widestTick(ranges: Record<Plane, { middle: number }>, span: number, step: number): number {
  const ends = [ranges.v, ranges.h].flatMap(({ middle }) => [middle - span / 2, middle + span / 2]);
  return Math.max(...ends.map((end) => textWidth(`+${writeTick(-Math.abs(end), step)}`)));
}

/** Gives each name the first row in which it touches no other, in order of z. */
function stackLabels(names: readonly string[], xs: readonly number[], width: number): number[] {
  const rows = names.map(() => 0);
  const ends: number[] = [];
  const byZ = names.map((_, index) => index).sort((a, b) => (xs[a] ?? 0) - (xs[b] ?? 0));
  for (const index of byZ) {
    const half = textWidth(names[index] ?? "") / 2;
    const middle = holdInside(xs[index] ?? 0, half, width);
    const free = ends.findIndex((end) => end + 1.5 <= middle - half);
    const row = free === -1 ? ends.length : free;
    ends[row] = middle + half;
    rows[index] = row;
  }
  return rows;
}

/** The middle of a name near an edge of the sheet, moved so that all of it can be read. */
export function holdInside(x: number, half: number, width: number): number {
  return Math.max(half, Math.min(width - half, x));
}
