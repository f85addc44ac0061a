import { ComputeError } from "../compute-error.ts";
import { boundsOf, rivalsLeft } from "./cell-bounds.ts";
import { covers, cutEdges, holds, partsOf, type Cell } from "./centre-cells.ts";
import { measuresFor, placeOf, type Measures } from "./centre-charts.ts";
import type { CentreProblem, Place } from "./centre-problem.ts";
import type { HalfPlanes } from "./convex-hull.ts";
import { descendCentre, measureRivals, sidesAround, type Region, type Rivals } from "./descend-centre.ts";
import { FewRivals } from "./few-rivals.ts";
import { optimumAt, type Optimum } from "./optimum-basin.ts";
import { solveTangentProgram, type StepSides } from "./tangent-program.ts";

export interface CentreSearch {
  readonly problem: CentreProblem;
  readonly rivals: Rivals;
  /** Regions that hold every permitted centre, to be searched whole. */
  readonly regions: readonly Region[];
  /** What of the near regions is permitted; null: all. */
  readonly edges: HalfPlanes | null;
  /** Where a first descent begins, to have something to compare with. */
  readonly start: { readonly region: Region; readonly x: number; readonly y: number };
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
/** Far more than what rounding may change in the value at a step's end. */
const roundedReach = 1e-9;
/** Centres nearer than this are one centre. */
const samePlace = 1e-6;
/**
 * Evaluations of a point after which the search gives up, and what a cell costs beside them: ten times what the most
 * irregular readings tried have needed; for 10,000 points a few seconds.
 */
const workMax = { base: 1e7, perPoint: 3e4 };
const workPerCell = 200;

/**
 * The centre of the least max(outer g) − min(inner g) of all permitted centres, by branch and bound: a region is left
 * only when a bound proves that it holds nothing better, or that its one optimum is known; else it is cut, with the
 * points that can still be outermost or innermost in it. Bounds: `boundsOf`, and the tangents of all rivals together
 * (`solveTangentProgram`) less what they can miss by bending, which shrinks with the square of the size. So every
 * candidate is compared, and no local search decides; descents only find what to compare with. Usually a few hundred
 * cells, most of them left on the word of a few points.
 * @throws ComputeError not_converged when the bound of work is reached
 */
export function searchCentre(search: CentreSearch, member: string): BestCentre {
  return new Search(search, member).run();
}

class Search {
  private readonly measures: Measures;
  private readonly few: FewRivals;
  private readonly optima: Optimum[] = [];
  private best: Optimum;
  /** An optimum as good as the best so far. */
  private tie: Optimum | null = null;
  private work = 0;
  private cells = 0;

  constructor(
    private readonly search: CentreSearch,
    private readonly member: string,
  ) {
    const { problem, rivals, start } = search;
    this.measures = measuresFor(problem.count);
    this.few = new FewRivals(problem, rivals, this.measures);
    const { region, x, y } = start;
    this.best = { chart: region.chart, x, y, value: Infinity, basin: 0 };
    this.descend(region, start, rivals);
  }

  run(): BestCentre {
    const { regions, rivals } = this.search;
    const stack: Cell[] = regions.map((region) => ({ ...region, ...rivals, home: null, nearest: 0 }));
    for (let cell = stack.pop(); cell !== undefined; cell = stack.pop()) {
      this.cells++;
      const left = this.examine(cell);
      if (left !== null) stack.push(...partsOf(left));
      this.work += workPerCell;
      if (this.work + this.few.work > workMax.base + workMax.perPoint * this.search.problem.count)
        throw this.giveUp();
    }
    if (this.best.value === Infinity) throw this.giveUp();
    if (this.best.basin === 0) this.descend(this.wholeRegion(this.best), this.best, rivals);
    const tie = this.optima.find((one) => this.ties(one));
    return { best: this.best, tie: tie ? placeOf(tie.chart, tie.x, tie.y) : null, cells: this.cells };
  }

  /** Null when the cell need not be searched further; else the cell with the rivals that are left in it. */
  private examine(cell: Cell): Cell | null {
    const { problem, tieWithin, edges } = this.search;
    if (covers(this.best, cell) || (cell.home !== null && covers(cell.home, cell))) return null;
    const cutting = cutEdges(cell, edges);
    if (cutting === null) return null;
    // Before an optimum is proved, what a cell offers at its middle may count.
    if (this.best.basin > 0 && this.few.carriersForbid(cell, this.limit())) return null;
    if (this.few.witnessesForbid(cell, this.limit())) return null;
    this.work += cell.outer.length + cell.inner.length;
    const value = measureRivals(problem, cell.chart, cell.x, cell.y, cell, this.measures);
    const bounds = boundsOf(cell, cell, this.measures);
    if (bounds.lower >= this.limit()) return null;
    if (cutting.length === 0) this.offer({ chart: cell.chart, x: cell.x, y: cell.y, value, basin: 0 });
    const rivals = rivalsLeft(cell, cell, this.measures, bounds);
    let { home } = cell;
    if (home !== null && !holds(cell, home)) home = null;
    let { lower } = bounds;
    if (bounds.usesTangents) {
      const sides = sidesAround({ ...cell, edges: cutting }, edges, cell.x, cell.y, Infinity);
      const step = this.tangentStep(cell, rivals, sides, home !== null);
      if (step === null) return null;
      this.work += (rivals.outer.length + rivals.inner.length) * (step.pivots + 1);
      this.few.remember(step, rivals);
      lower = Math.max(lower, step.value - bounds.bend);
      if (lower >= this.limit()) return null;
      const at = { x: cell.x + step.dx, y: cell.y + step.dy };
      if (step.pushed) {
        // The optimum, if there is one near, lies outside; what the edge of the cell offers still counts.
        this.work += rivals.outer.length + rivals.inner.length;
        const value = measureRivals(problem, cell.chart, at.x, at.y, rivals, this.measures);
        this.offer({ chart: cell.chart, ...at, value, basin: 0 });
      } else if (home === null) {
        home = this.descend({ ...cell, edges: cutting }, at, rivals);
        if (home !== null && covers(home, cell)) return null;
      }
    }
    const left = { ...cell, ...rivals, edges: cutting, home, nearest: bounds.nearest };
    if (lower < this.best.value - tolerance || bounds.bend > Math.max(tolerance, tieWithin / 8)) return left;
    this.lookForTie(left);
    return null;
  }

