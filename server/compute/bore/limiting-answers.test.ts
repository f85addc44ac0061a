import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  clockAngles,
  gaugeInput,
  onRing,
  pairsInput,
  pointsInput,
  wallPoint,
} from "../../../tests/support/bore-inputs.ts";
import { centreOf, codesOf, fitOrCode, fitPairs } from "../../../tests/support/criterion-inputs.ts";
import { extremesAt, type Pair } from "../../../tests/support/limiting-oracles.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { WallPoint } from "./bore-input.ts";
import { fitByCriterion, type CriterionMethod } from "./fit-criterion.ts";
import { fitBore } from "./fit-bore.ts";

const limiting = ["minimum_zone", "maximum_inscribed", "minimum_circumscribed"] as const;
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const origin = { hMm: 0, vMm: 0 };
const ringOf = (count: number, fromDeg: number, overDeg: number, off: (i: number) => number) =>
  clockAngles(count, fromDeg, overDeg).map((clockDeg, i) => onRing(origin, 100, clockDeg, off(i)));
const wave = (i: number) => 0.03 * Math.cos(5 * i * i);

describe("the contacts of a limiting circle", () => {
  it("are the points of the closed forms", () => {
    // By hand: 3-4-5 triangles on a circle of radius 5, two points inside.
    const pythagorean: Pair[] = [
      [3, 4],
      [-3, 4],
      [5, 0],
      [-4, -3],
      [0, 4],
      [1, 1],
    ];
    const round = fitByCriterion(pairsInput(pythagorean), "minimum_circumscribed");
    expect(round.contacts).toEqual([0, 1, 2, 3]);
    near(round.diameterMm!, 10, 1e-14);
    // By symmetry: alternately outside and inside by 0.05 of a radius of 120.
    const alternating = clockAngles(12).map((deg, i) =>
      onRing({ hMm: 3, vMm: 4 }, 120, deg, i % 2 ? -0.05 : 0.05),
    );
    const outer = [0, 2, 4, 6, 8, 10];
    const inner = outer.map((i) => i + 1);
    const zone = fitByCriterion(pointsInput(alternating), "minimum_zone");
    expect(zone.contacts).toEqual(clockAngles(12).map((_, i) => i));
    near(zone.roundnessMm, 0.1, 1e-12);
    near(zone.diameterMm!, 240, 1e-12);
    near(zone.centre.hMm, 3, 1e-12);
    near(zone.centre.vMm, 4, 1e-12);
    expect(fitByCriterion(pointsInput(alternating), "minimum_circumscribed").contacts).toEqual(outer);
    expect(fitByCriterion(pointsInput(alternating), "maximum_inscribed").contacts).toEqual(inner);
  });

  it.each(limiting)("are all points on it and no others: %s", (method) => {
    for (let k = 0; k < 30; k++) {
      const random = seededRandom(k + 1);
      const points = ringOf(30, 0, 360, () => 0.05 * random.normal());
      const fit = fitByCriterion(pointsInput(points), method);
      const { least, most } = extremesAt(
        points.map(({ hMm, vMm }) => [hMm, vMm]),
        centreOf(fit),
      );
      const on = points.flatMap(({ hMm, vMm }, i) => {
        const d = Math.hypot(hMm - fit.centre.hMm, vMm - fit.centre.vMm);
        const [outer, inner] = [most - d <= 1e-9 * most, d - least <= 1e-9 * least];
        return (outer && method !== "maximum_inscribed") || (inner && method !== "minimum_circumscribed")
          ? [i]
          : [];
      });
      expect(fit.contacts).toEqual(on);
      expect(on.length).toBeGreaterThanOrEqual(method === "minimum_zone" ? 4 : 2);
    }
  });
});

describe("the limit of a contact", () => {
  it("is 1e-9 of the radius from the circle", () => {
    const at = (share: number) => {
      const ring = [0, 120, 240].map((clockDeg) => onRing(origin, 100, clockDeg));
      const points = [...ring, onRing(origin, 100, 60, 100 * share)];
      const method = share < 0 ? "minimum_circumscribed" : "maximum_inscribed";
      return fitByCriterion(pointsInput(points), method).contacts;
    };
    for (const sign of [1, -1]) {
      expect(at(sign * 0.9e-9)).toEqual([0, 1, 2, 3]);
      expect(at(sign * 1.1e-9)).toEqual([0, 1, 2]);
    }
  });
});

/** Clear contacts, so that small errors leave them the contacts. */
const clearly: Record<(typeof limiting)[number], readonly number[]> = {
  minimum_zone: [0.2, 0, -0.2, 0, 0, 0.2, 0, -0.2, 0, 0],
  maximum_inscribed: [-0.2, 0, 0, -0.2, 0, 0, 0, -0.2, 0, 0],
  minimum_circumscribed: [0.2, 0, 0, 0.2, 0, 0, 0, 0.2, 0, 0],
};

