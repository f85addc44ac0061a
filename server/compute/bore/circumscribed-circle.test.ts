import { describe, expect, it } from "vitest";
import {
  circumscribedByTriples,
  extremesAt,
  isBetween,
  type Pair,
} from "../../../tests/support/limiting-oracles.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { CentreProblem } from "./centre-problem.ts";
import { circumscribedCentre } from "./circumscribed-circle.ts";

const problemOf = (points: readonly Pair[]): CentreProblem => ({
  count: points.length,
  x: Float64Array.from(points, ([x]) => x),
  y: Float64Array.from(points, ([, y]) => y),
  added: null,
  unit: 1,
});

/** Points round a circle of radius 0.78, right angles among them, each off by noise as small as 1e-11. */
const nearlyRegular = Array.from({ length: 1500 }, (_, k) => {
  const random = seededRandom(k + 1);
  const count = 4 + Math.floor(7 * random.uniform());
  const noise = 10 ** (-6 - 5 * random.uniform());
  return Array.from({ length: count }, (_, i): Pair => {
    const turn = k % 2 ? (Math.PI / 4) * Math.floor(8 * random.uniform()) : (2 * Math.PI * i) / count;
    const radius = 0.78 * (1 + noise * random.normal());
    return [radius * Math.cos(turn), radius * Math.sin(turn)];
  });
}).filter((points) => new Set(points.map(([h, v]) => `${h.toFixed(3)} ${v.toFixed(3)}`)).size > 2);

describe("circumscribedCentre", () => {
  it("lies between its contacts, also where a third one changes the radius by less than rounding", () => {
    expect(nearlyRegular.length).toBeGreaterThan(1000);
    for (const points of nearlyRegular) {
      const { x, y } = circumscribedCentre(problemOf(points), "points");
      const { most } = extremesAt(points, [x, y]);
      expect(most - circumscribedByTriples(points)).toBeLessThan(1e-15);
      const contacts = points.filter(([h, v]) => most - Math.hypot(h - x, v - y) <= 1e-9 * most);
      // 1e-9 of an angle, as the contacts are.
      expect(isBetween(contacts, [x, y], 1e-9)).toBe(true);
    }
  });
});
