import { expect } from "vitest";
import { padsAt, solvePart, stackOf, stationOff } from "../support/move-problems.ts";
import { describeCases, mismatches } from "./read-cases.ts";

interface StockChoice {
  readonly target?: number;
  readonly targets?: readonly number[];
  readonly stock: readonly number[];
  readonly each_available: number;
  readonly max_pieces: number;
}

/** A bearing on one pad below it, on an empty stack: to lift it by a target is to reach that target from the blocks. */
function reach(target: number, { stock, each_available, max_pieces }: StockChoice): readonly number[] {
  const mm = (units: number) => units / 1000;
  const { answer, plan } = solvePart(
    [stationOff("bore", 0, 0, -mm(target), 0.01)],
    [padsAt("pad", 0, [180], stackOf(0, { maxCount: max_pieces, piecesMm: [] }))],
    { stock: stock.map((units) => ({ thicknessMm: mm(units), quantity: each_available })) },
  );
  expect(plan.search?.proved).toBe(true);
  return answer.stacks[0]!.addMm;
}

const inUnits = (pieces: readonly number[]) => pieces.map((mm) => Math.round(mm * 1000));
const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

describeCases<StockChoice, object>(
  "shims from stock: integer-stock-choice",
  ["integer-stock-choice"],
  (reference) => {
    const { target, targets = [target ?? 0] } = reference.input;
    const chosen = targets.map((one) => inUnits(reach(one, reference.input)));
    for (const [k, pieces] of chosen.entries()) {
      expect(new Set(pieces).size).toBe(pieces.length);
      expect(sum(pieces)).toBe(targets[k]);
    }
    const pieces = chosen.map(({ length }) => length);
    const got =
      target === undefined
        ? { pieces }
        : {
            error: Math.abs(sum(chosen[0]!) - target),
            pieces: pieces[0],
            published_selection: [...chosen[0]!].sort((a, b) => a - b),
          };
    expect(mismatches(reference, got)).toEqual([]);
  },
);