describe("the covariance of a limiting circle", () => {
  const draws = 3000;
  /** A sample variance of normal numbers has a relative standard deviation of √(2/draws). */
  const within = 4 * Math.sqrt(2 / draws);
  const variance = (values: readonly number[], others = values) => {
    const mean = (list: readonly number[]) => list.reduce((sum, value) => sum + value, 0) / list.length;
    const [one, other] = [mean(values), mean(others)];
    return values.reduce((sum, value, i) => sum + (value - one) * (others[i]! - other), 0) / (draws - 1);
  };

  it.each(limiting)("is the scatter of the circle read again and again: %s", (method) => {
    const points = ringOf(10, 7, 360, (i) => clearly[method][i]!).map((point, i) => ({
      ...point,
      uMm: 0.001 * (1 + (i % 3)),
    }));
    const random = seededRandom(9);
    const stated = fitByCriterion(pointsInput(points), method);
    const again = Array.from({ length: draws }, () =>
      fitByCriterion(
        pointsInput(
          points.map((point) => {
            const share = 1 + (point.uMm * random.normal()) / Math.hypot(point.hMm, point.vMm);
            return { ...point, hMm: point.hMm * share, vMm: point.vMm * share };
          }),
        ),
        method,
      ),
    );
    const { hhMm2, hvMm2, vvMm2 } = stated.covariance!;
    const h = again.map(({ centre }) => centre.hMm);
    const v = again.map(({ centre }) => centre.vMm);
    near(variance(h) / hhMm2, 1, within);
    near(variance(v) / vvMm2, 1, within);
    near(variance(h, v), hvMm2, within * Math.sqrt(hhMm2 * vvMm2));
    const { diameterMm, factor, dof } = stated.expandedUncertainty!;
    near(variance(again.map((fit) => fit.diameterMm!)) / (diameterMm! / factor) ** 2, 1, within);
    expect(dof).toBeNull();
    // Normal quantile of 0.975, Abramowitz & Stegun, table 26.5.
    near(factor, 1.959964, 1e-6);
  });

  it("of a circumscribed circle on two points is that of the middle between them", () => {
    const points = [
      wallPoint(-10, 0, { uMm: 0.03 }),
      wallPoint(10, 0, { uMm: 0.04 }),
      wallPoint(0, 5, { uMm: 9 }),
    ];
    const fit = fitByCriterion(pointsInput(points), "minimum_circumscribed");
    expect(fit.contacts).toEqual([0, 1]);
    // By hand: ((0.03² + 0.04²)/4).
    near(fit.covariance!.hhMm2, 0.000625, 1e-15);
    near(fit.covariance!.vvMm2, 0.000625, 1e-15);
    near(fit.covariance!.hvMm2, 0, 1e-15);
  });

  it.each(limiting)("is null where no uncertainty is stated, and weights nothing: %s", (method) => {
    const points = ringOf(12, 0, 360, wave);
    const bare = fitByCriterion(pointsInput(points), method);
    expect([bare.covariance, bare.expandedUncertainty]).toEqual([null, null]);
    expect([bare.statistics.chiSquare, bare.statistics.varianceInflation]).toEqual([null, null]);
    const stated = pointsInput(points.map((point, i) => ({ ...point, uMm: 0.001 * (1 + i) })));
    const withU = fitByCriterion(stated, method);
    near(withU.centre.hMm, bare.centre.hMm, 1e-12);
    near(withU.centre.vMm, bare.centre.vMm, 1e-12);
    expect(withU.covariance).not.toBeNull();
  });
});

