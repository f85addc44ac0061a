import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { everyWay } from "../../../tests/support/brute-force-shims.ts";
import { stackOf } from "../../../tests/support/move-problems.ts";
import type { ShimStack } from "./move-problem.ts";
import { SearchBudget } from "./search-budget.ts";
import { changesWithin, piecesOf } from "./shim-changes.ts";

const changesOf = (stack: ShimStack, from: number, to: number, incrementMm = 0.05) =>
  changesWithin(stack, incrementMm, from, to, new SearchBudget());

const hundredths = (values: readonly number[]) => values.map((value) => Math.round(value * 100) / 100);

describe("changesWithin", () => {
  it("thickens by one new piece cut to the whole of the change, however thick", () => {
    const [change, ...others] = changesOf(stackOf(3), 0.35, 0.35);
    expect(others).toEqual([]);
    expect(hundredths(change!.addMm)).toEqual([0.35]);
    expect(change!.removeMm).toEqual([]);
    expect(change!.handled).toBe(1);
  });

  it("thins a stack of unknown pieces by taking it out whole and fitting one piece in its place", () => {
    const [change] = changesOf(stackOf(3), -0.2, -0.2);
    expect(change!.removeMm).toEqual([3]);
    expect(hundredths(change!.addMm)).toEqual([2.8]);
    expect(change!.handled).toBe(2);
  });

  it("never takes a part of a stack of unknown pieces, though it be a whole number of increments", () => {
    for (const { removeMm } of changesOf(stackOf(1), -1, 1)) expect([[], [1]]).toContainEqual(removeMm);
  });

  it("holds no piece in a stack of 0, and needs none to leave it so", () => {
    expect(piecesOf(stackOf(0))).toEqual([]);
    expect(changesOf(stackOf(0, { maxCount: 0 }), -1, 1)).toEqual([
      { changeMm: 0, addMm: [], removeMm: [], handled: 0 },
    ]);
    expect(hundredths(changesOf(stackOf(0), -1, 0.15).map(({ changeMm }) => changeMm))).toEqual([
      0, 0.05, 0.1, 0.15,
    ]);
  });

  it("takes out the known pieces that make the change, fewest handled", () => {
    const stack = stackOf(1.35, { piecesMm: [1, 0.2, 0.1, 0.05] });
    const take = (mm: number) => changesOf(stack, mm, mm)[0]!;
    expect(take(-0.1).removeMm).toEqual([0.1]);
    expect(hundredths([take(-0.15).handled, take(-0.05).handled])).toEqual([2, 1]);
    // A piece in place of the 0.2 handles two as well; three pieces out would handle three.
    expect(take(-0.35).handled).toBe(2);
  });

  it("counts all pieces of the finished stack against maxCount", () => {
    const full = stackOf(0.3, { piecesMm: [0.1, 0.2], maxCount: 2 });
    // One must leave for one that comes: 0.1 out, 0.15 in.
    const [thicker] = changesOf(full, 0.05, 0.05);
    expect(thicker!.removeMm.length).toBe(1);
    expect(thicker!.addMm.length).toBe(1);
    // A stack that holds too many as it stands cannot stay as it is.
    const over = changesOf({ ...full, maxCount: 1 }, 0, 0)[0]!;
    expect(over.removeMm.length).toBe(2);
    expect(hundredths(over.addMm)).toEqual([0.3]);
  });

  it("keeps the least and the most thickness of the finished stack", () => {
    const changes = changesOf(stackOf(1, { minMm: 0.9, maxMm: 1.1 }), -5, 5);
    expect(hundredths(changes.map(({ changeMm }) => changeMm))).toEqual([-0.1, -0.05, 0, 0.05, 0.1]);
  });

  it("reaches thicknesses between the increments when a piece off them comes out", () => {
    const changes = changesOf(stackOf(0.23, { piecesMm: [0.2, 0.03] }), -0.03, 0.03);
    // 0.03 out alone; nothing; 0.03 out and 0.05 in. (0.2 out brings back whole increments only.)
    expect(hundredths(changes.map(({ changeMm }) => changeMm))).toEqual([-0.03, 0, 0.02]);
  });

  it("finds the same changes, by as few pieces, as every subset of pieces tried with every new piece", () => {
    const piece = fc.integer({ min: 1, max: 30 }).map((n) => n / 100);
    const anyStack = fc
      .record({
        pieces: fc.array(piece, { maxLength: 5 }),
        known: fc.boolean(),
        down: fc.integer({ min: -2, max: 40 }),
        up: fc.integer({ min: -2, max: 40 }),
        maxCount: fc.constantFrom(0, 1, 2, 3, Infinity),
      })
      .map(({ pieces, known, down, up, maxCount }) => {
        const thicknessMm = pieces.reduce((sum, one) => sum + one, 0);
        const limits = { minMm: Math.max(0, thicknessMm - down / 100), maxMm: thicknessMm + up / 100 };
        return stackOf(thicknessMm, { ...limits, maxCount, piecesMm: known ? pieces : null });
      });
    fc.assert(
      fc.property(anyStack, fc.constantFrom(0.01, 0.02, 0.05), (stack, incrementMm) => {
        const found = changesOf(stack, -0.3, 0.3, incrementMm);
        const wanted = everyWay(stack, incrementMm, 0.3).sort((a, b) => a.changeMm - b.changeMm);
        expect(found.map(({ changeMm }) => Math.round(changeMm * 1e6))).toEqual(
          wanted.map(({ changeMm }) => Math.round(changeMm * 1e6)),
        );
        expect(found.map(({ handled }) => handled)).toEqual(wanted.map(({ handled }) => handled));
        for (const { changeMm, addMm, removeMm } of found) {
          const sum = (values: readonly number[]) => values.reduce((total, one) => total + one, 0);
          expect(Math.abs(sum(addMm) - sum(removeMm) - changeMm)).toBeLessThan(1e-12);
        }
      }),
      { numRuns: 300 },
    );
  });

  it("refuses by code when there are too many ways", () => {
    const refusal = expect.objectContaining({ code: "too_many_choices" }) as Error;
    expect(() => changesOf(stackOf(1), -1000, 1000, 1e-4)).toThrow(refusal);
    const pieces = Array.from({ length: 40 }, (_, k) => 0.1 + k * 0.001);
    const thick = pieces.reduce((sum, one) => sum + one, 0);
    expect(() =>
      changesOf(stackOf(thick, { piecesMm: pieces.map((p, k) => p + k * k * 1e-6) }), -1, 1),
    ).toThrow(refusal);
  });
});
