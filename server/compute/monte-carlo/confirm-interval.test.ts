import { describe, expect, it } from "vitest";
import { confirmInterval, type FirstOrder, type TrialRules } from "./confirm-interval.ts";
import { fillNormals } from "./random-draws.ts";
import { nextUniform, streamOf } from "./wichmann-hill.ts";

const rules = (rest: Partial<TrialRules> = {}): TrialRules => ({
  level: 0.95,
  digits: null,
  unit: 1,
  dof: null,
  rounding: 0,
  ...rest,
});
/** First order with the normal factor at 0.95. */
const first = (value: number, standard: number): FirstOrder => ({
  value,
  standard,
  expanded: 1.959963984540054 * standard,
});

/** The draws of one quantity each: normal(mean, sd), or rectangular from a to b. */
const normal = (mean: number, sd: number, n: number, name: string) => {
  const values = new Float64Array(n);
  fillNormals(streamOf(101, name), values);
  return values.map((value) => mean + sd * value);
};
const rectangular = (a: number, b: number, n: number, name: string) => {
  const stream = streamOf(101, name);
  return Float64Array.from({ length: n }, () => a + (b - a) * nextUniform(stream));
};
const combine = (inputs: readonly Float64Array[], model: (...x: number[]) => number) =>
  inputs[0]!.map((_, t) => model(...inputs.map((input) => input[t]!)));
const sum = (...x: number[]) => x.reduce((total, value) => total + value, 0);
const root3 = Math.sqrt(3);

describe("the propagation of distributions in the examples of JCGM 101:2008, clause 9 (figures from memory)", () => {
  it("9.2.2: four normal quantities add up to 0, u 2.00, [−3.92, 3.92], and first order is confirmed", () => {
    const n = 1_000_000;
    const y = combine(
      ["a", "b", "c", "d"].map((name) => normal(0, 1, n, name)),
      sum,
    );
    const found = confirmInterval(y, 0, first(0, 2), rules({ digits: 2 }));
    expect(found.tolerance).toBe(0.05);
    expect(Math.abs(found.mean!)).toBeLessThan(4 * (2 / Math.sqrt(n)));
    expect(Math.abs(found.standard! - 2)).toBeLessThan(0.005);
    // 0.005 of printing, and twice what the ends may be off by.
    for (const [end, printed] of [
      [found.interval!.low, -3.92],
      [found.interval!.high, 3.92],
    ] as const) {
      expect(Math.abs(end - printed)).toBeLessThan(0.005 + 2 * found.sampling!.low);
    }
    expect(found.sampling!.low).toBeLessThan(0.012);
    expect(found.confirmed).toBe(true);
  });

  it("9.2.3: four rectangular ones give [−3.88, 3.88]: confirmed for two digits (δ 0.05), not for three (δ 0.005)", () => {
    const n = 2_000_000;
    const y = new Float64Array(n);
    for (const name of ["a", "b", "c", "d"]) {
      const draws = rectangular(-root3, root3, n, name);
      for (let t = 0; t < n; t++) y[t]! += draws[t]!;
    }
    const two = confirmInterval(y, 0, first(0, 2), rules({ digits: 2 }));
    expect(Math.abs(two.standard! - 2)).toBeLessThan(0.005);
    expect(Math.abs(two.interval!.low + 3.88)).toBeLessThan(0.005 + two.sampling!.low);
    expect(Math.abs(two.interval!.high - 3.88)).toBeLessThan(0.005 + two.sampling!.high);
    expect(Math.abs(two.difference!.low - 0.04)).toBeLessThan(0.005 + two.sampling!.low);
    expect(two.confirmed).toBe(true);
    const three = confirmInterval(y, 0, first(0, 2), rules({ digits: 3 }));
    expect(three.tolerance).toBe(0.005);
    expect(three.confirmed).toBe(false);
  });

  it("9.2.4: one rectangular quantity ten times as wide gives [−17.0, 17.0], far inside ±19.9 of first order", () => {
    const n = 500_000;
    const y = combine(
      [
        ...["a", "b", "c"].map((name) => rectangular(-root3, root3, n, name)),
        rectangular(-10 * root3, 10 * root3, n, "d"),
      ],
      sum,
    );
    const found = confirmInterval(y, 0, first(0, Math.sqrt(103)), rules({ digits: 2 }));
    expect(Math.abs(found.standard! - 10.1)).toBeLessThan(0.06);
    expect(Math.abs(found.interval!.low + 17)).toBeLessThan(0.05 + 2 * found.sampling!.low);
    expect(Math.abs(found.interval!.high - 17)).toBeLessThan(0.05 + 2 * found.sampling!.high);
    expect(found.tolerance).toBe(0.5);
    expect(found.confirmed).toBe(false);
  });

  it("9.3: mass calibration has 1.2341 mg, u 0.0754 mg, and first order (u 0.0539 mg) is not confirmed", () => {
    const n = 500_000;
    const y = combine(
      [
        normal(100_000, 0.05, n, "reference"),
        normal(1.234, 0.02, n, "added"),
        rectangular(1.1, 1.3, n, "air"),
        rectangular(7_000, 9_000, n, "weight"),
        rectangular(7_950, 8_050, n, "standard"),
      ],
      (reference, added, air, weight, standard) =>
        (reference + added) * (1 + (air - 1.2) * (1 / weight - 1 / standard)) - 100_000,
    );
    const found = confirmInterval(y, 0, first(1.234, 0.0539), rules({ digits: 1 }));
    expect(Math.abs(found.mean! - 1.2341)).toBeLessThan(0.00005 + (4 * 0.0754) / Math.sqrt(n));
    expect(Math.abs(found.standard! - 0.0754)).toBeLessThan(0.00005 + 0.0003);
    expect(found.tolerance).toBe(0.005);
    expect(found.confirmed).toBe(false);
  });

  it("9.4.2: a loss of two squares has mean and u of 50·10⁻⁶ where first order says that it is known exactly", () => {
    const n = 300_000;
    const y = combine([normal(0, 0.005, n, "x"), normal(0, 0.005, n, "y")], (a, b) => a * a + b * b);
    const found = confirmInterval(y, 0, first(0, 0), rules({ rounding: 1e-18 }));
    expect(Math.abs(found.mean! - 50e-6)).toBeLessThan((4 * 50e-6) / Math.sqrt(n));
    expect(Math.abs(found.standard! - 50e-6)).toBeLessThan((4 * 50e-6 * Math.sqrt(2)) / Math.sqrt(n));
    // An exponential distribution of mean 2σ²: its quantiles are −2σ²·ln(1 − p).
    expect(Math.abs(found.interval!.low + 50e-6 * Math.log(0.975))).toBeLessThan(2 * found.sampling!.low);
    expect(Math.abs(found.interval!.high + 50e-6 * Math.log(0.025))).toBeLessThan(2 * found.sampling!.high);
    expect(found).toMatchObject({ tolerance: 0, confirmed: false });
  });
});

