import { describe, expect, it } from "vitest";
import { welchSatterthwaite } from "./welch-satterthwaite.ts";

describe("welchSatterthwaite", () => {
  it("gives the end gauge of the GUM 16.7 effective degrees of freedom", () => {
    // JCGM 100:2008 H.1: components in nm and their degrees of freedom; 16.7 from memory of H.1.6
    const components = [25, 5.8, 3.9, 6.7, 2.88679, 16.599];
    const dof = welchSatterthwaite(
      components.map((u) => u ** 2),
      [18, 24, 5, 8, 50, 2],
    );
    expect(Math.abs(dof! - 16.75)).toBeLessThan(0.05);
  });

  it("adds the degrees of freedom of equal variances, and keeps those of a single one", () => {
    expect(Math.abs(welchSatterthwaite([3e-6, 3e-6], [7, 7])! - 14)).toBeLessThan(1e-12);
    expect(Math.abs(welchSatterthwaite([3e-6], [7])! - 7)).toBeLessThan(1e-12);
  });

  it("is infinite, null, where nothing finite counts", () => {
    expect(welchSatterthwaite([1], [Infinity])).toBeNull();
    expect(welchSatterthwaite([0], [3])).toBeNull();
    expect(welchSatterthwaite([1, 0], [Infinity, 3])).toBeNull();
    expect(welchSatterthwaite([], [])).toBeNull();
  });

  it("does not depend on the unit of the variances, down to the smallest", () => {
    const at = (scale: number) => welchSatterthwaite([2 * scale, scale], [3, Infinity])!;
    for (const scale of [1e-300, 1e-30, 1e200]) expect(Math.abs(at(scale) / at(1) - 1)).toBeLessThan(1e-14);
  });
});
