import { describe, expect, it } from "vitest";
import type { SerializedError, TestModule } from "vitest/node";
import { countTests, isFailure, summarise } from "./summary-reporter.ts";

type Module = Pick<TestModule, "children" | "errors">;
const error: SerializedError = { message: "broken" };

function moduleOf(states: readonly string[], errors = 0, suiteErrors = 0): Module {
  const children = {
    allTests: () => states.map((state) => ({ result: () => ({ state }) })),
    allSuites: () => [{ errors: () => Array.from({ length: suiteErrors }, () => error) }],
  };
  return { children, errors: () => Array.from({ length: errors }, () => error) } as unknown as Module;
}

describe("countTests", () => {
  it("counts tests over all files", () => {
    const counts = countTests([moduleOf(["passed", "failed"]), moduleOf(["passed", "skipped"])], []);
    expect(counts).toEqual({ passed: 2, failed: 1, skipped: 1 });
  });

  it("counts a file that cannot be loaded, a failed hook and an error outside tests as failures", () => {
    expect(countTests([moduleOf(["passed"], 1)], []).failed).toBe(1);
    expect(countTests([moduleOf(["passed"], 0, 1)], []).failed).toBe(1);
    expect(countTests([moduleOf(["passed"])], [error]).failed).toBe(1);
  });

  it("counts a test that never came to its end as failed", () => {
    expect(countTests([moduleOf(["pending"])], [])).toEqual({ passed: 0, failed: 1, skipped: 0 });
  });
});

describe("isFailure", () => {
  it("holds for any failure and for a run that tested nothing", () => {
    expect(isFailure({ passed: 3, failed: 0, skipped: 1 })).toBe(false);
    expect(isFailure({ passed: 3, failed: 1, skipped: 0 })).toBe(true);
    expect(isFailure({ passed: 0, failed: 0, skipped: 0 })).toBe(true);
    expect(isFailure({ passed: 0, failed: 0, skipped: 5 })).toBe(true);
  });
});

describe("summarise", () => {
  it("names what was skipped only when something was", () => {
    expect(summarise({ passed: 12, failed: 0, skipped: 0 })).toBe("12 passed, 0 failed");
    expect(summarise({ passed: 12, failed: 1, skipped: 2 })).toBe("12 passed, 1 failed, 2 skipped");
  });
});
