import type { MovePlan } from "../../server/compute/moves/move-plan.ts";
import type { MoveProblem } from "../../server/compute/moves/move-problem.ts";
import { solvingOrder } from "../../server/compute/moves/solving-order.ts";

/** What a plan costs, handles and takes, by its own words: pieces added and removed, and predicted deviations. */
export interface JudgedPlan {
  /** Σ over components of Σ(|d|/T)², or of the largest |d|/T. */
  readonly cost: number;
  readonly handled: number;
  readonly totalMm: number;
  /** Pieces put in of each item of the stock, where none are cut. */
  readonly taken: readonly number[];
  /** Thicknesses of which a component, in the order of the moves, takes more than there is. */
  readonly overdrawn: readonly number[];
}

const same = (a: number, b: number) => Math.abs(a - b) < 1e-7;

export function judgeStock(problem: MoveProblem, plan: MovePlan): JudgedPlan {
  const stacks = plan.components.flatMap((component) => component.stacks);
  return {
    cost: problem.components.reduce((sum, { stationIds }) => sum + costOf(problem, plan, stationIds), 0),
    handled: stacks.reduce((sum, { addMm, removeMm }) => sum + addMm.length + removeMm.length, 0),
    totalMm: stacks.reduce((sum, { changeMm }) => sum + Math.abs(changeMm), 0),
    taken: (problem.stock ?? []).map(
      ({ thicknessMm }) => stacks.flatMap(({ addMm }) => addMm).filter((mm) => same(mm, thicknessMm)).length,
    ),
    overdrawn: overdrawn(problem, plan),
  };
}

function costOf({ stations, aim }: MoveProblem, { predicted }: MovePlan, ids: readonly string[]): number {
  const ratios = ids.flatMap((id) => {
    const { hMm, vMm } = predicted.find((each) => each.id === id)!.deviation;
    const tolerance = stations.find((each) => each.id === id)!.tolerance;
    if (!tolerance) return [];
    if (tolerance.form === "radial") return [Math.hypot(hMm, vMm) / tolerance.halfWidthMm];
    const share = (d: number, { minMm, maxMm }: { minMm: number; maxMm: number }) =>
      Math.abs((2 * d - minMm - maxMm) / (maxMm - minMm));
    return [share(hMm, tolerance.h), share(vMm, tolerance.v)];
  });
  return aim === "minimax" ? Math.max(0, ...ratios) : ratios.reduce((sum, ratio) => sum + ratio ** 2, 0);
}

/** Where shims are cut too, a piece that is a whole number of increments may have been cut: it takes nothing. */
function overdrawn({ stock, reuse, components, cutIncrementMm }: MoveProblem, plan: MovePlan): number[] {
  const left = new Map((stock ?? []).map(({ thicknessMm, quantity }) => [thicknessMm, quantity]));
  const over = new Set<number>();
  const count = (pieces: readonly number[], by: number) => {
    for (const mm of pieces) {
      const size = [...left.keys()].find((each) => same(each, mm));
      const cut = cutIncrementMm !== null && same(mm / cutIncrementMm, Math.round(mm / cutIncrementMm));
      if (by > 0 && size === undefined) left.set(mm, by);
      else if (size !== undefined && !cut) left.set(size, (left.get(size) ?? 0) + by);
      else if (size === undefined && !cut) over.add(mm);
    }
  };
  for (const index of solvingOrder(components)) {
    const stacks = plan.components[index]?.stacks ?? [];
    if (reuse) for (const { removeMm } of stacks) count(removeMm, 1);
    for (const { addMm } of stacks) count(addMm, -1);
    for (const [mm, quantity] of left) if (quantity < 0) over.add(mm);
  }
  return [...over];
}