describe("fitByCriterion", () => {
  it.each(limiting)("puts slips aside as the least-squares circle sees them: %s", (method) => {
    const points = ringOf(24, 0, 360, (i) => (i === 7 ? 2 : wave(i)));
    const input = pointsInput(points, { outliers: { threshold: 6 } });
    const fit = fitByCriterion(input, method);
    expect(fit.exclusions).toEqual(fitBore(input).exclusions);
    expect(fit.exclusions.map(({ index }) => index)).toEqual([7]);
    expect(fit.used[7]).toBe(false);
    const clean = fitByCriterion(pointsInput(points.filter((_, i) => i !== 7)), method);
    near(fit.centre.hMm, clean.centre.hMm, 1e-11);
    near(fit.diameterMm!, clean.diameterMm!, 1e-11);
    expect(fit.contacts).toEqual(clean.contacts!.map((i) => (i >= 7 ? i + 1 : i)));
    expect(fit.residualsMm[7]!).toBeGreaterThan(1.9);
    expect(codesOf(fit)).toContain("readings_excluded");
  });

  it.each([...limiting, "ellipse"] as const)(
    "reads a turned gauge as the points it touched: %s",
    (method) => {
      const readings = clockAngles(20, 5).map((clockDeg, i) => ({ clockDeg, readingMm: wave(i), uMm: null }));
      const gauge = gaugeInput({
        nominalDiameterMm: 200,
        gaugeSagMm: 0.02,
        readings,
        readingUncertaintyMm: 0.01,
      });
      const points = readings.map(({ clockDeg, readingMm }) => {
        const { hMm, vMm } = onRing(origin, 100, clockDeg, readingMm);
        return wallPoint(hMm, vMm - 0.02);
      });
      const [byGauge, byPoints] = [gauge, pointsInput(points, { readingUncertaintyMm: 0.01 })].map((input) =>
        fitByCriterion(input, method),
      );
      near(byGauge!.centre.hMm, byPoints!.centre.hMm, 1e-11);
      near(byGauge!.centre.vMm, byPoints!.centre.vMm, 1e-11);
      near(byGauge!.diameterMm!, byPoints!.diameterMm!, 1e-11);
      expect(byGauge!.contacts).toEqual(byPoints!.contacts);
      const anywhere = fitByCriterion({ ...gauge, zero: "arbitrary" }, method);
      expect(anywhere.diameterMm).toBeNull();
      expect(anywhere.expandedUncertainty!.diameterMm).toBeNull();
      expect(anywhere.centre).toEqual(byGauge!.centre);
    },
  );

  it("takes no time over a usual bore, and little over the largest", () => {
    const random = seededRandom(4);
    const usual = ringOf(360, 0, 360, () => 0.02 * random.normal());
    const largest = ringOf(10_000, 0, 360, () => 0.02 * random.normal());
    const grid = Array.from({ length: 10_000 }, (_, i) => wallPoint(i % 100, Math.floor(i / 100)));
    const time = (points: readonly WallPoint[], method: CriterionMethod) => {
      const begun = performance.now();
      fitOrCode(pointsInput(points), method);
      return performance.now() - begun;
    };
    for (const method of limiting) {
      time(usual, method);
      const best = Math.min(...Array.from({ length: 7 }, () => time(usual, method)));
      // Measured 1 to 2 ms where the target is 5; the margin is for a busy machine.
      expect(best).toBeLessThan(20);
      expect(time(largest, method)).toBeLessThan(2_000);
      expect(time(grid, method)).toBeLessThan(15_000);
    }
  });

  it("answers or refuses whatever points it is sent, soon and with finite numbers", () => {
    const coordinate = fc.oneof(
      fc.constantFrom(0, 1, -1, 1e-9, 1e9, 1e10, 0.1),
      fc.double({ min: -1e10, max: 1e10, noNaN: true }),
      fc.integer({ min: -3, max: 3 }),
    );
    const point = fc.tuple(coordinate, coordinate, fc.integer({ min: -2, max: 2 }));
    fc.assert(
      fc.property(
        fc.array(point, { maxLength: 14 }),
        fc.constantFrom<CriterionMethod>(...limiting, "ellipse"),
        fc.constantFrom(0, 20, -60),
        (points, method, halfAngleDeg) => {
          const begun = performance.now();
          const input = pointsInput(
            points.map(([h, v, z]) => wallPoint(h, v, halfAngleDeg === 0 ? {} : { zMm: z })),
            {
              taper: halfAngleDeg === 0 ? null : { form: "known", halfAngleDeg },
              readingUncertaintyMm: 0.01,
            },
          );
          const fit = fitOrCode(input, method);
          expect(performance.now() - begun).toBeLessThan(4_000);
          if (typeof fit === "string") return;
          const numbers = JSON.stringify(fit, (_, value: unknown) =>
            typeof value === "number" && !Number.isFinite(value) ? "not finite" : value,
          );
          expect(numbers).not.toContain("not finite");
        },
      ),
      { numRuns: 300 },
    );
  });

  it("changes nothing of what it is given and says the same again", () => {
    const input = pointsInput(ringOf(30, 0, 330, wave), { readingUncertaintyMm: 0.01 });
    const before = JSON.stringify(input);
    for (const method of [...limiting, "ellipse"] as const) {
      const first = JSON.stringify(fitByCriterion(input, method));
      expect(JSON.stringify(fitByCriterion(input, method))).toBe(first);
    }
    expect(JSON.stringify(input)).toBe(before);
  });

  it.each([-1, 1])(
    "finds the better of two holes that differ by a hair, whichever it is: side %s",
    (side) => {
      for (const hair of [1e-3, 1e-6, 1e-9]) {
        const points = [-1, 1].flatMap((place) =>
          clockAngles(24).map((t) => onRing({ hMm: 12 * place, vMm: 0 }, 10, t, place === side ? hair : 0)),
        );
        const fit = fitByCriterion(pointsInput(points), "maximum_inscribed");
        near(fit.centre.hMm, 12 * side, 1e-9);
        near(fit.diameterMm!, 20 + 2 * hair, 1e-12);
      }
    },
  );

  it("finds the same zone of points sent twice", () => {
    const pairs = ringOf(15, 0, 360, wave).map(({ hMm, vMm }): Pair => [hMm, vMm]);
    for (const method of limiting) {
      const [once, twice] = [fitPairs(pairs, method), fitPairs([...pairs, ...pairs], method)];
      if (typeof once === "string" || typeof twice === "string") throw new Error("Refused.");
      near(twice.centre.hMm, once.centre.hMm, 1e-11);
      expect(twice.contacts).toEqual([...once.contacts!, ...once.contacts!.map((i) => i + 15)]);
    }
  });
});
