import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { TrialSummary } from "../monte-carlo/confirm-interval.ts";
import type { AxisInput, AxisStation } from "./axis-input.ts";
import { runAxisTrials } from "./axis-trials.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";

const plan = { trials: 40_000, seed: 5, digits: null, unitMm: 1 };

function station(zMm: number, rest: Partial<AxisStation> = {}): AxisStation {
  return {
    zMm,
    centre: { hMm: 0.05 * Math.sin(zMm), vMm: 0.04 * Math.cos(zMm) },
    covariance: { hhMm2: 2.5e-5, hvMm2: 8e-6, vvMm2: 4e-5 },
    dof: null,
    target: { hMm: 0, vMm: -0.1 },
    targetUncertainty: { hMm: 0, vMm: 0.004 },
    tolerance: null,
    ...rest,
  };
}
const line = (rest: Partial<AxisStation> = {}) => [0, 700, 1_500, 2_900, 4_000].map((z) => station(z, rest));
const input = (rest: Partial<AxisInput> = {}): AxisInput => ({
  method: "least_squares",
  reference: [0, 2, 4],
  stations: line(),
  level: 0.95,
  rule: "guarded",
  ...rest,
});
const namesOf = ({ stations }: AxisInput) => stations.map(({ zMm }) => `at ${zMm}`);
function tried(asked: AxisInput, rest: Partial<typeof plan> = {}) {
  const found = deviationsFromAxis(asked);
  return { found, ...runAxisTrials(asked, found, namesOf(asked), { ...plan, ...rest }) };
}

function expectMoments({ mean, standard }: TrialSummary, value: number, variance: number) {
  expect(Math.abs(mean! - value)).toBeLessThan(4 * Math.sqrt(variance / plan.trials) + 1e-15);
  expect(Math.abs(standard! - Math.sqrt(variance))).toBeLessThan(
    4 * Math.sqrt(variance / (2 * plan.trials)) + 1e-15,
  );
}

