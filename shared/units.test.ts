import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  absoluteZero,
  convertersFor,
  expansionConverter,
  fromMillimetres,
  furtherConverter,
  furtherUnitChoices,
  gradientConverter,
  insidePer,
  massPerLengthConverter,
  millimetresPer,
  referenceTemperature,
  toMillimetres,
  unitChoices,
  type FurtherDimension,
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

describe("units of what is no length", () => {
  it("have the factors of their definitions", () => {
    // 1 lb = 0.45359237 kg (1959), 1 lbf = 1 lb × 9.80665 m/s² (1901), 1 in = 25.4 mm (1959), 1 °F = 5/9 K: all exact.
    expect(insidePer.temperature).toEqual({ C: 1, F: 5 / 9 });
    expect(insidePer.mass).toEqual({ kg: 1, lb: 0.45359237 });
    expect(insidePer.force).toEqual({ N: 1, lbf: 4.4482216152605 });
    expect(insidePer.density["kg/m3"]).toBe(1e-9);
    expect(Math.abs(insidePer.density["lb/in3"] / (0.45359237 / 16387.064) - 1)).toBeLessThan(4e-16);
    expect(insidePer.modulus.GPa).toBe(1000);
    expect(Math.abs(insidePer.modulus.psi / (4.4482216152605 / 645.16) - 1)).toBeLessThan(4e-16);
    expect(Math.abs(absoluteZero.F - (absoluteZero.C * 1.8 + 32))).toBeLessThan(1e-12);
  });

  it("agree with mathjs, a general-purpose library", async () => {
    const { unit } = await import("mathjs");
    const same: Record<FurtherDimension, readonly [mine: number, wanted: number][]> = {
      temperature: [
        [insidePer.temperature.F * 180, unit(212, "degF").toNumber("K") - unit(32, "degF").toNumber("K")],
      ],
      mass: [[insidePer.mass.lb, unit(1, "lb").toNumber("kg")]],
      force: [[insidePer.force.lbf, unit(1, "lbf").toNumber("N")]],
      density: [
        [insidePer.density["lb/in3"], unit("1 lb/in^3").toNumber("kg/mm^3")],
        [insidePer.density["kg/m3"], unit("1 kg/m^3").toNumber("kg/mm^3")],
      ],
      modulus: [
        [insidePer.modulus.psi, unit("1 psi").toNumber("N/mm^2")],
        [insidePer.modulus.GPa, unit("1 GPa").toNumber("N/mm^2")],
      ],
    };
    for (const [mine, wanted] of Object.values(same).flat()) {
      // mathjs holds the pound-force to twelve digits.
      expect(Math.abs(mine / wanted - 1)).toBeLessThan(2e-9);
    }
    const perFoot = massPerLengthConverter("lb").toInside(1);
    expect(Math.abs(perFoot / unit("1 lb/ft").toNumber("kg/mm") - 1)).toBeLessThan(1e-14);
  });

  it("come back within one unit in the last place", () => {
    const value = fc.double({ noNaN: true, min: -1e10, max: 1e10 });
    const converters = [
      ...(Object.keys(furtherUnitChoices) as FurtherDimension[]).flatMap((dimension) =>
        furtherUnitChoices[dimension].map((unit) => furtherConverter(dimension, unit)),
      ),
      ...furtherUnitChoices.mass.map(massPerLengthConverter),
      ...furtherUnitChoices.temperature.map(expansionConverter),
      ...furtherUnitChoices.temperature.map(gradientConverter),
    ];
    expect(converters).toHaveLength(16);
    fc.assert(
      fc.property(value, fc.constantFrom(...converters), (number, { toInside, fromInside }) => {
        fc.pre(Math.abs(number) > 1e-280);
        expect(Math.abs(fromInside(toInside(number)) - number)).toBeLessThanOrEqual(ulp(number));
      }),
      { numRuns: 5000 },
    );
  });

  it("turn expansion the other way about than temperature: 1/°F is 1.8/K", () => {
    expect(Math.abs(expansionConverter("F").toInside(6.5e-6) / 11.7e-6 - 1)).toBeLessThan(4e-16);
    expect(expansionConverter("C").toInside(11.7e-6)).toBe(11.7e-6);
    expect([expansionConverter("F").unit, massPerLengthConverter("kg").unit]).toEqual(["1/F", "kg/m"]);
    expect(massPerLengthConverter("kg").toInside(2)).toBe(0.002);
  });

  it("take a gradient per metre with °C and per foot with °F, and 20 °C as 68 °F", () => {
    expect(gradientConverter("C").toInside(2)).toBe(0.002);
    // 1 °F/ft = (5/9 K)/(304.8 mm), both exact.
    expect(Math.abs(gradientConverter("F").toInside(1) / (5 / 9 / 304.8) - 1)).toBeLessThan(4e-16);
    expect([gradientConverter("C").unit, gradientConverter("F").unit]).toEqual(["C/m", "F/ft"]);
    const inside = furtherConverter("temperature", "F").toInside(referenceTemperature.F - absoluteZero.F);
    expect(Math.abs(inside - (referenceTemperature.C - absoluteZero.C))).toBeLessThan(1e-12); // K
  });

  it("are not guessed where none is stated", () => {
    expect(() => furtherConverter("mass", undefined)).toThrow("units.mass is not stated.");
    expect(() => massPerLengthConverter(undefined)).toThrow(RangeError);
    expect(() => expansionConverter(undefined)).toThrow(RangeError);
    expect(() => gradientConverter(undefined)).toThrow(RangeError);
  });
});
