import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { BruteStation } from "../../../tests/support/brute-force-shims.ts";
import {
  bruteForceStock,
  type StockGroup,
  type StockPart,
  type StockTask,
} from "../../../tests/support/brute-force-stock.ts";
import {
  feetAt,
  moveProblem,
  padsAt,
  partOn,
  stackOf,
  stationOff,
} from "../../../tests/support/move-problems.ts";
import { judgeStock } from "../../../tests/support/stock-ledger.ts";
import type { MoveProblem, MoveSupport, ShimStack, StockItem } from "./move-problem.ts";
import { solveMoves } from "./solve-moves.ts";

/** What a part is, told twice: as supports, and as groups for the brute force. */
interface Told {
  readonly part: StockPart;
  readonly supports: readonly MoveSupport[];
}

const hundredths = (most: number) => fc.integer({ min: -most, max: most }).map((n) => n / 200);

const stations = (zs: readonly number[], withH: boolean): fc.Arbitrary<BruteStation[]> =>
  fc.tuple(
    ...zs.map((zMm) =>
      fc.record({
        zMm: fc.constant(zMm),
        hMm: withH ? hundredths(12) : fc.constant(0),
        vMm: hundredths(14),
        toleranceMm: fc.constantFrom(0.02, 0.05),
      }),
    ),
  );

const someStack: fc.Arbitrary<ShimStack> = fc
  .record({
    pieces: fc.constantFrom<readonly number[] | null>([], [0.05], [0.05, 0.02], [1, 0.05], null),
    down: fc.constantFrom(Infinity, 0.03),
    // Few enough that the brute force reaches all: a stack of unknown pieces could else be made of a hundred.
    maxCount: fc.constantFrom(2, 3),
  })
  .map(({ pieces, down, maxCount }) => {
    const thick = pieces?.reduce((sum, mm) => sum + mm, 0) ?? 2;
    const minMm = Math.max(0, thick - down);
    return stackOf(thick, { piecesMm: pieces, minMm, maxCount: Math.max(maxCount, pieces?.length ?? 1) });
  });

const twins = (stack: ShimStack, zMm: number, h: number, v: number): StockGroup => ({
  stacks:
    h === 0
      ? [1, 1].map(() => ({ stack, place: { zMm, h, v }, sign: 1 as const }))
      : [
          { stack, place: { zMm, h, v }, sign: 1 },
          { stack, place: { zMm, h: -h, v }, sign: -1 },
        ],
});

/** One pair of feet; two pairs; one pair with side keys; one pad that bears all. */
const someTold = (forms: readonly ("feet" | "two" | "keyed" | "pad")[]): fc.Arbitrary<Told> =>
  fc.constantFrom(...forms).chain((form) =>
    fc
      .tuple(someStack, someStack, stations(form === "two" ? [100, 900] : [0, 300], form === "keyed"))
      .map(([stack, other, all]): Told => {
        const feet = { left: stack, right: stack };
        switch (form) {
          case "feet":
            return {
              part: { groups: [twins(stack, 0, 0, 1)], stations: all, freedoms: ["v"] },
              supports: [feetAt("f", 0, { stacks: feet })],
            };
          case "two":
            return {
              part: {
                groups: [twins(stack, 0, 0, 1), twins(other, 1000, 0, 1)],
                stations: all,
                freedoms: ["v", "tilt-v"],
              },
              supports: [
                feetAt("f", 0, { stacks: feet }),
                feetAt("g", 1000, { stacks: { left: other, right: other } }),
              ],
            };
          case "keyed":
            return {
              part: {
                groups: [twins(stack, 0, 0, 1), twins(other, 0, 1, 0)],
                stations: all,
                freedoms: ["v", "h"],
              },
              supports: [feetAt("f", 0, { stacks: { ...feet, "key-left": other, "key-right": other } })],
            };
          case "pad":
            return {
              part: {
                groups: [{ stacks: [{ stack, place: { zMm: 0, h: 0, v: 1 }, sign: 1 }] }],
                stations: all,
                freedoms: ["v"],
              },
              supports: [padsAt("p", 0, [180], stack)],
            };
        }
      }),
  );

const someStock = (quantities: readonly number[]): fc.Arbitrary<StockItem[]> =>
  fc
    .shuffledSubarray([0.02, 0.03, 0.05, 0.1], { minLength: 1, maxLength: 3 })
    .chain((sizes) =>
      fc.tuple(
        ...sizes.map((thicknessMm) =>
          fc.record({ thicknessMm: fc.constant(thicknessMm), quantity: fc.constantFrom(...quantities) }),
        ),
      ),
    );

const problemOf = (told: readonly Told[], task: StockTask): MoveProblem =>
  moveProblem(
    told.flatMap(({ part }, p) =>
      part.stations.map(({ zMm, hMm, vMm, toleranceMm }, i) =>
        stationOff(`s${p}-${i}`, zMm + 5000 * p, hMm, vMm, toleranceMm),
      ),
    ),
    told.map(({ part, supports }, p) =>
      partOn(
        `part-${p}`,
        part.stations.map((_, i) => `s${p}-${i}`),
        supports.map((support) => ({ ...support, zMm: support.zMm + 5000 * p })),
      ),
    ),
    {
      stock: task.stock,
      cutIncrementMm: task.incrementMm,
      reuse: task.reuse,
      aim: task.aim,
      maximumMisfitMm: task.maximumMisfitMm,
    },
  );