describe("runAxisTrials", () => {
  it.each([
    ["least_squares", [0, 2, 4]],
    ["least_squares", [0, 1, 2, 3, 4]],
    ["two_station", [0, 4]],
    ["line_of_sight", []],
  ] as const)("finds the covariances of %s through %j again, and confirms them", (method, reference) => {
    const { found, stations, failures } = tried(input({ method, reference }));
    found.stations.forEach(({ deviation, covariance }, index) => {
      const { h, v } = stations[index]!;
      expectMoments(h, deviation.hMm, covariance!.hhMm2);
      expectMoments(v, deviation.vMm, covariance!.vvMm2);
      expect(h.confirmed).not.toBe(false);
      expect(v.confirmed).not.toBe(false);
    });
    expect(failures.size).toBe(0);
  });

  it("answers a reference station of two exactly, as it lies on the axis whatever was read", () => {
    const { stations } = tried(input({ method: "two_station", reference: [0, 4] }));
    for (const index of [0, 4]) {
      for (const one of [stations[index]!.h, stations[index]!.v]) {
        expect(one.tolerance).toBe(0);
        expect(one.confirmed).toBe(true);
        expect(Math.abs(one.standard!)).toBeLessThan(1e-15); // mm
      }
    }
  });

  it("draws from Student's t where the centre has few degrees of freedom: its interval is exact then", () => {
    const exact = { targetUncertainty: { hMm: 0, vMm: 0 }, dof: 3 };
    const { found, stations } = tried(
      input({ method: "line_of_sight", reference: [], stations: line(exact) }),
    );
    found.stations.forEach(({ deviation, expandedUncertainty }, index) => {
      const { h, v } = stations[index]!;
      const within = ({ interval, sampling }: TrialSummary, value: number, expanded: number) => {
        expect(Math.abs(interval!.low - value + expanded)).toBeLessThan(2 * sampling!.low);
        expect(Math.abs(interval!.high - value - expanded)).toBeLessThan(2 * sampling!.high);
      };
      within(h, deviation.hMm, expandedUncertainty!.hMm);
      within(v, deviation.vMm, expandedUncertainty!.vMm);
      expect(h.confirmed).not.toBe(false);
    });
  });

  it("does not confirm Welch and Satterthwaite's formula where both ends have two degrees of freedom", () => {
    const { stations } = tried(
      input({ method: "two_station", reference: [0, 4], stations: line({ dof: 2 }) }),
    );
    // t with 2 degrees of freedom has tails that no sum of three shares with a t of some six.
    expect(stations[2]!.h.confirmed).toBe(false);
    expect(stations[2]!.h.standard).toBeNull();
  });

  it("draws one scatter for all stations of a plane where nothing is stated", () => {
    const bare = input({ reference: [0, 1, 2, 3, 4], stations: line({ covariance: null }) });
    const { found, stations } = tried(bare);
    expect(found.axis.dof).toBe(3);
    found.stations.forEach(({ deviation, expandedUncertainty }, index) => {
      const { interval, sampling, confirmed } = stations[index]!.h;
      const { hMm } = expandedUncertainty!;
      expect(Math.abs(interval!.high - deviation.hMm - hMm)).toBeLessThan(2 * sampling!.high);
      expect(confirmed).not.toBe(false);
    });
  });

  it.each([
    ["minimum_zone", "planes"],
    ["minimum_zone", "cylinder"],
    ["least_absolute", "planes"],
    ["least_absolute", "cylinder"],
  ] as const)("agrees with brute force over the whole call for %s by %s", (method, zone) => {
    const exact = { targetUncertainty: { hMm: 0, vMm: 0 } };
    const asked = input({ method, zone, reference: [0, 1, 2, 3, 4], stations: line(exact) });
    const trials = 500;
    const { stations } = tried(asked, { trials });
    const random = seededRandom(17);
    const again = Float64Array.from({ length: trials }, () => {
      const drawn = asked.stations.map((one) => {
        const [a, b] = [random.normal(), random.normal()];
        const hh = Math.sqrt(2.5e-5);
        const { hMm, vMm } = one.centre;
        const vMore = (8e-6 / hh) * a + Math.sqrt(4e-5 - 8e-6 ** 2 / 2.5e-5) * b;
        return { ...one, centre: { hMm: hMm + hh * a, vMm: vMm + vMore } };
      });
      return deviationsFromAxis({ ...asked, stations: drawn }).stations[1]!.deviation.vMm;
    });
    const mean = again.reduce((sum, value) => sum + value, 0) / trials;
    const spread = Math.sqrt(again.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (trials - 1));
    const { v } = stations[1]!;
    expect(Math.abs(v.mean! - mean)).toBeLessThan(4 * spread * Math.sqrt(2 / trials));
    expect(Math.abs(v.standard! / spread - 1)).toBeLessThan(4 / Math.sqrt(trials));
  });

  it("knows nothing of a station without an uncertainty, nor of any where a reference station may be another contact", () => {
    const some = line().map((one, index) => (index === 1 ? { ...one, covariance: null } : one));
    const { stations } = tried(input({ stations: some }), { trials: 1_000 });
    expect(stations.map((one) => one !== null)).toEqual([true, false, true, true, true]);
    const zone = input({ method: "minimum_zone", reference: [0, 1, 2, 4], stations: some });
    expect(tried(zone, { trials: 1_000 }).stations.every((one) => one === null)).toBe(true);
  });

  it("gives each station the same numbers in any order, and others for another seed", () => {
    const asked = input({ stations: line({ dof: 7 }) });
    const order = [3, 0, 4, 2, 1];
    const other = {
      ...asked,
      stations: order.map((index) => asked.stations[index]!),
      reference: asked.reference.map((index) => order.indexOf(index)),
    };
    const first = tried(asked, { trials: 2_000 }).stations;
    const second = tried(other, { trials: 2_000 }).stations;
    expect(order.map((index) => first[index])).toEqual(second);
    const reseeded = tried(asked, { trials: 2_000, seed: 6 }).stations;
    expect(reseeded[0]!.h.mean).not.toBe(first[0]!.h.mean);
  });

  it("takes a covariance of full correlation and one of no variance", () => {
    const correlated = { hhMm2: 1e-6, hvMm2: 1e-6, vvMm2: 1e-6 };
    const none = { hhMm2: 0, hvMm2: 0, vvMm2: 1e-6 };
    const stations = line({ covariance: correlated }).map((one, index) =>
      index === 3 ? { ...one, covariance: none } : one,
    );
    const { found, stations: answered } = tried(input({ method: "line_of_sight", reference: [], stations }));
    expectMoments(answered[0]!.v, found.stations[0]!.deviation.vMm, 1e-6 + 1.6e-5);
    expect(answered[3]!.h).toMatchObject({ tolerance: 0, confirmed: true });
    expectMoments(answered[3]!.v, found.stations[3]!.deviation.vMm, 1e-6 + 1.6e-5);
  });
});
