import { ComputeError } from "../compute-error.ts";
import { farBends, measuresFor, placeOf, type Measures } from "./centre-charts.ts";
import type { CentreProblem, Place } from "./centre-problem.ts";
import type { HalfPlanes } from "./convex-hull.ts";
import {
  descendCentre,
  measureRivals,
  sidesAround,
  type Region,
  type Rivals,
} from "./descend-centre.ts";
import { optimumAt, type Optimum } from "./optimum-basin.ts";
import { solveTangentProgram } from "./tangent-program.ts";

export interface CentreSearch {
  readonly problem: CentreProblem;
  readonly rivals: Rivals;
  /** Regions that hold every permitted centre, to be searched whole. */
  readonly regions: readonly Region[];
  /** What of the near regions is permitted; null: all. */
  readonly edges: HalfPlanes | null;
  /** Where a first descent begins, to have something to compare with. */
  readonly starts: readonly { readonly region: Region; readonly x: number; readonly y: number }[];
  /** Two optima whose values differ by less than this are a tie, if their centres differ by more than it. */
  readonly tieWithin: number;
}

export interface BestCentre {
  readonly best: Optimum;
  /** The place of another optimum as good as the best within `tieWithin`; null when there is none. */
  readonly tie: Place | null;
  /** Regions examined. */
  readonly cells: number;
}

/** How much better than the answer an unseen centre may be, in units of the problem: far below 1e-9 of the radius. */
const tolerance = 1e-12;
/** Curvature is left out of account only where a cell is this much smaller than the distances. */
const tangentShare = 1 / 8;
/** Point evaluations after which the search gives up: about two seconds. */
const workMax = 3e8;

interface Cell extends Region, Rivals {
  /** The optimum that was found in a cell which this one is part of. */
  readonly home: Optimum | null;
}

/**
 * The centre of the least max(outer g) − min(inner g) of all permitted centres, by branch and bound: a region is left
 * only when a bound proves that it holds nothing better, or that its one optimum is known; else it is quartered, with
 * the points that can still be outermost or innermost in it. Bounds: each g changes by at most its slopes and bends
 * over the region, and the tangents of all rivals together (`solveTangentProgram`) less what they can miss by bending,
 * which shrinks with the square of the size. So every candidate is compared, and no local search decides; descents only
 * find what to compare with. Typically a few hundred cells, most of them with few rivals.
 * @throws ComputeError not_converged when the bound of work is reached
 */
export function searchCentre(search: CentreSearch, member: string): BestCentre {
  const { problem, rivals, edges, starts, tieWithin } = search;
  const measures = measuresFor(problem.count);
  const optima: Optimum[] = [];
  let best: Optimum | null = null;
  let work = 0;
  let cells = 0;
  const offer = (found: Optimum) => {
    if (best === null || found.value < best.value) best = found;
  };
  const descend = (region: Region, from: Place, among: Rivals): Optimum | null => {
    const end = descendCentre(problem, among, region, edges, from, measures);
    work += end.work;
    measureRivals(problem, region.chart, end.x, end.y, among, measures);
    const optimum = end.stationary
      ? optimumAt(problem, among, region.chart, end.x, end.y, end.value, measures)
      : { chart: region.chart, x: end.x, y: end.y, value: end.value, basin: 0 };
    offer(optimum);
    if (end.stationary) optima.push(optimum);
    return end.stationary ? optimum : null;
  };
  for (const { region, x, y } of starts) descend(region, { x, y }, rivals);

  const stack: Cell[] = search.regions.map((region) => ({ ...region, ...rivals, home: null }));
  for (let cell = stack.pop(); cell !== undefined; cell = stack.pop()) {
    cells++;
    const known: Optimum | null = best;
    if (covers(known, cell) || covers(cell.home, cell)) continue;
    work += cell.outer.length + cell.inner.length;
    if (work > workMax) throw giveUp(member);
    const cutting = cutEdges(cell, edges);
    if (cutting === null) continue;
    const centreValue = measureRivals(problem, cell.chart, cell.x, cell.y, cell, measures);
    const bounds = boundsOf(cell, measures);
    const limit = known === null ? Infinity : (known as Optimum).value + tieWithin;
    if (bounds.lower >= limit) continue;
    const left: Cell = { ...cell, edges: cutting, outer: bounds.outer, inner: bounds.inner };
    if (cutting.length === 0) {
      offer({ chart: cell.chart, x: cell.x, y: cell.y, value: centreValue, basin: 0 });
    }
    let lower = bounds.lower;
    let home = cell.home !== null && holds(cell, cell.home) ? cell.home : null;
    if (bounds.canUseTangents) {
      const sides = sidesAround(left, edges, cell.x, cell.y, Infinity);
      const step = solveTangentProgram(measures, left.outer, left.inner, sides);
      if (step === null) continue;
      work += (left.outer.length + left.inner.length) * (step.pivots + 1);
      lower = Math.max(lower, step.value - bounds.bend);
      if (lower >= limit) continue;
      if (home === null) {
        const at = { x: cell.x + step.dx, y: cell.y + step.dy };
        home = descend(left, at, left);
        if (covers(home, cell)) continue;
      }
    }
    const top: Optimum | null = best;
    const settled = top !== null && lower >= (top as Optimum).value - tolerance;
    if (settled && bounds.bend <= Math.max(tolerance, tieWithin / 8)) continue;
    pushQuarters(stack, { ...left, home });
  }
  const found: Optimum | null = best;
  if (found === null) throw giveUp(member);
  return { best: found, tie: tieOf(optima, found, tieWithin), cells };
}

