import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput, targetInput } from "../../../tests/support/bore-inputs.ts";
import type { BoreFit } from "./bore-fit.ts";
import { fitBore } from "./fit-bore.ts";
import { requireFiniteFit } from "./require-finite-fit.ts";

const points = clockAngles(9, 10, 300).map((t, i) => ({
  ...onRing({ hMm: 3, vMm: 1 }, 100, t, i === 4 ? 0.4 : 0.001 * Math.cos(2 * i)),
  zMm: [0, 50, 90][i % 3]!,
}));
const spots = clockAngles(5).map((clockDeg) => ({ clockDeg, hMm: Math.sin(clockDeg), vMm: 0.2, uMm: null }));

/** Between them these have every number that a fit can hold. */
const fits: readonly BoreFit[] = [
  fitBore(pointsInput(points, { readingUncertaintyMm: 0.001, outliers: { threshold: 3.5 } })),
  fitBore(pointsInput(points, { taper: { form: "estimate" } })),
  fitBore(targetInput({ spots, readingUncertaintyMm: 0.01 })),
];

/** The paths of all numbers in a value. */
function numbersIn(value: unknown, path: readonly string[] = []): string[][] {
  if (typeof value === "number") return [[...path]];
  if (typeof value !== "object" || value === null) return [];
  return Object.entries(value).flatMap(([name, inner]) => numbersIn(inner, [...path, name]));
}

function withNumber(value: unknown, [name, ...rest]: readonly string[], number: number): unknown {
  if (name === undefined) return number;
  const copy = structuredClone(value) as Record<string, unknown>;
  copy[name] = withNumber(copy[name], rest, number);
  return copy;
}

describe("requireFiniteFit", () => {
  it("hands on a sound fit as it is", () => {
    for (const fit of fits) expect(requireFiniteFit(fit)).toBe(fit);
    expect(fits[0]!.form === "points" && fits[0]!.exclusions.length).toBeGreaterThan(0);
  });

  it("refuses a fit with any one number that is not finite, wherever it stands", () => {
    for (const fit of fits) {
      const paths = numbersIn(fit);
      expect(paths.length).toBeGreaterThan(20);
      // The index of an exclusion is a place in a list, not a result.
      for (const path of paths.filter((one) => one.at(-1) !== "index")) {
        for (const broken of [NaN, Infinity, -Infinity]) {
          const spoilt = withNumber(fit, path, broken) as typeof fit;
          expect(() => requireFiniteFit(spoilt), path.join(".")).toThrow(
            expect.objectContaining({ code: "result_overflow" }),
          );
        }
      }
    }
  });

  it("is not misled by finite numbers whose sum overflows", () => {
    const fit = fits[0]!;
    const large = withNumber(
      withNumber(fit, ["centre", "hMm"], 1e308),
      ["centre", "vMm"],
      1e308,
    ) as typeof fit;
    expect(requireFiniteFit(large)).toBe(large);
  });
});
