import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { boundsOf, rivalsLeft } from "./cell-bounds.ts";
import { farCurvature, measure, measuresFor, nearReach, placeOf, type Chart } from "./centre-charts.ts";
import type { CentreProblem } from "./centre-problem.ts";
import { convexHull, hullEdges } from "./convex-hull.ts";
import { descendCentre, measureRivals, sidesAround, type Region, type Rivals } from "./descend-centre.ts";
import { optimumAt } from "./optimum-basin.ts";
import { solveTangentProgram } from "./tangent-program.ts";

/** Points within 1 of the origin, round or not, with a taper or without, and a region of either chart. */
const situation = fc
  .record({
    seed: fc.integer({ min: 1, max: 1e6 }),
    count: fc.integer({ min: 3, max: 20 }),
    round: fc.boolean(),
    tapered: fc.boolean(),
    chart: fc.constantFrom<Chart>("near", "far"),
    kinds: fc.constantFrom("both", "outer", "inner"),
    size: fc.constantFrom(1, 0.3, 0.05, 1e-3),
  })
  .map(({ seed, count, round, tapered, chart, kinds, size }) => {
    const random = seededRandom(seed);
    const polar = Array.from({ length: count }, () => ({
      radius: round ? 0.9 + 0.02 * random.normal() : random.uniform(),
      angle: 2 * Math.PI * random.uniform(),
    })).map(({ radius, angle }) => ({ radius: Math.min(1, Math.max(0, radius)), angle }));
    const problem: CentreProblem = {
      count,
      x: Float64Array.from(polar, ({ radius, angle }) => radius * Math.cos(angle)),
      y: Float64Array.from(polar, ({ radius, angle }) => radius * Math.sin(angle)),
      added: tapered ? Float64Array.from(polar, () => 0.3 * random.normal()) : null,
      unit: 1,
    };
    const all = Int32Array.from({ length: count }, (_, i) => i);
    const constant = Int32Array.of(count);
    const rivals: Rivals = {
      outer: kinds === "inner" ? constant : all,
      inner: kinds === "outer" ? constant : all,
    };
    const near = chart === "near";
    const region: Region = {
      chart,
      x: near ? nearReach * (2 * random.uniform() - 1) * size : 2 * Math.PI * random.uniform(),
      y: near
        ? nearReach * (2 * random.uniform() - 1) * size
        : farCurvature * (0.5 * random.uniform() + 0.25),
      halfX: size * (0.2 + random.uniform()) * (near ? 1 : 0.4),
      halfY: size * (0.2 + random.uniform()) * (near ? 1 : farCurvature / 5),
      edges: new Int32Array(0),
    };
    return { problem, rivals, region, random };
  });

const inside = ({ x, y, halfX, halfY }: Region, random: { uniform(): number }) => ({
  x: x + halfX * (2 * random.uniform() - 1),
  y: y + halfY * (2 * random.uniform() - 1),
});

describe("the far chart", () => {
  it("names the same distances as the near one, less that of the centre itself, with their slopes", () => {
    fc.assert(
      fc.property(situation, ({ problem, region }) => {
        const all = Int32Array.from({ length: problem.count }, (_, i) => i);
        const far = measuresFor(problem.count);
        const x = region.x;
        const y = Math.max(1e-3, Math.abs(region.y) % farCurvature);
        measure(problem, "far", x, y, all, far);
        const place = placeOf("far", x, y);
        const away = Math.hypot(place.x, place.y);
        const step = 1e-6;
        const [right, left, up, down] = [0, 1, 2, 3].map(() => measuresFor(problem.count));
        measure(problem, "far", x + step, y, all, right!);
        measure(problem, "far", x - step, y, all, left!);
        measure(problem, "far", x, y + step, all, up!);
        measure(problem, "far", x, y - step, all, down!);
        for (const i of all) {
          const distance = Math.hypot(problem.x[i]! - place.x, problem.y[i]! - place.y);
          const wanted = distance - away - (problem.added?.[i] ?? 0);
          expect(Math.abs(far.value[i]! - wanted)).toBeLessThan(1e-12 * (1 + away));
          const slopeX = (right!.value[i]! - left!.value[i]!) / (2 * step);
          const slopeY = (up!.value[i]! - down!.value[i]!) / (2 * step);
          expect(Math.abs(far.slopeX[i]! - slopeX)).toBeLessThan(1e-8);
          expect(Math.abs(far.slopeY[i]! - slopeY)).toBeLessThan(1e-8);
        }
      }),
    );
  });
});

describe("boundsOf and rivalsLeft", () => {
  it("hold at every centre of the region: no criterion below the bound, no extreme point left out", () => {
    fc.assert(
      fc.property(situation, ({ problem, rivals, region, random }) => {
        const measures = measuresFor(problem.count);
        measureRivals(problem, region.chart, region.x, region.y, rivals, measures);
        const bounds = boundsOf(region, rivals, measures);
        const left = rivalsLeft(region, rivals, measures, bounds);
        for (let k = 0; k < 40; k++) {
          const at = inside(region, random);
          const whole = measureRivals(problem, region.chart, at.x, at.y, rivals, measures);
          expect(whole).toBeGreaterThan(bounds.lower - 1e-12);
          const some = measureRivals(problem, region.chart, at.x, at.y, left, measures);
          expect(Math.abs(whole - some)).toBeLessThan(1e-12);
        }
      }),
    );
  });

  it("and so do the tangents, less what they can miss by bending", () => {
    fc.assert(
      fc.property(situation, ({ problem, rivals, region, random }) => {
        const measures = measuresFor(problem.count);
        measureRivals(problem, region.chart, region.x, region.y, rivals, measures);
        const bounds = boundsOf(region, rivals, measures);
        const sides = sidesAround(region, null, region.x, region.y, Infinity);
        const step = solveTangentProgram(measures, rivals.outer, rivals.inner, sides)!;
        if (bounds.bend === Infinity) return;
        for (let k = 0; k < 40; k++) {
          const at = inside(region, random);
          const value = measureRivals(problem, region.chart, at.x, at.y, rivals, measures);
          expect(value).toBeGreaterThan(step.value - bounds.bend - 1e-12);
        }
      }),
    );
  });
});

