import { describe, expect, it } from "vitest";
import {
  deepFreeze,
  feetAt,
  moveProblem,
  padsAt,
  partOn,
  solvePart,
  stackOf,
  stationOff,
} from "../../../tests/support/move-problems.ts";
import { judgeStock } from "../../../tests/support/stock-ledger.ts";
import type { MoveProblem, StockItem } from "./move-problem.ts";
import { solveMoves } from "./solve-moves.ts";

const pad = (id: string, zMm: number, vMm: number, toleranceMm = 0.05) => ({
  station: stationOff(`s-${id}`, zMm, 0, vMm, toleranceMm),
  part: partOn(id, [`s-${id}`], [padsAt("p", zMm, [180], stackOf(2, { piecesMm: [1, 1] }))]),
});

const problemOf = (parts: readonly ReturnType<typeof pad>[], rest: Partial<MoveProblem>): MoveProblem =>
  moveProblem(
    parts.map(({ station }) => station),
    parts.map(({ part }) => part),
    rest,
  );

const near = (got: number, wanted: number, within = 1e-9) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

describe("stock that components share", () => {
  const one: StockItem[] = [{ thicknessMm: 0.1, quantity: 1 }];

  it("goes where it is worth most: 0.1 at half the tolerance is worth four times as much", () => {
    const wide = pad("wide", 0, -0.1, 0.1);
    const narrow = pad("narrow", 3000, -0.1, 0.05);
    for (const parts of [
      [wide, narrow],
      [narrow, wide],
    ]) {
      const plan = solveMoves(problemOf(parts, { stock: one }));
      const changed = plan.components.filter(({ stacks }) => stacks[0]!.changeMm !== 0).map(({ id }) => id);
      expect(changed).toEqual(["narrow"]);
      expect(plan.search).toEqual({ method: "enumeration", proved: true, betterBy: 0 });
      const left = plan.components.find(({ id }) => id === "wide")!;
      expect(left.unreachable).toBe(null);
    }
  });

  it("goes to the way that comes first in stock order, where two are equal in cost, pieces and change", () => {
    const stock = [
      { thicknessMm: 0.1, quantity: 1 },
      { thicknessMm: 0.2, quantity: Infinity },
      { thicknessMm: 0.15, quantity: Infinity },
    ];
    const plan = solveMoves(problemOf([pad("a", 0, -0.3), pad("b", 3000, -0.3)], { stock }));
    const added = plan.components.map(({ stacks }) => [...stacks[0]!.addMm].sort());
    expect(added.sort((a, b) => a[0]! - b[0]!)).toEqual([
      [0.1, 0.2],
      [0.15, 0.15],
    ]);
    expect(plan.search).toMatchObject({ proved: true, betterBy: 0 });
  });

  it("names the stock where it is what keeps a station out", () => {
    const plan = solveMoves(problemOf([pad("a", 0, -0.1), pad("b", 3000, -0.12)], { stock: one }));
    const out = plan.components.filter(({ unreachable }) => unreachable !== null);
    expect(out.map(({ id, unreachable }) => [id, unreachable!.cause])).toEqual([["a", "stock"]]);
  });

  it("gives pieces taken out to the parts moved after, not before", () => {
    const gives = (zMm: number) => ({
      station: stationOff("s-gives", zMm, 0, 0.1),
      part: partOn("gives", ["s-gives"], [padsAt("p", zMm, [180], stackOf(2.1, { piecesMm: [1, 1, 0.1] }))]),
    });
    const takes = pad("takes", 3000, -0.1);
    const change = (parts: readonly ReturnType<typeof pad>[], reuse: boolean) =>
      solveMoves(problemOf(parts, { stock: [], reuse })).components.find(({ id }) => id === "takes")!
        .stacks[0]!.changeMm;
    near(change([gives(0), takes], true), 0.1);
    expect(change([takes, gives(0)], true)).toBe(0);
    expect(change([gives(0), takes], false)).toBe(0);
  });

  it("is taken in turn, and not called the best, where one part's move shifts another's stations", () => {
    const parts = [pad("a", 0, -0.1), pad("b", 3000, -0.1)];
    const coupling = { componentId: "a", supportId: "p", stationId: "s-b", h: 0, v: 0.1 };
    const problem = problemOf(parts, { stock: one, couplings: [coupling] });
    const plan = solveMoves(problem);
    expect(plan.search).toEqual({ method: "in_turn", proved: false, betterBy: null });
    expect(plan.advice).toContainEqual({ code: "optimality_not_proved", betterBy: null });
    expect(judgeStock(problem, plan).overdrawn).toEqual([]);
  });

  it("is proved for a machine of 30 stacks by prices and HiGHS, whatever order the parts come in", () => {
    const offs = [-0.21, 0.13, -0.34, -0.08, 0.19, -0.27, -0.15, 0.06];
    const parts = offs.map((v, k) => {
      const zMm = 2500 * k;
      const ids = [0, 1].map((i) => `s${k}-${i}`);
      const stack = stackOf(3, { piecesMm: [2, 0.5, 0.5], maxCount: 6 });
      const stacks = { left: stack, right: stack };
      const supports =
        k < 7
          ? [feetAt("f", zMm, { stacks }), feetAt("g", zMm + 1500, { stacks })]
          : [padsAt("p", zMm, [135, 225], stack)];
      return {
        stations: ids.map((id, i) => stationOff(id, zMm + 300 + 700 * i, 0, v + 0.031 * i)),
        part: partOn(`part-${k}`, ids, supports),
      };
    });
    const solve = (order: readonly number[]) => {
      const taken = order.map((k) => parts[k]!);
      const stock = [0.025, 0.05, 0.1, 0.25].map((thicknessMm) => ({ thicknessMm, quantity: 4 }));
      const problem = moveProblem(
        taken.flatMap(({ stations }) => stations),
        taken.map(({ part }) => part),
        { stock },
      );
      const plan = solveMoves(deepFreeze(problem));
      return { plan, judged: judgeStock(problem, plan) };
    };
    const { plan, judged } = solve([0, 1, 2, 3, 4, 5, 6, 7]);
    expect(plan.components.flatMap(({ stacks }) => stacks).length).toBe(30);
    expect(judged.overdrawn).toEqual([]);
    expect(plan.search).toMatchObject({ proved: true, betterBy: 0 });
    const turned = solve([7, 3, 5, 1, 6, 2, 4, 0]);
    expect(turned.judged.overdrawn).toEqual([]);
    near(turned.judged.cost, judged.cost, 1e-8 * (1 + judged.cost));
    expect(turned.judged.handled).toBe(judged.handled);
  }, 120_000);
});