interface CellBounds extends Rivals {
  readonly lower: number;
  /** What the tangents may miss over the cell. */
  readonly bend: number;
  readonly canUseTangents: boolean;
}

/** Lower bound of the criterion over the cell, point by point, and the points that remain rivals in it. */
function boundsOf(cell: Cell, { value, slopeX, slopeY, distance }: Measures): CellBounds {
  const { chart, halfX, halfY, outer, inner } = cell;
  const near = chart === "near";
  const size = Math.hypot(halfX, halfY);
  const bends = farBends(near ? 0 : cell.y + halfY);
  const farBend = (bends.xx * halfX * halfX + 2 * bends.xy * halfX * halfY + bends.yy * halfY * halfY) / 2;
  const constant = value.length - 1;
  const along = (i: number) => Math.abs(slopeX[i]!) * halfX + Math.abs(slopeY[i]!) * halfY;
  // A distance never lies below its tangent, and above it by at most size² ÷ 2 distances.
  const down = (i: number) => along(i) + (near ? 0 : farBend);
  const up = (i: number) =>
    i === constant
      ? 0
      : near
        ? Math.min(size, along(i) + (size * size) / (2 * distance[i]!))
        : along(i) + farBend;
  let top = -Infinity;
  for (let k = 0; k < outer.length; k++) top = Math.max(top, value[outer[k]!]! - down(outer[k]!));
  let bottom = Infinity;
  let nearest = Infinity;
  for (let k = 0; k < inner.length; k++) bottom = Math.min(bottom, value[inner[k]!]! + up(inner[k]!));
  const stillOuter = outer.filter((i) => value[i]! + up(i) >= top);
  const stillInner = inner.filter((i) => value[i]! - down(i) <= bottom);
  for (let k = 0; k < stillInner.length; k++) {
    const j = stillInner[k]!;
    if (j !== constant) nearest = Math.min(nearest, distance[j]!);
  }
  const bend = near ? (size * size) / (2 * nearest) : 2 * farBend;
  const canUseTangents = near ? size <= tangentShare * nearest : halfX <= tangentShare * 2;
  return { lower: top - bottom, bend, canUseTangents, outer: stillOuter, inner: stillInner };
}

/** The edges that cut the cell, of those that cut what it is part of; null where the cell lies beyond one of them. */
function cutEdges(cell: Cell, edges: HalfPlanes | null): Int32Array | null {
  if (edges === null || cell.edges.length === 0) return cell.edges;
  const { nx, ny, reach } = edges;
  const cutting: number[] = [];
  for (const k of cell.edges) {
    const beyond = nx[k]! * cell.x + ny[k]! * cell.y - reach[k]!;
    const extent = Math.abs(nx[k]!) * cell.halfX + Math.abs(ny[k]!) * cell.halfY;
    if (beyond - extent > 0) return null;
    if (beyond + extent > 0) cutting.push(k);
  }
  return Int32Array.from(cutting);
}

function pushQuarters(stack: Cell[], cell: Cell): void {
  const halfX = cell.halfX / 2;
  const halfY = cell.halfY / 2;
  for (const signX of [-1, 1]) {
    for (const signY of [-1, 1]) {
      stack.push({ ...cell, x: cell.x + signX * halfX, y: cell.y + signY * halfY, halfX, halfY });
    }
  }
}

/** Whether the whole cell lies where the optimum is the only one. */
function covers(optimum: Optimum | null, { chart, x, y, halfX, halfY }: Region): boolean {
  if (optimum === null || optimum.chart !== chart) return false;
  return Math.hypot(Math.abs(x - optimum.x) + halfX, Math.abs(y - optimum.y) + halfY) < optimum.basin;
}

function holds({ chart, x, y, halfX, halfY }: Region, optimum: Optimum): boolean {
  return optimum.chart === chart && Math.abs(x - optimum.x) <= halfX && Math.abs(y - optimum.y) <= halfY;
}

function tieOf(optima: readonly Optimum[], best: Optimum, tieWithin: number): Place | null {
  const at = placeOf(best.chart, best.x, best.y);
  const tied = optima
    .filter(({ value }) => value <= best.value + tieWithin)
    .map(({ chart, x, y }) => placeOf(chart, x, y))
    .filter((place) => {
      const apart = Math.hypot(place.x - at.x, place.y - at.y);
      const size = (1 + Math.hypot(at.x, at.y)) * (1 + Math.hypot(place.x, place.y));
      return apart > tieWithin && apart > 1e-6 * size;
    });
  return tied[0] ?? null;
}

function giveUp(member: string): ComputeError {
  const detail = "The readings are so irregular that not every centre could be compared within the bound of work.";
  return new ComputeError("not_converged", detail, { at: [member] });
}
