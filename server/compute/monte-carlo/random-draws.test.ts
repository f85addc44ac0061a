import { describe, expect, it } from "vitest";
import { studentFactor } from "../statistics/student-t.ts";
import { fillNormals, nextStudentScale } from "./random-draws.ts";
import { nextUniform, streamOf } from "./wichmann-hill.ts";

const mean = (values: Float64Array, of: (value: number) => number) =>
  values.reduce((sum, value) => sum + of(value), 0) / values.length;

describe("fillNormals", () => {
  it("takes pairs of uniform draws to pairs of normal ones, as JCGM 101:2008, C.4 states", () => {
    const [stream, twin] = [streamOf(1, "pair"), streamOf(1, "pair")];
    const normals = new Float64Array(4);
    fillNormals(stream, normals);
    for (const at of [0, 2]) {
      const [first, second] = [nextUniform(twin), nextUniform(twin)];
      // x₁² + x₂² = −2·ln r₁, and the angle between them is 2π·r₂.
      expect(Math.abs(normals[at]! ** 2 + normals[at + 1]! ** 2 + 2 * Math.log(first))).toBeLessThan(1e-13);
      const turn = Math.atan2(normals[at + 1]!, normals[at]!) / (2 * Math.PI);
      expect(Math.abs(((turn + 1) % 1) - second)).toBeLessThan(1e-14);
    }
  });

  it("fills an odd number of places too", () => {
    const [odd, even] = [new Float64Array(5), new Float64Array(6)];
    fillNormals(streamOf(1, "odd"), odd);
    fillNormals(streamOf(1, "odd"), even);
    expect([...odd]).toEqual([...even.subarray(0, 5)]);
  });

  it("has the moments and tails of the normal distribution", () => {
    const n = 400_000;
    const values = new Float64Array(n);
    fillNormals(streamOf(11, "normal"), values);
    // Variances of the means of x, x², x³, x⁴: 1/n, 2/n, 15/n, 96/n.
    expect(Math.abs(mean(values, (x) => x))).toBeLessThan(4 * Math.sqrt(1 / n));
    expect(Math.abs(mean(values, (x) => x ** 2) - 1)).toBeLessThan(4 * Math.sqrt(2 / n));
    expect(Math.abs(mean(values, (x) => x ** 3))).toBeLessThan(4 * Math.sqrt(15 / n));
    expect(Math.abs(mean(values, (x) => x ** 4) - 3)).toBeLessThan(4 * Math.sqrt(96 / n));
    for (const level of [0.5, 0.95, 0.999]) {
      const factor = studentFactor(level, null);
      const beyond = mean(values, (x) => (Math.abs(x) > factor ? 1 : 0));
      expect(Math.abs(beyond - (1 - level))).toBeLessThan(4 * Math.sqrt((level * (1 - level)) / n));
    }
    expect(Math.abs(mean(values, (x) => (x > 0 ? 1 : 0)) - 0.5)).toBeLessThan(2 / Math.sqrt(n));
  });
});

describe("nextStudentScale", () => {
  it.each([0.4, 1, 2, 2.5, 5, 21, 54.3, 1_000])(
    "makes normal draws those of Student's t with %d degrees of freedom",
    (dof) => {
      const n = 100_000;
      const stream = streamOf(5, `t ${dof}`);
      const normal = new Float64Array(1);
      const values = Float64Array.from({ length: n }, () => {
        fillNormals(stream, normal);
        return nextStudentScale(stream, dof) * normal[0]!;
      });
      // The factor that the engine takes from the incomplete beta function is an independent oracle of the draws.
      for (const level of [0.5, 0.9, 0.95, 0.99]) {
        const factor = studentFactor(level, dof);
        const beyond = mean(values, (x) => (Math.abs(x) > factor ? 1 : 0));
        expect(Math.abs(beyond - (1 - level))).toBeLessThan(4 * Math.sqrt((level * (1 - level)) / n));
      }
    },
  );

  it("has w = ν/scale² with the mean ν and the variance 2ν of chi-square", () => {
    const n = 200_000;
    for (const dof of [0.7, 3, 8.5]) {
      const stream = streamOf(9, `w ${dof}`);
      const w = Float64Array.from({ length: n }, () => dof / nextStudentScale(stream, dof) ** 2);
      expect(Math.abs(mean(w, (x) => x) - dof)).toBeLessThan(4 * Math.sqrt((2 * dof) / n));
      // Fourth central moment of chi-square: 12·ν·(ν + 4).
      const spread = Math.sqrt((12 * dof * (dof + 4) - 4 * dof * dof) / n);
      expect(Math.abs(mean(w, (x) => (x - dof) ** 2) - 2 * dof)).toBeLessThan(4 * spread);
    }
  });

  it("is 1 where the scale is known, and never NaN however small the degrees of freedom", () => {
    const stream = streamOf(1, "known");
    expect(nextStudentScale(stream, null)).toBe(1);
    expect(nextStudentScale(stream, 1e300)).toBe(1);
    for (let k = 0; k < 1_000; k++) expect(nextStudentScale(stream, 1e-6)).toBeGreaterThan(0);
  });
});