describe("shims from stock", () => {
  const station = (v: number) => [stationOff("s", 0, 0, v)];
  const feet = (thicknessMm = 2, rest = {}) => {
    const stack = stackOf(thicknessMm, rest);
    return [feetAt("f", 0, { stacks: { left: stack, right: stack } })];
  };

  it("leave everything as it is where there are none", () => {
    for (const stock of [[], [{ thicknessMm: 0.1, quantity: 0 }]]) {
      const { answer, plan } = solvePart(station(-0.2), feet(), { stock });
      expect(answer.stacks.map(({ changeMm }) => changeMm)).toEqual([0, 0]);
      expect(answer.unreachable).toMatchObject({ cause: "stock", worst: { stationId: "s" } });
      expect(plan.search).toEqual({ method: "alone", proved: true, betterBy: 0 });
      expect(plan.advice.map(({ code }) => code)).not.toContain("shims_not_chosen");
    }
  });

  it("say so where the stack must change and no piece of the stock does it", () => {
    const { answer } = solvePart(station(-0.1), feet(2, { minMm: 2.05 }), {
      stock: [{ thicknessMm: 5, quantity: 1 }],
    });
    expect(answer.unreachable).toMatchObject({ cause: "stock" });
    expect(answer.stacks.map(({ changeMm }) => changeMm)).toEqual([0, 0]);
  });

  it("find a far piece where the stack must change", () => {
    const stock = [
      { thicknessMm: 0.001, quantity: 1 },
      { thicknessMm: 4, quantity: 2 },
    ];
    const { answer } = solvePart(station(-0.1), feet(0, { minMm: 3.5, piecesMm: [] }), { stock });
    expect(answer.stacks.map(({ addMm }) => addMm)).toEqual([[4], [4]]);
  });

  it("come from the first line of the stock that does, and from stock before a piece is cut", () => {
    const rest = { maxCount: 4, piecesMm: [1, 1] };
    const [first] = solvePart(station(-0.2), feet(2, rest), {
      stock: [0.05, 0.15, 0.08, 0.12].map((thicknessMm) => ({ thicknessMm, quantity: Infinity })),
    }).answer.stacks;
    expect(first!.addMm).toEqual([0.05, 0.15]);
    const [other] = solvePart(station(-0.2), feet(2, rest), {
      stock: [0.12, 0.08, 0.05, 0.15].map((thicknessMm) => ({ thicknessMm, quantity: Infinity })),
    }).answer.stacks;
    expect(other!.addMm).toEqual([0.12, 0.08]);
    const cut = solvePart(station(-0.2), feet(2, rest), {
      stock: [{ thicknessMm: 0.2, quantity: 2 }],
      cutIncrementMm: 0.01,
    });
    expect(cut.answer.stacks.map(({ addMm }) => addMm)).toEqual([[0.2], [0.2]]);
    expect(judgeStock(cut.problem, cut.plan).overdrawn).toEqual([]);
  });

  it("tell the same in other units", () => {
    const told = (factor: number) =>
      solvePart(
        [stationOff("s", 0, 0, -0.23 * factor, 0.05 * factor)],
        feet(2 * factor, { maxCount: 4, piecesMm: [1 * factor, 1 * factor] }),
        {
          stock: [0.02, 0.05, 0.1].map((thicknessMm) => ({ thicknessMm: thicknessMm * factor, quantity: 3 })),
          maximumMisfitMm: 0.02 * factor,
        },
      ).answer.stacks.map(({ addMm }) => addMm.map((mm) => Math.round((mm / factor) * 1e6) / 1e6));
    expect(told(25.4)).toEqual(told(1));
    expect(told(0.001)).toEqual(told(1));
  });

  it("predict what applying them leaves: solved again from there, nothing changes", () => {
    const stock = [0.02, 0.05, 0.1].map((thicknessMm) => ({ thicknessMm, quantity: 6 }));
    for (const aim of ["least_squares", "minimax"] as const) {
      const stations = [stationOff("a", 100, 0.04, -0.17), stationOff("b", 900, -0.02, -0.09)];
      const supports = (left: number) => [
        feetAt("f", 0, {
          stacks: {
            left: stackOf(2 + left, { piecesMm: [2 + left] }),
            right: stackOf(2 + left, { piecesMm: [2 + left] }),
          },
        }),
      ];
      const { plan, answer } = solvePart(stations, supports(0), { stock, aim });
      const after = stations.map((station, k) => ({ ...station, deviation: plan.predicted[k]!.deviation }));
      const again = solvePart(after, supports(answer.stacks[0]!.changeMm), { stock, aim });
      expect(again.answer.stacks.map(({ changeMm }) => changeMm)).toEqual([0, 0]);
      for (const [k, { deviation }] of again.plan.predicted.entries()) {
        near(deviation.vMm, plan.predicted[k]!.deviation.vMm);
        near(deviation.hMm, plan.predicted[k]!.deviation.hMm);
      }
    }
  });

  it("refuse by code, or answer the best found, what would take too many trials", () => {
    const odd = Array.from({ length: 40 }, (_, k) => ({
      thicknessMm: 0.1 + 0.0123457 * Math.sqrt(k + 2),
      quantity: Infinity,
    }));
    const solve = () => solvePart(station(-3.3), feet(5, { piecesMm: null }), { stock: odd });
    let outcome: string;
    try {
      outcome = solve().plan.search!.proved ? "proved" : "best found";
    } catch (error) {
      outcome = (error as { code: string }).code;
    }
    expect(["proved", "best found", "too_many_choices"]).toContain(outcome);
  });
});
