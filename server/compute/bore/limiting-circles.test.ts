import { describe, expect, it } from "vitest";
import { centreOf, fitPairs, pointKinds, pointsOfKind } from "../../../tests/support/criterion-inputs.ts";
import {
  circumscribedByTriples,
  costAt,
  extremesAt,
  inscribedByTriples,
  isBetween,
  nelderMead,
  zoneByQuadruples,
  zoneOfTangents,
  type Criterion,
  type Pair,
} from "../../../tests/support/limiting-oracles.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { pointsInput, wallPoint } from "../../../tests/support/bore-inputs.ts";
import { fitByCriterion } from "./fit-criterion.ts";

const setsOf = (kind: (typeof pointKinds)[number], many: number) =>
  Array.from({ length: many }, (_, k) => pointsOfKind(kind, 4 + (k % 9), 1000 + k)).filter(
    (points) => new Set(points.map((point) => point.join())).size > 2,
  );
/** Refusals that a set of points earns by itself; anything else fails the test. */
const degenerate = ["points_collinear"];

describe("minimum_circumscribed", () => {
  it.each(pointKinds)("is the smallest of the circles on all pairs and triples: %s", (kind) => {
    for (const points of setsOf(kind, 40)) {
      const fit = fitPairs(points, "minimum_circumscribed");
      if (typeof fit === "string") {
        expect(degenerate).toContain(fit);
        continue;
      }
      const wanted = circumscribedByTriples(points);
      expect(Math.abs(fit.diameterMm! / 2 - wanted)).toBeLessThan(1e-12 * wanted);
      expect(Math.abs(extremesAt(points, centreOf(fit)).most - wanted)).toBeLessThan(1e-12 * wanted);
    }
  });
});

describe("minimum_circumscribed of all but regular rings", () => {
  it("is exact where a third point moves the centre and the radius by less than rounding", () => {
    for (let seed = 1; seed <= 400; seed++) {
      const random = seededRandom(seed);
      const noise = 10 ** (-2 - 12 * random.uniform());
      const count = 3 + (seed % 8);
      const points = Array.from({ length: count }, (_, i): Pair => {
        const turn = seed % 2 ? (2 * Math.PI * i) / count : (Math.PI / 4) * Math.floor(8 * random.uniform());
        const radius = 100 * (1 + noise * random.normal());
        return [radius * Math.cos(turn), radius * Math.sin(turn)];
      });
      const fit = fitPairs(points, "minimum_circumscribed");
      if (typeof fit === "string") {
        expect(degenerate).toContain(fit);
        continue;
      }
      const wanted = circumscribedByTriples(points);
      expect(Math.abs(fit.diameterMm! / 2 - wanted)).toBeLessThan(1e-12 * wanted);
    }
  });

  it("is exact where two ends of a diameter carry it but for a hair", () => {
    const points: Pair[] = [
      [100.0000012908687, 0],
      [6.123234012513876e-15, 100.00000027399099],
      [-99.99999917558553, 1.2246467890511878e-14],
      [-1.8369702048672132e-14, -100.00000033458265],
    ];
    const fit = fitPairs(points, "minimum_circumscribed");
    if (typeof fit === "string") throw new Error(fit);
    expect(Math.abs(fit.diameterMm! / 2 - circumscribedByTriples(points))).toBeLessThan(1e-12);
    expect(fit.contacts).toEqual([0, 1, 3]);
  });
});

describe("maximum_inscribed", () => {
  it.each(pointKinds)("is the largest of the circles through all triples: %s", (kind) => {
    let answered = 0;
    let refused = 0;
    for (const points of setsOf(kind, 40)) {
      const fit = fitPairs(points, "maximum_inscribed");
      const { within, onSide } = inscribedByTriples(points);
      if (typeof fit === "string") {
        expect([...degenerate, "no_inscribed_circle"]).toContain(fit);
        // Refused only where the circle still grows on a side of the hull.
        if (fit === "no_inscribed_circle") expect(onSide).toBeGreaterThan(within - 1e-9);
        refused++;
        continue;
      }
      answered++;
      expect(isBetween(points, centreOf(fit))).toBe(true);
      expect(Math.abs(fit.diameterMm! / 2 - within)).toBeLessThan(1e-10 * within);
      expect(onSide).toBeLessThan(within + 1e-9);
    }
    const arcs = kind === "arc" || kind === "short arc";
    expect(arcs ? refused : answered).toBeGreaterThan(5);
    if (arcs) expect(answered).toBe(0);
  });
});

