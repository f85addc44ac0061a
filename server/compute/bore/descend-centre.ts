import type { CentreProblem } from "./centre-problem.ts";
import { measure, type Chart, type Measures } from "./centre-charts.ts";
import type { HalfPlanes } from "./convex-hull.ts";
import { solveTangentProgram, type StepSides, type TangentStep } from "./tangent-program.ts";

/** The points that can be outermost and those that can be innermost, by index; `count` stands for a constant 0. */
export interface Rivals {
  readonly outer: Int32Array;
  readonly inner: Int32Array;
}

/** A rectangle of a chart, with those edges of the permitted region that cut it, by index. */
export interface Region {
  readonly chart: Chart;
  readonly x: number;
  readonly y: number;
  readonly halfX: number;
  readonly halfY: number;
  readonly edges: Int32Array;
}

export interface Descent {
  readonly x: number;
  readonly y: number;
  /** max(outer) − min(inner). */
  readonly value: number;
  /** Whether the tangents promise nothing more, and no side or edge holds the centre back. */
  readonly stationary: boolean;
  readonly work: number;
}

const stepsMax = 80;
/** A promised gain below this is rounding. */
const gainMin = 4e-15;
const shortest = 1e-17;

/** max(outer) − min(inner) of the measures. */
export function spreadOf({ value }: Measures, { outer, inner }: Rivals): number {
  let top = -Infinity;
  for (let k = 0; k < outer.length; k++) top = Math.max(top, value[outer[k]!]!);
  let bottom = Infinity;
  for (let k = 0; k < inner.length; k++) bottom = Math.min(bottom, value[inner[k]!]!);
  return top - bottom;
}

/** Fills the measures of all rivals for the centre (x, y) and returns max(outer) − min(inner). */
export function measureRivals(
  problem: CentreProblem,
  chart: Chart,
  x: number,
  y: number,
  rivals: Rivals,
  measures: Measures,
): number {
  measure(problem, chart, x, y, rivals.outer, measures);
  if (rivals.inner !== rivals.outer) measure(problem, chart, x, y, rivals.inner, measures);
  return spreadOf(measures, rivals);
}

/**
 * Descends from (x, y) to a local optimum inside the region: step by step to the optimum of the tangents within a
 * trusted box, which shrinks when they promised too much. At an optimum with as many contacts as unknowns the steps
 * are Newton's. Only a local search: whether there is a better centre elsewhere is for `searchCentre` to say.
 */
export function descendCentre(
  problem: CentreProblem,
  rivals: Rivals,
  region: Region,
  edges: HalfPlanes | null,
  start: { readonly x: number; readonly y: number },
  measures: Measures,
): Descent {
  const each = rivals.outer.length + rivals.inner.length;
  let { x, y } = start;
  let value = measureRivals(problem, region.chart, x, y, rivals, measures);
  let trust = Math.max(region.halfX, region.halfY);
  let work = each;
  let stationary = false;
  for (let step = 0; step < stepsMax && trust > shortest; step++) {
    const sides = sidesAround(region, edges, x, y, trust);
    const tangent = solveTangentProgram(measures, rivals.outer, rivals.inner, sides);
    if (tangent === null) break;
    work += each * (tangent.pivots + 2);
    const promised = value - tangent.value;
    const [nextX, nextY] = [x + tangent.dx, y + tangent.dy];
    const next = measureRivals(problem, region.chart, nextX, nextY, rivals, measures);
    const settled = promised <= gainMin;
    if (settled ? next <= value + gainMin : next < value - promised / 10) {
      [x, y, value] = [nextX, nextY, next];
      if (settled) {
        stationary = !heldBack(tangent, trust, region, x, y);
        break;
      }
      trust *= 2;
    } else {
      if (settled) {
        stationary = !heldBack(tangent, trust, region, x, y);
        break;
      }
      trust = Math.min(trust, Math.max(Math.abs(tangent.dx), Math.abs(tangent.dy))) / 4;
      measureRivals(problem, region.chart, x, y, rivals, measures);
    }
  }
  return { x, y, value, stationary, work };
}

/** A push by the trusted box alone holds nothing back; one by the region's sides or edges does. */
function heldBack(tangent: TangentStep, trust: number, region: Region, x: number, y: number): boolean {
  if (!tangent.pushed) return false;
  const room = Math.min(region.halfX - Math.abs(x - region.x), region.halfY - Math.abs(y - region.y));
  return region.edges.length > 0 || room < trust;
}

/** The sides that hold a step from (x, y): the region's, those of the trusted box inside it, and the edges that cut it. */
export function sidesAround(
  region: Region,
  edges: HalfPlanes | null,
  x: number,
  y: number,
  trust: number,
): StepSides {
  const count = 4 + (edges === null ? 0 : region.edges.length);
  const [ax, ay, reach] = [new Float64Array(count), new Float64Array(count), new Float64Array(count)];
  ax.set([1, -1, 0, 0]);
  ay.set([0, 0, 1, -1]);
  reach[0] = Math.min(trust, Math.max(0, region.x + region.halfX - x));
  reach[1] = Math.min(trust, Math.max(0, x - region.x + region.halfX));
  reach[2] = Math.min(trust, Math.max(0, region.y + region.halfY - y));
  reach[3] = Math.min(trust, Math.max(0, y - region.y + region.halfY));
  if (edges !== null) {
    for (let k = 0; k < region.edges.length; k++) {
      const edge = region.edges[k]!;
      ax[4 + k] = edges.nx[edge]!;
      ay[4 + k] = edges.ny[edge]!;
      reach[4 + k] = edges.reach[edge]! - edges.nx[edge]! * x - edges.ny[edge]! * y;
    }
  }
  return { ax, ay, reach, count };
}
