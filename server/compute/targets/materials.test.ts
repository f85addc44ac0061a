import { describe, expect, it } from "vitest";
import { materialNames, materialTable } from "../../../shared/schemas/materials.ts";
import { growthMm } from "./growth.ts";
import { materials } from "./materials.ts";

/**
 * In pounds and degrees Fahrenheit, as the same handbook prints them beside (Callister, tables B.1, B.2, B.6), and the data
 * sheet: a second reading of each value. lb/in³, 10⁶ psi, 10⁻⁶/°F.
 */
const customary: Readonly<Record<string, readonly [number, number | null, number]>> = {
  steel_1020: [0.283, 30, 6.5],
  steel_1040: [0.283, 30, 6.3],
  steel_4140: [0.283, 30, 6.8],
  steel_4340: [0.283, 30, 6.8],
  stainless_304: [0.289, 28, 9.6],
  stainless_316: [0.289, 28, 8.8],
  stainless_405: [0.282, 29, 6.0],
  stainless_440a: [0.282, 29, 5.7],
  stainless_17_7ph: [0.276, 29.5, 6.1],
  grey_iron_g3000: [0.264, null, 6.3],
  ductile_iron_60_40_18: [0.256, 24.5, 6.2],
  ductile_iron_80_55_06: [0.256, 24.4, 5.9],
  nickel_718: [0.296, 29.0, 7.31],
};

describe("materials", () => {
  it("are those that the contract names, in its order", () => {
    expect(Object.keys(materials)).toEqual([...materialNames]);
  });

  it("stand in the words of the contract with the same numbers", () => {
    const rows = Object.entries(materials).map(
      ([name, { densityKgPerM3, modulusGPa, expansionPerK }]) =>
        `| ${name} | ${densityKgPerM3} | ${modulusGPa ?? "state it"} | ${Number((expansionPerK * 1e6).toPrecision(12))} |`,
    );
    expect(materialTable.split("\n").filter((line) => /^\| \w+_\w+ \|/.test(line))).toEqual(rows);
  });

  it.each(Object.entries(materials))("%s agrees with its source in customary units", (name, one) => {
    const [density, modulus, expansion] = customary[name]!;
    // Half of the last printed digit of either column.
    expect(Math.abs(one.densityKgPerM3 / 27679.9047 - density)).toBeLessThan(0.0007);
    expect(Math.abs(one.expansionPerK * 1e6 - expansion * 1.8)).toBeLessThan(0.15);
    if (modulus === null) expect(one.modulusGPa).toBeNull();
    else expect(Math.abs(one.modulusGPa! / 6.894757 - modulus)).toBeLessThan(0.15);
    expect(one.source).toMatch(/table/);
  });
});

describe("growthMm", () => {
  it("lengthens 1000 mm of AISI 304 by 0.688 mm over 40 K (Callister's 17.2e-6)", () => {
    const growth = {
      direction: "v" as const,
      lengthMm: 1000,
      expansionPerK: materials.stainless_304.expansionPerK,
      riseK: 40,
      uncertaintyMm: null,
    };
    expect(Math.abs(growthMm(growth) - 0.688)).toBeLessThan(1e-12);
    expect(growthMm({ ...growth, lengthMm: -1000 })).toBe(-growthMm(growth));
    expect(growthMm({ ...growth, riseK: -40 })).toBe(-growthMm(growth));
  });
});
