import { describe, expect, it } from "vitest";
import { readFormula } from "./read-formula.ts";

describe("readFormula", () => {
  it("sets indices low and powers high, with braces and without", () => {
    expect(readFormula("w_i · x^{−1} = u_{max}²")).toEqual([
      { set: "plain", text: "w" },
      { set: "low", text: "i" },
      { set: "plain", text: " · x" },
      { set: "high", text: "−1" },
      { set: "plain", text: " = u" },
      { set: "low", text: "max" },
      { set: "plain", text: "²" },
    ]);
  });

  it("leaves a line without marks as it stands, and a mark that marks nothing", () => {
    expect(readFormula("a + b")).toEqual([{ set: "plain", text: "a + b" }]);
    expect(readFormula("a _ b")).toEqual([{ set: "plain", text: "a _ b" }]);
    expect(readFormula("")).toEqual([]);
  });
});
