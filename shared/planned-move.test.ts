import { describe, expect, it } from "vitest";
import { plannedBoreMoves } from "./planned-move.ts";

const realised = [
  { support: "forward", h: -0.135, v: 0.3 },
  { support: "aft", h: 0.2, v: -0.1 },
];

describe("plannedBoreMoves", () => {
  it("are those of the supports without a roll", () => {
    expect(plannedBoreMoves({ realised })).toEqual(realised);
    expect(plannedBoreMoves(undefined)).toEqual([]);
  });

  it("shift by roll × height where one is taken out: a bore 650 mm above its feet, 0.0001 rad", () => {
    const roll = { found: 1e-4, predicted: 0, boreShift: { h: -0.065, v: 0 } };
    const [forward, aft] = plannedBoreMoves({ realised, roll });
    expect(forward!.h).toBeCloseTo(-0.2, 12);
    expect(aft!.h).toBeCloseTo(0.135, 12);
    expect([forward!.v, aft!.v]).toEqual([0.3, -0.1]);
  });
});