describe("confirmInterval", () => {
  it("leaves open what few trials cannot tell, and tells how far they may be off", () => {
    const few = confirmInterval(normal(0, 9, 1_000, "few"), 0, first(0, 9), rules({ digits: 2 }));
    expect(few.confirmed).toBeNull();
    expect(few.sampling!.low).toBeGreaterThan(few.tolerance);
    // What lies far off is told by few as well.
    const off = confirmInterval(normal(0, 1, 1_000, "few"), 0, first(0, 9), rules({ digits: 2 }));
    expect(off.confirmed).toBe(false);
  });

  it("holds the true ends within its sampling 95 times of 100", () => {
    let held = 0;
    const rounds = 2_000;
    for (let k = 0; k < rounds; k++) {
      const found = confirmInterval(normal(0, 1, 1_000, `round ${k}`), 0, first(0, 1), rules());
      if (Math.abs(found.interval!.low + 1.959964) <= found.sampling!.low) held++;
    }
    expect(held / rounds).toBeGreaterThan(0.94);
  });

  it("lets a trial that failed have fallen anywhere", () => {
    const values = () => normal(0, 1, 100_000, "failing");
    const whole = confirmInterval(values(), 0, first(0, 1), rules());
    const some = confirmInterval(values(), 200, first(0, 1), rules());
    const many = confirmInterval(values(), 5_000, first(0, 1), rules());
    expect(whole.confirmed).toBe(true);
    expect(some.sampling!.low).toBeGreaterThan(whole.sampling!.low);
    expect(some.interval).toEqual(whole.interval);
    expect(many).toMatchObject({ sampling: null, confirmed: null });
  });

  it("names no moment that the distribution has not", () => {
    const values = () => normal(0, 1, 1_000, "moments");
    expect(confirmInterval(values(), 0, first(0, 1), rules({ dof: 1 }))).toMatchObject({
      mean: null,
      standard: null,
    });
    const two = confirmInterval(values(), 0, first(0, 1), rules({ dof: 2 }));
    expect(two.mean).not.toBeNull();
    expect(two.standard).toBeNull();
  });

  it("makes something of no trial, of one, and of wild ones", () => {
    const none = confirmInterval(new Float64Array(0), 1_000, first(0, 1), rules());
    expect(none).toMatchObject({ mean: null, standard: null, interval: null, confirmed: null });
    const one = confirmInterval(Float64Array.of(3), 999, first(0, 1), rules());
    expect(one).toMatchObject({ mean: 3, standard: null, interval: null, confirmed: null });
    const wild = confirmInterval(
      Float64Array.from({ length: 1_000 }, (_, k) => (k % 2 ? 1e300 : -1e300)),
      0,
      first(0, 1),
      rules(),
    );
    expect(wild).toMatchObject({ standard: null, confirmed: false });
  });

  it("confirms an exact value that trials move by rounding only", () => {
    const values = Float64Array.from({ length: 1_000 }, (_, k) => (k % 3) * 1e-18);
    expect(confirmInterval(values, 0, first(0, 0), rules({ rounding: 1e-17 })).confirmed).toBe(true);
  });
});
