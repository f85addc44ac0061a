import { describe, expect, it } from "vitest";
import { rememberPairs } from "./remember-pairs.ts";
import { studentFactor } from "./student-t.ts";

describe("rememberPairs", () => {
  it("answers what the function answers, to the last bit, the first time and every other", () => {
    const remembered = rememberPairs(studentFactor);
    for (const round of [1, 2]) {
      for (const level of [0.6827, 0.95, 0.99]) {
        for (const dof of [null, 1, 21, 1000, 3.7]) {
          expect([round, remembered(level, dof)]).toEqual([round, studentFactor(level, dof)]);
        }
      }
    }
  });

  it("asks once for a pair, and again when thousands of others came between", () => {
    const asked: string[] = [];
    const remembered = rememberPairs((first, second: number | null) => {
      asked.push(`${first} ${second}`);
      return first + (second ?? 0.5);
    });
    expect([remembered(1, 2), remembered(1, 2), remembered(2, 1), remembered(1, null)]).toEqual([
      3, 3, 3, 1.5,
    ]);
    expect(asked).toEqual(["1 2", "2 1", "1 null"]);
    for (let k = 10; k < 6_000; k++) remembered(1, k);
    expect(remembered(1, 2)).toBe(3);
    expect(asked.filter((pair) => pair === "1 2")).toHaveLength(2);
  });

  it("keeps no refusal: what threw throws again", () => {
    let calls = 0;
    const remembered = rememberPairs(() => {
      calls++;
      throw new RangeError("no");
    });
    expect(() => remembered(1, 2)).toThrow("no");
    expect(() => remembered(1, 2)).toThrow("no");
    expect(calls).toBe(2);
  });
});
