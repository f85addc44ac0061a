import { describe, expect, it } from "vitest";
import { shimMoveResult, type ShimMoveResult } from "../../schemas/shim-moves.ts";
import type { Cell, FigureTable } from "../figure-table.ts";
import { planElevationOfMoves } from "../plan-elevation/plan-elevation-of-moves.ts";
import { tabulateComponents } from "./tabulate-components.ts";
import { tabulatePredicted } from "./tabulate-predicted.ts";
import { tabulateStacks } from "./tabulate-stacks.ts";
import { tabulateSteps, tabulateWatch } from "./tabulate-steps.ts";

const units = { axial: "mm", bore: "mm", offset: "mm" } as const;
const move = (support: string, h: number, v: number) => ({ support, h, v });

const result: ShimMoveResult = shimMoveResult.parse({
  components: [
    {
      id: "casing",
      fixed: false,
      moves: [move("forward", 0.1, 0.31), move("aft", 0.1, 0.2)],
      // In another order than the ideal move: supports are matched by id.
      realised: [move("aft", 0.1, 0.2), move("forward", 0.1, 0.3)],
      stacks: [
        {
          support: "forward",
          place: "left",
          ideal: 0.31,
          change: 0.3,
          from: 8,
          to: 8.3,
          add: [0.2, 0.1],
          remove: [],
          misfit: 0,
        },
        {
          support: "aft",
          place: "left",
          ideal: -0.2,
          change: -0.2,
          from: 8,
          to: 7.8,
          add: [],
          remove: [0.2],
          misfit: 1e-17,
        },
      ],
    },
    { id: "bearing", fixed: true, moves: [], realised: [], stacks: [] },
  ],
  predicted: [
    { id: "brg-1", deviation: { h: 0, v: 0, radial: 0, clockDeg: null }, verdict: null },
    { id: "cas-1", deviation: { h: 0, v: -0.01, radial: 0.01, clockDeg: 180 }, verdict: "conforms" },
  ],
  steps: [
    {
      order: 1,
      component: "casing",
      increments: [
        { moves: [move("forward", 0.05, 0.15)], indicators: [{ id: "di-1", reading: 0.15 }] },
        { moves: [move("forward", 0.1, 0.3)], indicators: [{ id: "di-1", reading: 0.3 }] },
      ],
      watch: [],
    },
  ],
  remeasure: ["brg-1", "cas-1"],
  advice: [],
});

const call = {
  units,
  reference: ["brg-1"],
  stations: [
    { id: "brg-1", z: 0, deviation: { h: 0, v: 0 } },
    { id: "cas-1", z: 1200, deviation: { h: -0.3, v: -0.4 }, tolerance: { radial: 0.1 } },
  ],
};

const valueOf = (cell: Cell | undefined) =>
  cell?.kind === "number" ? cell.value : cell?.kind === "text" ? cell.text : cell?.verdict;
const valuesOf = ({ rows }: FigureTable) => rows.map((row) => row.map(valueOf));
const tables = [
  tabulateComponents(result, units),
  tabulateStacks(result, units),
  ...tabulateSteps(result, units),
  tabulatePredicted(call, result),
].filter((table) => table !== null);

describe("the tables of a move sheet", () => {
  it("have rows as wide as their headings, and a unit over every length", () => {
    expect(tables).toHaveLength(4);
    for (const { rows, columns } of tables) {
      expect(rows.length).toBeGreaterThan(0);
      expect(rows.every((row) => row.length === columns.length)).toBe(true);
      const unitless = columns.filter(({ unit, align }) => align === "end" && unit === null);
      expect(unitless.map(({ heading }) => heading).filter((heading) => heading !== "part")).toEqual([]);
    }
  });

  it("set the realised move beside the ideal one of the same support, and name a part that stays", () => {
    expect(valuesOf(tabulateComponents(result, units))).toEqual([
      ["casing", "forward", 0.1, 0.31, 0.1, 0.3],
      ["casing", "aft", 0.1, 0.2, 0.1, 0.2],
      ["bearing", "stays", null, null, null, null],
    ]);
  });

  it("list every piece to add and to take out, and do not magnify a misfit that is arithmetic", () => {
    const stacks = tabulateStacks(result, units);
    expect(stacks?.rows.map((row) => [valueOf(row[7]), valueOf(row[8])])).toEqual([
      ["0.2 + 0.1", "–"],
      ["–", "0.2"],
    ]);
    expect(stacks?.rows.map((row) => row[9])).toMatchObject([{ decimals: 4 }, { decimals: 4 }]);
  });

  it("write the pieces of all stacks with equal decimals, as many as the finest needs", () => {
    const [casing, ...rest] = result.components;
    const [forward, aft] = casing!.stacks;
    const stacks = [
      { ...forward!, add: [10, 0.075] },
      { ...aft!, remove: [9.9] },
    ];
    const table = tabulateStacks({ ...result, components: [{ ...casing!, stacks }, ...rest] }, units);
    const words = table!.rows.map((row) =>
      row.slice(7, 9).map((cell) => (cell.kind === "text" ? cell.text : "")),
    );
    expect(words).toEqual([
      ["10.000 + 0.075", "–"],
      ["–", "9.900"],
    ]);
  });

  it("are left out where there is nothing to tell", () => {
    const nothing = { ...result, components: [], steps: [] };
    expect(tabulateStacks(nothing, units)).toBeNull();
    expect(tabulateWatch(result, units)).toBeNull();
    expect(tabulateSteps(nothing, units)).toEqual([]);
  });

  it("follow a step part by part, with what each indicator should read", () => {
    const [step] = tabulateSteps(result, units);
    expect(step?.caption).toBe("Step 1: casing, in 2 parts");
    expect(step?.columns.map(({ heading }) => heading)).toEqual([
      "part",
      "forward h",
      "forward v",
      "di-1 reads",
    ]);
    expect(step && valuesOf(step)).toEqual([
      [1, 0.05, 0.15, 0.15],
      [2, 0.1, 0.3, 0.3],
    ]);
  });

  it("set each station before and after", () => {
    const [reference, moved] = valuesOf(tabulatePredicted(call, result));
    expect(reference).toEqual(["brg-1 (ref.)", "not judged", 0, 0, 0, 0, 0, 0, 0]);
    expect(moved).toEqual(["cas-1", "conforms", 1200, -0.3, -0.4, 0.5, 0, -0.01, 0.01]);
  });
});

describe("plan and elevation of moves", () => {
  it("has the state found under the one predicted, from each station's target", () => {
    const model = planElevationOfMoves(call, result);
    expect(model.zero).toBe("target");
    expect(model.surveys.map(({ name }) => name)).toEqual(["as found", "as left, predicted"]);
    expect(model.stations.map(({ reference, allowed }) => [reference, allowed?.v ?? null])).toEqual([
      [true, null],
      [false, [-0.1, 0.1]],
    ]);
    expect(model.surveys[0]?.stations[1]).toMatchObject({
      deviation: { h: -0.3, v: -0.4 },
      radial: 0.5,
      verdict: null,
    });
  });
});
