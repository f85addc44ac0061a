import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { enumerateColumns, withoutBeaten } from "./enumerate-columns.ts";
import { pickColumns } from "./pick-columns.ts";
import type { Unit } from "./stock-program.ts";

const column = fc
  .record({
    cost: fc.integer({ min: 0, max: 60 }).map((n) => n / 8),
    handled: fc.integer({ min: 0, max: 4 }),
    total: fc.integer({ min: 0, max: 20 }),
    net: fc.tuple(fc.integer({ min: -1, max: 3 }), fc.integer({ min: -1, max: 3 })),
    uncounted: fc.integer({ min: 0, max: 3 }),
  })
  .map(({ cost, handled, total, net, uncounted }) => ({
    cost,
    handled,
    totalMm: total / 100,
    net,
    taken: [...net.map((n) => Math.max(0, n)), uncounted],
  }));

/** Costs and pieces of which many are equal: what decides is the stock order. */
const likeColumn = column.map((each) => ({
  ...each,
  cost: Math.round(each.cost / 4),
  handled: each.handled % 2,
  totalMm: 0.1,
}));

const someUnits: fc.Arbitrary<Unit[]> = fc
  .constantFrom(column, likeColumn)
  .chain((of) => fc.array(fc.array(of, { minLength: 1, maxLength: 4 }), { minLength: 1, maxLength: 5 }))
  .map((all) => all.map((columns, u) => ({ component: Math.floor(u / 2), columns })));

interface Sums {
  readonly largest: number;
  readonly cost: number;
  readonly handled: number;
  readonly totalMm: number;
  readonly taken: readonly number[];
}

const sumsOf = (units: readonly Unit[], picks: readonly number[]): Sums => {
  const chosen = units.map(({ columns }, u) => columns[picks[u]!]!);
  const sum = (of: (one: (typeof chosen)[number]) => number) =>
    chosen.reduce((total, one) => total + of(one), 0);
  return {
    largest: Math.max(...chosen.map(({ cost }) => cost)),
    cost: sum(({ cost }) => cost),
    handled: sum(({ handled }) => handled),
    totalMm: Math.round(sum(({ totalMm }) => totalMm) * 1e6) / 1e6,
    taken: [0, 1, 2].map((line) => sum(({ taken }) => taken[line]!)),
  };
};

function everyPick(units: readonly Unit[], quantities: readonly number[]): number[][] {
  const all = units.reduce<number[][]>(
    (sets, { columns }) => sets.flatMap((set) => columns.map((_, c) => [...set, c])),
    [[]],
  );
  return all.filter((picks) => {
    const net = quantities.map(() => 0);
    return units.every(({ component, columns }, u) => {
      columns[picks[u]!]!.net.forEach((count, k) => (net[k]! += count));
      return units[u + 1]?.component === component || net.every((count, k) => count <= quantities[k]!);
    });
  });
}

describe("pickColumns", () => {
  it("finds by enumeration, and by HiGHS, what trying every pick finds", () => {
    const answered = { none: 0, some: 0 };
    fc.assert(
      fc.property(
        someUnits,
        fc.tuple(fc.integer({ min: 0, max: 5 }), fc.integer({ min: 0, max: 5 })),
        fc.constantFrom("least_squares", "minimax"),
        (units, quantities, aim) => {
          const inOrder = everyPick(units, quantities)
            .map((picks) => sumsOf(units, picks))
            .sort(
              (a, b) =>
                (aim === "minimax" ? a.largest - b.largest : 0) ||
                a.cost - b.cost ||
                a.handled - b.handled ||
                a.totalMm - b.totalMm ||
                (b.taken.map((count, line) => count - a.taken[line]!).find((more) => more !== 0) ?? 0),
            );
          const [best] = inOrder;
          for (const branches of [1e6, 0]) {
            const picked = pickColumns(units, quantities, aim, branches);
            expect(picked && sumsOf(units, picked.picks)).toEqual(best ?? null);
            if (picked) expect(picked.proved).toBe(true);
            if (picked) expect(picked.method).toBe(branches > 0 ? "enumeration" : "mixed_integer_program");
          }
          answered[best ? "some" : "none"]++;
        },
      ),
      { numRuns: 120 },
    );
    expect(Math.min(answered.none, answered.some)).toBeGreaterThan(3);
  });

  it("finds the same in every order of trying, and without what others beat", () => {
    fc.assert(
      fc.property(
        someUnits,
        fc.tuple(fc.integer({ min: 0, max: 5 }), fc.integer({ min: 0, max: 5 })),
        fc.constantFrom("least_squares", "minimax"),
        (units, quantities, aim) => {
          const plain = enumerateColumns(units, quantities, aim, 1e6);
          const fewer = withoutBeaten(units);
          const other = enumerateColumns(fewer.units, quantities, aim, 1e6, "fewest_pieces");
          expect([plain.complete, other.complete]).toEqual([true, true]);
          const own = other.best ? other.best.picks.map((pick, u) => fewer.from[u]![pick]!) : null;
          expect(own && sumsOf(units, own)).toEqual(plain.best && sumsOf(units, plain.best.picks));
        },
      ),
      { numRuns: 300 },
    );
  });

  it("leaves out a column that another beats in all but what rounding tells apart", () => {
    const column = (cost: number, handled: number) => ({ cost, handled, totalMm: 0, net: [1], taken: [1] });
    const columns = [column(1, 2), column(1 + 1e-15, 1), column(0.5, 3)];
    expect(withoutBeaten([{ component: 0, columns }]).from).toEqual([[2, 1]]);
  });

  it("finds nothing where a unit has no column", () => {
    expect(pickColumns([{ component: 0, columns: [] }], [], "least_squares")).toBe(null);
  });
});