describe("solveTangentProgram", () => {
  it("finds the least of the tangents: it is reached, and no step of the region goes below", () => {
    fc.assert(
      fc.property(situation, fc.boolean(), ({ problem, rivals, region, random }, withEdges) => {
        const measures = measuresFor(problem.count);
        const edges = withEdges ? hullEdges(problem.x, problem.y) : null;
        const here = { ...region, x: region.x / 8, y: region.y / 8 };
        measureRivals(problem, region.chart, here.x, here.y, rivals, measures);
        const cutting = { ...here, edges: Int32Array.from(edges?.nx ?? [], (_, k) => k) };
        const sides = sidesAround(cutting, edges, here.x, here.y, Infinity);
        const step = solveTangentProgram(measures, rivals.outer, rivals.inner, sides);
        const allowed = (dx: number, dy: number) =>
          Array.from(sides.reach).every((reach, k) => sides.ax[k]! * dx + sides.ay[k]! * dy <= reach + 1e-11);
        const { value, slopeX, slopeY } = measures;
        const tangent = (i: number, dx: number, dy: number) => value[i]! + slopeX[i]! * dx + slopeY[i]! * dy;
        const spread = (dx: number, dy: number) =>
          Math.max(...Array.from(rivals.outer, (i) => tangent(i, dx, dy))) -
          Math.min(...Array.from(rivals.inner, (j) => tangent(j, dx, dy)));
        if (step !== null) {
          expect(allowed(step.dx, step.dy)).toBe(true);
          expect(Math.abs(spread(step.dx, step.dy) - step.value)).toBeLessThan(1e-11);
        }
        for (let k = 0; k < 60; k++) {
          const { x, y } = inside(here, random);
          if (!allowed(x - here.x, y - here.y)) continue;
          if (step === null) throw new Error("A region called empty holds a step.");
          expect(spread(x - here.x, y - here.y)).toBeGreaterThan(step.value - 1e-11);
        }
      }),
    );
  });
});

describe("optimumAt", () => {
  it("claims a basin in which no descent finds another optimum", () => {
    let claimed = 0;
    fc.assert(
      fc.property(situation, ({ problem, rivals, region, random }) => {
        if (rivals.inner.length === 1) return;
        const wide: Region =
          region.chart === "near"
            ? { ...region, x: 0, y: 0, halfX: nearReach, halfY: nearReach }
            : { ...region, halfX: Math.PI, y: farCurvature / 2, halfY: farCurvature / 2 };
        const measures = measuresFor(problem.count);
        const start = { x: wide.x, y: wide.y };
        const end = descendCentre(problem, rivals, wide, null, start, measures);
        if (!end.stationary) return;
        measureRivals(problem, wide.chart, end.x, end.y, rivals, measures);
        const { basin } = optimumAt(problem, rivals, wide.chart, end.x, end.y, end.value, measures);
        if (basin === 0) return;
        claimed++;
        for (let k = 0; k < 10; k++) {
          const angle = 2 * Math.PI * random.uniform();
          const reach = basin * random.uniform();
          const from = { x: end.x + reach * Math.cos(angle), y: end.y + reach * Math.sin(angle) };
          if (Math.abs(from.x - wide.x) > wide.halfX || Math.abs(from.y - wide.y) > wide.halfY) continue;
          expect(measureRivals(problem, wide.chart, from.x, from.y, rivals, measures)).toBeGreaterThanOrEqual(
            end.value - 1e-12,
          );
          const other = descendCentre(problem, rivals, wide, null, from, measures);
          if (!other.stationary || Math.hypot(other.x - end.x, other.y - end.y) >= basin) continue;
          expect(Math.hypot(other.x - end.x, other.y - end.y)).toBeLessThan(1e-6);
        }
      }),
    );
    expect(claimed).toBeGreaterThan(20);
  });
});

describe("convexHull", () => {
  it("names the corners counter-clockwise, and nothing along an edge", () => {
    const x = [0, 2, 2, 0, 1, 1, 2, 0];
    const y = [0, 0, 2, 2, 1, 0, 1, 0];
    expect(convexHull(x, y).map((k) => [x[k], y[k]])).toEqual([
      [0, 0],
      [2, 0],
      [2, 2],
      [0, 2],
    ]);
    const { nx, ny, reach } = hullEdges(x, y);
    expect([...nx].map((value, k) => [value + 0, ny[k]! + 0, reach[k]! + 0])).toEqual([
      [0, -1, 0],
      [1, 0, 2],
      [0, 1, 2],
      [-1, 0, 0],
    ]);
  });
});
