import { bendWithin, boundsOf } from "./cell-bounds.ts";
import { spreadOver, type Cell } from "./centre-cells.ts";
import type { Measures } from "./centre-charts.ts";
import type { CentreProblem } from "./centre-problem.ts";
import { measureRivals, sidesAround, type Rivals } from "./descend-centre.ts";
import { carriersOf, solveTangentProgram, type TangentStep } from "./tangent-program.ts";

/**
 * Bounds from a few of the points, asked before all of them: most regions are left on their word. A part of the rivals
 * gives bounds that hold for all, only less close. Two parts: witnesses, a few spread over all; and the carriers, on whose
 * tangents the last bound lay, since those of neighbours mostly lie on the same.
 */
export class FewRivals {
  /** Evaluations of a point. */
  work = 0;
  private readonly witnesses: Rivals;
  private carriers: Rivals = { outer: new Int32Array(0), inner: new Int32Array(0) };

  constructor(
    private readonly problem: CentreProblem,
    { outer, inner }: Rivals,
    private readonly measures: Measures,
  ) {
    this.witnesses = { outer: spreadOver(outer), inner: spreadOver(inner) };
  }

  /** Takes those that carry the tangents of these rivals for the carriers from now on. */
  remember(step: TangentStep, { outer, inner }: Rivals): void {
    this.carriers = carriersOf(step, outer, inner);
  }

  /**
   * Whether the carriers prove that the cell holds nothing below `limit`. The bend is at least that of all rivals, so
   * that what they forbid all would forbid as well.
   */
  carriersForbid(cell: Cell, limit: number): boolean {
    const { outer, inner } = this.carriers;
    if (outer.length === 0 || inner.length === 0) return false;
    const bounds = this.boundsBy(cell, this.carriers);
    if (bounds.lower >= limit) return true;
    const farBend = bounds.usesTangents ? bounds.bend : null;
    const bend = cell.chart === "near" ? bendWithin(cell, cell.nearest) : farBend;
    if (bend === null) return false;
    const step = this.tangentsBy(cell, this.carriers);
    return step !== null && step.value - bend >= limit;
  }

  /** The same of the witnesses; not asked where the cell has few rivals itself. */
  witnessesForbid(cell: Cell, limit: number): boolean {
    const { outer, inner } = this.witnesses;
    if (cell.outer.length + cell.inner.length <= 2 * (outer.length + inner.length)) return false;
    const bounds = this.boundsBy(cell, this.witnesses);
    if (bounds.lower >= limit) return true;
    if (!bounds.usesTangents) return false;
    const step = this.tangentsBy(cell, this.witnesses);
    if (step !== null) this.remember(step, this.witnesses);
    return step !== null && step.value - bounds.bend >= limit;
  }

  private boundsBy(cell: Cell, rivals: Rivals) {
    this.work += rivals.outer.length + rivals.inner.length;
    measureRivals(this.problem, cell.chart, cell.x, cell.y, rivals, this.measures);
    return boundsOf(cell, rivals, this.measures);
  }

  private tangentsBy(cell: Cell, { outer, inner }: Rivals): TangentStep | null {
    const sides = sidesAround(cell, null, cell.x, cell.y, Infinity);
    const step = solveTangentProgram(this.measures, outer, inner, sides, true);
    this.work += (outer.length + inner.length) * ((step?.pivots ?? 0) + 1);
    return step;
  }
}
