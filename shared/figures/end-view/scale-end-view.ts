import { stepAtMost } from "../pick-step.ts";
import { lettering, type Point } from "../shape.ts";
import { convertLength } from "../write-number.ts";
import type { EndViewModel } from "./end-view-model.ts";

/** Where each station's view lies on the sheet, all at one scale. */
export interface EndViewScale {
  /** Centres of the cells, by station in the model's order: each is its own target. */
  readonly origins: readonly Point[];
  /** Side of a cell, without its name. */
  readonly side: number;
  /** Room for the name over a cell. */
  readonly nameHeight: number;
  /** Sheet millimetres per offset unit. */
  readonly perOffset: number;
  /** A round offset, about half as long as a cell's reach. */
  readonly step: number;
  /** Magnification of deviations against their true size, at the sheet's full size. */
  readonly magnification: number;
  readonly height: number;
}

const largestSide = 72;
const smallestSide = 21;
const nameHeight = lettering.height * 1.9;
/** Between the farthest thing drawn and the cell's edge: room for a mark. */
const margin = 2.4;

/** Side of the cells of `count` stations on a sheet: as large as all of them fit, but no smaller than can be read. */
function sideFor(count: number, width: number, height: number): { columns: number; side: number } {
  const most = Math.max(1, Math.floor(width / smallestSide));
  let best = { columns: Math.min(count, most), side: smallestSide };
  for (let columns = 1; columns <= Math.min(count, most); columns += 1) {
    const rows = Math.ceil(count / columns);
    const side = Math.min(largestSide, width / columns, height / rows - nameHeight);
    if (side > best.side) best = { columns, side };
  }
  return best;
}

/** How many stations a sheet holds in cells that can still be read. */
export function endViewCapacity(width: number, height: number): number {
  const rows = Math.max(1, Math.floor(height / (smallestSide + nameHeight)));
  return rows * Math.max(1, Math.floor(width / smallestSide));
}

/** `reach` is the farthest offset to be shown: the model's own, unless several sheets share one scale. */
export function scaleEndView(
  model: EndViewModel,
  width: number,
  height: number,
  reach: number = reachOf(model),
): EndViewScale {
  const count = Math.max(1, model.stations.length);
  const { columns, side } = sideFor(count, width, height);
  const rows = Math.ceil(count / columns);
  const farthest = reach || convertLength(0.001, "mm", model.offsetUnit);
  const perOffset = (side / 2 - margin) / farthest;
  const left = (width - columns * side) / 2;
  return {
    origins: model.stations.map((_, index) => ({
      x: left + ((index % columns) + 0.5) * side,
      y: Math.floor(index / columns) * (side + nameHeight) + nameHeight + side / 2,
    })),
    side,
    nameHeight,
    perOffset,
    step: stepAtMost(farthest * 0.7),
    magnification: perOffset / convertLength(1, model.offsetUnit, "mm"),
    height: rows * (side + nameHeight),
  };
}

/** The farthest offset, per plane, of any deviation or tolerance. */
export function reachOf(model: EndViewModel): number {
  const offsets = [
    ...model.surveys.flatMap(({ stations }) => stations.flatMap(({ deviation: { h, v } }) => [h, v])),
    ...model.stations.flatMap(({ tolerance }) => {
      if (!tolerance) return [];
      return tolerance.kind === "ring" ? [tolerance.radius] : [...tolerance.h, ...tolerance.v];
    }),
  ];
  return offsets.reduce((most, offset) => Math.max(most, Math.abs(offset)), 0);
}