function expectBest(
  told: readonly Told[],
  rest: Omit<StockTask, "parts" | "windowMm" | "piecesMost">,
  windowMm = 0.2,
): string {
  const task: StockTask = { ...rest, parts: told.map(({ part }) => part), windowMm, piecesMost: 3 };
  const problem = problemOf(told, task);
  const plan = solveMoves(problem);
  const best = bruteForceStock(task);
  const got = judgeStock(problem, plan);
  expect(got.overdrawn).toEqual([]);
  if (!best) {
    expect(plan.components.some(({ unreachable }) => unreachable !== null)).toBe(true);
    return "none";
  }
  const same = (a: number, b: number) => Math.abs(a - b) <= 3e-9 * (1 + Math.abs(b));
  expect({
    proved: plan.search?.proved,
    cost: same(got.cost, best.cost) ? best.cost : got.cost,
    handled: got.handled,
    total: Math.abs(got.totalMm - best.leastTotalMm) < 1e-7 ? best.leastTotalMm : got.totalMm,
    // A piece may be cut to the size of one in stock: which of them it is, the plan does not tell.
    taken: rest.incrementMm === null ? got.taken : best.firstTaken,
  }).toEqual({
    proved: true,
    cost: best.cost,
    handled: best.fewestHandled,
    total: best.leastTotalMm,
    taken: best.firstTaken,
  });
  return plan.search?.method ?? "";
}

const rest = fc.record({
  incrementMm: fc.constantFrom(null, null, 0.01, 0.04),
  aim: fc.constantFrom("least_squares", "minimax"),
  maximumMisfitMm: fc.constantFrom(0, 0.02),
});

describe("shims from stock, beside every choice of all stacks", () => {
  it("are the best for one part, quantities unlimited", () => {
    fc.assert(
      fc.property(
        someTold(["feet", "two", "keyed", "pad"]),
        someStock([Infinity]),
        rest,
        (told, stock, other) => {
          expectBest([told], { ...other, aim: other.aim, stock, reuse: false });
        },
      ),
      { numRuns: 60 },
    );
  });

  it("are the best for one part with few of each, none of some, and never overdraw them", () => {
    fc.assert(
      fc.property(
        someTold(["feet", "two", "keyed", "pad"]),
        someStock([0, 1, 2, 3]),
        rest,
        (told, stock, other) => {
          expectBest([told], { ...other, aim: other.aim, stock, reuse: false });
        },
      ),
      { numRuns: 80 },
    );
  });

  it("are the best for two and three parts that share few of each", () => {
    const methods = new Set<string>();
    fc.assert(
      fc.property(
        fc.array(someTold(["feet", "pad", "pad", "keyed"]), { minLength: 2, maxLength: 3 }),
        someStock([0, 1, 2, 3]),
        rest,
        (told, stock, other) => {
          methods.add(expectBest(told, { ...other, aim: other.aim, stock, reuse: false }));
        },
      ),
      { numRuns: 80 },
    );
    expect(methods).toContain("alone");
    expect(methods).toContain("enumeration");
  });

  it("take the pieces that come first in the stock, of ways that are equal in all else", () => {
    fc.assert(
      fc.property(
        fc.array(fc.constantFrom(0.2, 0.3, 0.35), { minLength: 2, maxLength: 3 }),
        fc.shuffledSubarray([0.05, 0.1, 0.15, 0.2, 0.25], { minLength: 3, maxLength: 3 }),
        fc.tuple(...[0, 1, 2].map(() => fc.constantFrom(1, 2, 9))),
        fc.constantFrom<MoveProblem["aim"]>("least_squares", "minimax"),
        (wantedMm, sizes, quantities, aim) => {
          const told = wantedMm.map((mm): Told => {
            const stack = stackOf(1, { piecesMm: [1], maxCount: 4 });
            const stations = [{ zMm: 0, hMm: 0, vMm: -mm, toleranceMm: 0.05 }];
            const stacks = [{ stack, place: { zMm: 0, h: 0, v: 1 }, sign: 1 as const }];
            return {
              part: { groups: [{ stacks }], stations, freedoms: ["v"] },
              supports: [padsAt("p", 0, [180], stack)],
            };
          });
          const stock = sizes.map((thicknessMm, k) => ({ thicknessMm, quantity: quantities[k]! }));
          expectBest(told, { stock, aim, incrementMm: null, maximumMisfitMm: 0.02, reuse: false }, 0.5);
        },
      ),
      { numRuns: 80 },
    );
  });

  it("are the best where pieces taken out serve again, in the same part and in those after it", () => {
    fc.assert(
      fc.property(
        fc.array(someTold(["feet", "pad", "two"]), { minLength: 1, maxLength: 2 }),
        fc.constantFrom<readonly number[]>([0, 0, 0], [1, 0, 2], [0, 1, 0]),
        rest,
        (told, quantities, other) => {
          // Every thickness that can come out is a line: what is given back is then counted.
          const stock = [0.05, 0.02, 1, 2].map((thicknessMm, k) => ({
            thicknessMm,
            quantity: quantities[k] ?? 0,
          }));
          expectBest(told, { ...other, incrementMm: null, aim: other.aim, stock, reuse: true });
        },
      ),
      { numRuns: 50 },
    );
  });
});
