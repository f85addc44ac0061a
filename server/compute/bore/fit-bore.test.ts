import { Matrix, inverse } from "ml-matrix";
import { describe, expect, it } from "vitest";
import {
  clockAngles,
  gaugeInput,
  onRing,
  pointsInput,
  targetInput,
  wireInput,
} from "../../../tests/support/bore-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { BoreInput } from "./bore-input.ts";
import { factorCholesky, invertCholesky, solveCholesky } from "./cholesky.ts";
import { clockDirection } from "./clock-direction.ts";
import { fitBore, fitPreparedBore, prepareBore } from "./fit-bore.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const ring = clockAngles(12, 5).map((t, i) => ({
  ...onRing({ hMm: 1, vMm: 2 }, 200, t, i === 3 ? 0.3 : 0.01 * Math.cos(5 * i)),
  zMm: i % 2 ? 40 : -40,
  uMm: 0.01,
}));
const readings = clockAngles(8).map((clockDeg) => ({
  clockDeg,
  readingMm: 0.1 * Math.cos(clockDeg),
  uMm: null,
}));
const inputs: Record<string, BoreInput> = {
  points: pointsInput(ring, { outliers: { threshold: 3.5 }, taper: { form: "estimate" }, seen: "upstream" }),
  turned_gauge: gaugeInput({ readings, outliers: { threshold: 3.5 }, seen: "upstream" }),
  rotating_target: targetInput({
    spots: readings.map(({ clockDeg }) => ({ clockDeg, hMm: 0.1, vMm: 0.2, uMm: 0.1 })),
  }),
  wire: wireInput({ topMm: 200.1, readingUncertaintyMm: 0.01, seen: "upstream" }),
};

function frozen<Value>(value: Value): Value {
  if (typeof value === "object" && value !== null) Object.values(Object.freeze(value)).forEach(frozen);
  return value;
}
const fit = fitBore as (input: BoreInput) => ReturnType<typeof fitPreparedBore>;

describe("fitBore", () => {
  it.each(Object.keys(inputs))("changes nothing of what it is given: %s", (form) => {
    const input = inputs[form]!;
    const before = structuredClone(input);
    const answer = fit(frozen(structuredClone(input)));
    fit(input);
    expect(input).toEqual(before);
    expect(answer.form).toBe(form);
  });

  it.each(Object.keys(inputs))(
    "gives the same answer again, to the last bit, and by way of preparing: %s",
    (form) => {
      const input = inputs[form]!;
      const first = JSON.stringify(fit(input));
      expect(JSON.stringify(fit(structuredClone(input)))).toBe(first);
      expect(JSON.stringify(fitPreparedBore(prepareBore(input)))).toBe(first);
    },
  );

  it("compares the diameter with the nominal one: 5 % apart warns, less does not, nor does an unknown one", () => {
    const at = (nominalDiameterMm: number | null) =>
      fitBore(pointsInput(ring, { nominalDiameterMm, taper: { form: "estimate" } })).warnings.map(
        ({ code }) => code,
      );
    const warning = "diameter_far_from_nominal";
    expect([418, 383, null].map((nominal) => at(nominal).includes(warning))).toEqual([false, false, false]);
    expect([422, 379, 200].map((nominal) => at(nominal).includes(warning))).toEqual([true, true, true]);
    const gauge = fitBore(
      gaugeInput({ readings: readings.map((r) => ({ ...r, readingMm: 80 })), zero: "arbitrary" }),
    );
    expect(gauge.warnings).toEqual([]);
  });

  it("states roundness as peak to valley, rms over n, and what it was made from", () => {
    const { residualsMm, roundnessMm, statistics } = fitBore(
      pointsInput(ring.map((point) => ({ ...point, zMm: null, uMm: null }))),
    );
    near(roundnessMm, Math.max(...residualsMm) - Math.min(...residualsMm), 1e-15);
    near(statistics.rmsMm, Math.sqrt(residualsMm.reduce((sum, r) => sum + r * r, 0) / 12), 1e-15);
    near(
      residualsMm.reduce((sum, r) => sum + r, 0),
      0,
      1e-12,
    );
    expect(statistics).toMatchObject({ readingsUsed: 12, parameters: 3 });
  });
});

describe("clockDirection", () => {
  it("is exact at quarter turns, whole turns apart and below zero", () => {
    const wanted = [
      [0, 1],
      [1, 0],
      [0, -1],
      [-1, 0],
    ];
    for (const turns of [-720, -360, 0, 360]) {
      wanted.forEach(([h, v], quarter) => {
        const direction = clockDirection(quarter * 90 + turns);
        expect([direction.h + 0, direction.v + 0]).toEqual([h, v]);
      });
    }
  });

  it("is (sin, cos) of the angle elsewhere", () => {
    for (const deg of clockAngles(145, -360, 720)) {
      const { h, v } = clockDirection(deg);
      near(h, Math.sin((deg * Math.PI) / 180), 2e-15);
      near(v, Math.cos((deg * Math.PI) / 180), 2e-15);
    }
  });
});

describe("factorCholesky", () => {
  const random = seededRandom(77);
  const spread = [1e-6, 1, 1e5, 1e-3];
  const rows = Array.from({ length: 9 }, () => spread.map((scale) => scale * random.normal()));
  const wanted = new Matrix(rows).transpose().mmul(new Matrix(rows));

  it("solves and inverts as ml-matrix does, whatever the scale of rows and columns", () => {
    const factor = new Float64Array(16);
    expect(factorCholesky(Float64Array.from(wanted.to1DArray()), 4, factor, 1e-13)).toBe(true);
    const inverted = invertCholesky(factor, 4);
    const product = new Matrix([0, 1, 2, 3].map((i) => Array.from(inverted.slice(4 * i, 4 * i + 4)))).mmul(
      wanted,
    );
    const unscaled = (i: number, j: number) => product.get(i, j) * (spread[i]! / spread[j]!);
    for (const i of [0, 1, 2, 3]) for (const j of [0, 1, 2, 3]) near(unscaled(i, j), i === j ? 1 : 0, 1e-12);
    inverse(wanted)
      .to1DArray()
      .forEach((entry, k) => near(inverted[k]! / entry, 1, 1e-6));
    const solution = new Float64Array(4);
    solveCholesky(factor, 4, Float64Array.from(wanted.getColumn(2)), solution);
    solution.forEach((entry, k) => near(entry * (spread[k]! / spread[2]!), k === 2 ? 1 : 0, 1e-12));
  });

  it("refuses what is singular or indefinite, at any scale", () => {
    const refused = (matrix: number[], size: number) =>
      !factorCholesky(Float64Array.from(matrix), size, new Float64Array(size * size), 1e-13);
    expect(refused([1, 1, 1, 1], 2)).toBe(true);
    expect(refused([1e-30, 1e-30, 1e-30, 1e-30], 2)).toBe(true);
    expect(refused([1, 2, 2, 1], 2)).toBe(true);
    expect(refused([0], 1)).toBe(true);
    expect(refused([NaN], 1)).toBe(true);
    expect(refused([1e-30, 0, 0, 1e30], 2)).toBe(false);
  });
});
