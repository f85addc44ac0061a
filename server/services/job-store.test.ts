import { describe, expect, it } from "vitest";
import { limits } from "../../shared/limits.ts";
import { refuseTooMuch } from "./job-store.ts";

describe("refuseTooMuch", () => {
  const row = (characters: number) => ({ documentText: "x".repeat(characters) });

  it("takes a log to its last entry and its last character, and no further", () => {
    const rows = Array.from({ length: limits.entriesPerJob - 1 }, () => row(1));
    expect(() => refuseTooMuch(rows, ["x"])).not.toThrow();
    expect(() => refuseTooMuch(rows, ["x", "x"])).toThrow("entries");
    const half = limits.charactersPerJob / 2;
    expect(() => refuseTooMuch([row(half)], ["x".repeat(half)])).not.toThrow();
    expect(() => refuseTooMuch([row(half), row(1)], ["x".repeat(half)])).toThrow("characters");
  });
});
