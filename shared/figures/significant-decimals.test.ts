import { describe, expect, it } from "vitest";
import { decimalsForSmallest } from "./significant-decimals.ts";

describe("decimalsForSmallest", () => {
  it("shows three figures of the smallest value that is not 0", () => {
    expect(decimalsForSmallest([0.0000114, 0.2, 0], 0)).toBe(7);
    expect((0.0000114).toFixed(7)).toBe("0.0000114");
    expect(decimalsForSmallest([-0.00123, null, undefined], 0)).toBe(5);
  });

  it("never shows fewer decimals than the least, nor more than a number can be written with", () => {
    expect(decimalsForSmallest([123, 45], 4)).toBe(4);
    expect(decimalsForSmallest([], 4)).toBe(4);
    expect(decimalsForSmallest([0, null], 2)).toBe(2);
    expect(decimalsForSmallest([1e-30], 4)).toBe(15);
  });
});
