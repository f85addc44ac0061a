import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { misfitGuards } from "./misfit-guards.ts";
import { SearchBudget } from "./search-budget.ts";
import { searchChoices, type SearchOption, type SearchPlace } from "./search-choices.ts";

const part = fc.integer({ min: -8, max: 8 }).map((n) => n / 4);

interface Named extends SearchOption {
  readonly name: number;
}

/** Three places of up to five options: effects along one or two columns of a space of two, rises and one push. */
const anyPlaces: fc.Arbitrary<SearchPlace<Named>[]> = fc.array(
  fc
    .record({
      columns: fc.array(fc.tuple(part, part), { minLength: 1, maxLength: 2 }),
      amounts: fc.array(fc.tuple(part, part, part, part), { minLength: 1, maxLength: 5 }),
    })
    .map(({ columns, amounts }) => ({
      columns,
      options: amounts.map(([a, b, rise, push], name) => ({
        name,
        effect: [0, 1].map((k) => a * columns[0]![k]! + b * (columns[1]?.[k] ?? 0)),
        rise,
        pushes: [push],
      })),
      allowed: (before: readonly Named[]) => (option: Named) =>
        before.every(({ name }) => name + option.name !== 7),
    })),
  { minLength: 1, maxLength: 3 },
);

const namesOf = (choices: readonly Named[]) => choices.map(({ name }) => name).join(" ");

describe("searchChoices", () => {
  it("visits exactly the choices within the bounds that trying all of them finds", () => {
    let found = 0;
    fc.assert(
      fc.property(anyPlaces, fc.constantFrom(0.5, 2, 8), part, (places, bound, most) => {
        const visited: string[] = [];
        const visit = (choices: readonly Named[]) => visited.push(namesOf(choices));
        searchChoices(places, 2, [most], () => bound, visit, new SearchBudget());
        const all = places.reduce<Named[][]>(
          (sets, { options, allowed }) =>
            sets.flatMap((set) => options.filter(allowed(set)).map((option) => [...set, option])),
          [[]],
        );
        const sum = (set: readonly Named[], of: (one: Named) => number) =>
          set.reduce((total, one) => total + of(one), 0);
        const wanted = all.filter((set) => {
          const size = [0, 1].reduce((total, k) => total + sum(set, ({ effect }) => effect[k]!) ** 2, 0);
          const rise = sum(set, (one) => one.rise);
          return size + Math.max(0, rise) <= bound && sum(set, ({ pushes }) => pushes[0]!) <= most;
        });
        found += wanted.length;
        // Quarters and their squares are exact; only the projection onto the columns rounds.
        expect(visited.filter((names) => !wanted.map(namesOf).includes(names))).toEqual([]);
        expect(visited.length).toBe(wanted.length);
      }),
      { numRuns: 300 },
    );
    expect(found).toBeGreaterThan(200);
  });

  it("follows a bound that the visitor lowers", () => {
    const options = [3, 1, 2, 0].map((size, name) => ({ name, effect: [size], rise: 0, pushes: [] }));
    const place = { options, columns: [[1]], allowed: () => () => true };
    let bound = 100;
    const visited: number[] = [];
    const visit = ([one]: readonly Named[]) => {
      visited.push(one!.name);
      bound = one!.effect[0]! ** 2;
    };
    searchChoices([place], 1, [], () => bound, visit, new SearchBudget());
    expect(visited).toEqual([0, 1, 3]);
  });

  it("visits the one choice of nothing where there is no place", () => {
    const visited: unknown[] = [];
    searchChoices(
      [],
      0,
      [],
      () => 0,
      (choices) => visited.push([...choices]),
      new SearchBudget(),
    );
    expect(visited).toEqual([[]]);
  });
});

describe("misfitGuards", () => {
  it("allow every change that a rigid move and misfits within the limit can make, and not all others", () => {
    const misfit = fc.double({ min: -0.02, max: 0.02, noNaN: true });
    const case_ = fc
      .array(fc.record({ row: fc.tuple(part, part), misfit }), { minLength: 1, maxLength: 6 })
      .chain((places) => fc.record({ places: fc.constant(places), move: fc.tuple(part, part) }));
    let refused = 0;
    fc.assert(
      fc.property(case_, ({ places, move }) => {
        const rows = places.map(({ row }) => row);
        const guards = misfitGuards(rows, 2, 0.02);
        const changes = places.map(({ row, misfit: left }) => row[0] * move[0] + row[1] * move[1] + left);
        changes.forEach((change, k) => {
          const allowed = guards[k]!(changes.slice(0, k));
          expect(allowed(change)).toBe(true);
          if (!allowed(change + 100)) refused++;
        });
      }),
    );
    expect(refused).toBeGreaterThan(50);
  });

  it("hold the third of three equally spaced feet to the line through the other two", () => {
    const guard = misfitGuards(
      [
        [1, 0],
        [1, 1],
        [1, 2],
      ],
      2,
      0.02,
    )[2]!([0, 0.1]);
    // 2·0.1 − 0 = 0.2, give or take (1 + 2 + 1) misfits of 0.02.
    expect([0.119, 0.121, 0.2, 0.279, 0.281].map(guard)).toEqual([false, true, true, true, false]);
  });
});