describe("minimum_zone", () => {
  it.each(pointKinds)("is the narrowest about all meetings of two bisectors: %s", (kind) => {
    let answered = 0;
    for (const points of setsOf(kind, 40)) {
      const fit = fitPairs(points, "minimum_zone");
      const { circular, strip } = zoneByQuadruples(points);
      if (typeof fit === "string") {
        expect([...degenerate, "arc_too_flat"]).toContain(fit);
        if (fit === "arc_too_flat") expect(strip).toBeLessThan(circular + 1e-9);
        continue;
      }
      answered++;
      expect(Math.abs(fit.roundnessMm - circular)).toBeLessThan(1e-10 * fit.diameterMm! + 1e-10);
      expect(fit.roundnessMm).toBeLessThan(strip);
      expect(Math.abs(costAt("minimum_zone", points, centreOf(fit)) - circular)).toBeLessThan(1e-9);
    }
    expect(answered).toBeGreaterThan(20);
  });

  it("is the optimum of its own tangents, by another solver of linear programs", async () => {
    for (const kind of ["ring", "rough", "oval", "arc"] as const) {
      const points = pointsOfKind(kind, 24, 5);
      const fit = fitPairs(points, "minimum_zone");
      if (typeof fit === "string") throw new Error(fit);
      // HiGHS keeps its constraints to 1e-7.
      const width = await zoneOfTangents(points, centreOf(fit), 1);
      expect(Math.abs(width - fit.roundnessMm)).toBeLessThan(1e-6);
      const beside = await zoneOfTangents(points, [centreOf(fit)[0] + 0.5, centreOf(fit)[1]], 1);
      expect(Math.abs(beside - fit.roundnessMm)).toBeLessThan(0.05);
    }
  });
});

describe("a limiting circle with a known taper", () => {
  const criteria: readonly Criterion[] = ["minimum_zone", "maximum_inscribed", "minimum_circumscribed"];

  it.each(criteria)("%s: no search from many starts finds a better centre", (criterion) => {
    const random = seededRandom(77);
    let answered = 0;
    for (const kind of ["ring", "rough", "oval", "arc"] as const) {
      for (const halfAngleDeg of [2, -15, 40]) {
        const tangent = Math.tan((halfAngleDeg * Math.PI) / 180);
        const points = pointsOfKind(kind, 11, 31 + halfAngleDeg);
        const zMm = points.map((_, i) => 10 * (i % 3) - 5);
        const added = zMm.map((z) => z * tangent);
        // A cone's wall with these residuals.
        const wall = points.map(([h, v], i): Pair => {
          const [dh, dv] = [h - 3, v + 7];
          const share = 1 + added[i]! / Math.hypot(dh, dv);
          return [3 + dh * share, -7 + dv * share];
        });
        const input = pointsInput(
          wall.map(([h, v], i) => wallPoint(h, v, { zMm: zMm[i]! })),
          { taper: { form: "known", halfAngleDeg } },
        );
        if (kind === "arc" && criterion === "maximum_inscribed") continue;
        const fit = fitByCriterion(input, criterion);
        const cost = (at: Pair) =>
          criterion === "maximum_inscribed" && !isBetween(wall, at)
            ? 1e9
            : costAt(criterion, wall, at, added);
        const reached = costAt(criterion, wall, centreOf(fit), added);
        for (let start = 0; start < 12; start++) {
          const from: Pair = [3 + 80 * (random.uniform() - 0.5), -7 + 80 * (random.uniform() - 0.5)];
          expect(nelderMead(cost, from, 5)).toBeGreaterThan(reached - 1e-9);
        }
        const { least, most } = extremesAt(wall, centreOf(fit), added);
        const radius = {
          minimum_zone: (least + most) / 2,
          maximum_inscribed: least,
          minimum_circumscribed: most,
        };
        expect(Math.abs(fit.diameterMm! / 2 - radius[criterion])).toBeLessThan(1e-9);
        expect(fit.taper).toEqual({ halfAngleDeg, expandedUncertaintyDeg: null });
        answered++;
      }
    }
    expect(answered).toBeGreaterThan(8);
  });
});
