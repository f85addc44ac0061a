import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  convertersFor,
  fromMillimetres,
  millimetresPer,
  toMillimetres,
  unitChoices,
  type LengthUnit,
  type Units,
} from "./units.ts";

const units = Object.keys(millimetresPer) as LengthUnit[];

/** Spacing of doubles at `value`. */
function ulp(value: number): number {
  const size = Math.abs(value);
  const next = new Float64Array([size]);
  const bits = new BigInt64Array(next.buffer);
  bits[0] = (bits[0] ?? 0n) + 1n;
  return (next[0] ?? 0) - size;
}

describe("units of length", () => {
  it("have the factors of their definitions", () => {
    // International yard and pound agreement of 1959: 1 in = 25.4 mm exactly; ft = 12 in, mil = in/1000.
    expect(millimetresPer).toEqual({ mm: 1, um: 1e-3, m: 1e3, in: 25.4, mil: 0.0254, ft: 304.8 });
  });

  it("agree with mathjs, a general-purpose library", async () => {
    const { unit } = await import("mathjs");
    for (const name of units) {
      const same = unit(1, name).toNumber("mm");
      expect(Math.abs(same / millimetresPer[name] - 1)).toBeLessThan(1e-15);
    }
  });

  it.each(units)("come back from mm to %s within one unit in the last place", (unit) => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, min: -1e10, max: 1e10 }), (value) => {
        fc.pre(Math.abs(value) > 1e-300);
        const back = fromMillimetres(toMillimetres(value, unit), unit);
        expect(Math.abs(back - value)).toBeLessThanOrEqual(ulp(value));
      }),
      { numRuns: 2000 },
    );
  });

  it("are converted for every combination that a call may state", () => {
    for (const axial of unitChoices.axial) {
      for (const bore of unitChoices.bore) {
        for (const offset of unitChoices.offset) {
          const stated: Units = { axial, bore, offset };
          const convert = convertersFor(stated);
          for (const dimension of ["axial", "bore", "offset"] as const) {
            expect(convert[dimension].unit).toBe(stated[dimension]);
            expect(convert[dimension].toMm(2)).toBe(2 * millimetresPer[stated[dimension]]);
            const square = convert[dimension].squareToMm2(3);
            expect(Math.abs(square / (3 * millimetresPer[stated[dimension]] ** 2) - 1)).toBeLessThan(1e-15);
            expect(Math.abs(convert[dimension].squareFromMm2(square) / 3 - 1)).toBeLessThan(4e-16);
          }
        }
      }
    }
  });
});