  /**
   * The step to the optimum of the tangents of all rivals. Where only its bound counts (the cell's optimum is known), it
   * is taken to the last digit only if it leads to what could be better than the best.
   */
  private tangentStep(cell: Cell, { outer, inner }: Rivals, sides: StepSides, boundCounts: boolean) {
    const { measures } = this;
    const step = solveTangentProgram(measures, outer, inner, sides, boundCounts);
    if (!step?.rounded) return step;
    const valueAt = (x: number, y: number) =>
      measureRivals(this.search.problem, cell.chart, x, y, { outer, inner }, measures);
    if (valueAt(cell.x + step.dx, cell.y + step.dy) > this.best.value + roundedReach) return step;
    valueAt(cell.x, cell.y);
    return solveTangentProgram(measures, outer, inner, sides);
  }

  /** From where a region is left. A known tie is one: then only better centres are sought. */
  private limit(): number {
    return this.best.value + (this.tie === null ? this.search.tieWithin : -tolerance);
  }

  /** A region too small to hold anything better may lie on the edge of an optimum as good. */
  private lookForTie(cell: Cell): void {
    if (this.tie !== null) return;
    const reach = 4 * Math.hypot(cell.halfX, cell.halfY);
    const known = [this.best, ...this.optima].some(
      ({ chart, x, y }) => chart === cell.chart && Math.hypot(x - cell.x, y - cell.y) <= reach,
    );
    // On an edge of what is permitted no optimum proves itself.
    if (!known && cell.edges.length === 0) this.descend(this.wholeRegion(cell), cell, this.search.rivals);
  }

  /** Descends inside the region; the optimum reached, or null where the region's edge held it back. */
  private descend(region: Region, from: Place, rivals: Rivals): Optimum | null {
    const { problem, edges } = this.search;
    const { x, y, value, stationary, work } = descendCentre(
      problem,
      rivals,
      region,
      edges,
      from,
      this.measures,
    );
    this.work += work;
    const { chart } = region;
    if (!stationary) {
      this.offer({ chart, x, y, value, basin: 0 });
      return null;
    }
    measureRivals(problem, chart, x, y, rivals, this.measures);
    const optimum = optimumAt(problem, rivals, chart, x, y, value, this.measures);
    this.offer(optimum);
    this.optima.push(optimum);
    if (this.tie === null || !this.ties(this.tie))
      this.tie = this.optima.find((one) => this.ties(one)) ?? null;
    return optimum;
  }

  private offer(found: Optimum): void {
    const better = found.value < this.best.value;
    // Of two that rounding alone tells apart, the one that is proved an optimum.
    const proved = found.value <= this.best.value + tolerance && found.basin > this.best.basin;
    if (better ? !(this.best.basin > found.basin && this.best.value <= found.value + tolerance) : proved) {
      this.best = found;
    }
  }

  /** Whether the optimum is as good as the best, and another centre. */
  private ties({ chart, x, y, value }: Optimum): boolean {
    const { tieWithin } = this.search;
    if (value > this.best.value + tieWithin) return false;
    const one = placeOf(chart, x, y);
    const other = placeOf(this.best.chart, this.best.x, this.best.y);
    const apart = Math.hypot(one.x - other.x, one.y - other.y);
    const size = (1 + Math.hypot(one.x, one.y)) * (1 + Math.hypot(other.x, other.y));
    return apart > tieWithin && apart > samePlace * size;
  }

  /** All of a chart, from somewhere in it. */
  private wholeRegion({ chart, x }: Pick<Region, "chart" | "x">): Region {
    const region = this.search.regions.find((one) => one.chart === chart) ?? this.search.start.region;
    return chart === "near" ? region : { ...region, x, halfX: Math.PI };
  }

  private giveUp(): ComputeError {
    const detail =
      "The readings are so irregular that not every centre could be compared within the bound of work.";
    return new ComputeError("not_converged", detail, { at: [this.member] });
  }
}
