import { describe, expect, it } from "vitest";
import { runSelfTest, selfCases } from "./run-self-test.ts";

describe("runSelfTest", () => {
  const checked = runSelfTest();

  it.each(selfCases)("$id gives the printed figures of $source", ({ id, figures }) => {
    const mine = checked.filter((one) => one.id === id);
    expect(mine.length).toBe(figures.length);
    expect(mine.filter(({ passed }) => !passed)).toEqual([]);
  });

  it("has an id of its own, a source and a tolerance for every case", () => {
    expect(new Set(selfCases.map(({ id }) => id)).size).toBe(selfCases.length);
    for (const { source, figures } of selfCases) {
      expect(source.length).toBeGreaterThan(10);
      expect(figures.length).toBeGreaterThan(0);
      for (const { tolerance } of figures) expect(tolerance).toBeGreaterThan(0);
    }
  });

  it("has cases of every part of the engine", () => {
    const areas = new Set(selfCases.map(({ area }) => area));
    expect([...areas].sort()).toEqual([
      "axis-deviation",
      "bore-fit",
      "cold-target",
      "confirmation",
      "repeatability-study",
      "shim-move",
      "statistics",
    ]);
  });

  it("fails a figure that is off, one that is not finite and one that the engine refuses, and goes on", () => {
    const figures = [{ figure: "x", expected: 1, tolerance: 0.1 }];
    const one = (id: string, compute: () => Record<string, number>) =>
      ({ id, area: "statistics", source: "made up", figures, compute }) as const;
    const results = runSelfTest([
      one("off", () => ({ x: 1.2 })),
      one("not finite", () => ({ x: Number.NaN })),
      one("refused", () => {
        throw new Error("no");
      }),
      one("right", () => ({ x: 1.05 })),
    ]);
    expect(results.map(({ passed, got }) => [passed, got])).toEqual([
      [false, 1.2],
      [false, null],
      [false, null],
      [true, 1.05],
    ]);
  });
});
