import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { boundsOf } from "./cell-bounds.ts";
import { partsOf, type Cell } from "./centre-cells.ts";
import { measuresFor } from "./centre-charts.ts";
import type { CentreProblem } from "./centre-problem.ts";
import { measureRivals, sidesAround, type Rivals } from "./descend-centre.ts";
import { FewRivals } from "./few-rivals.ts";
import { solveTangentProgram } from "./tangent-program.ts";

/** Points near a circle about the origin, and a small cell of centres some way off with its parts. */
const situation = fc
  .record({
    seed: fc.integer({ min: 1, max: 1e6 }),
    count: fc.integer({ min: 60, max: 120 }),
    size: fc.constantFrom(0.2, 0.05, 1e-3),
    turn: fc.constantFrom(2 * Math.PI, 0.5),
  })
  .map(({ seed, count, size, turn }) => {
    const random = seededRandom(seed);
    const polar = Array.from({ length: count }, () => ({
      radius: 0.9 + 0.01 * random.normal(),
      angle: turn * random.uniform(),
    }));
    const problem: CentreProblem = {
      count,
      x: Float64Array.from(polar, ({ radius, angle }) => radius * Math.cos(angle)),
      y: Float64Array.from(polar, ({ radius, angle }) => radius * Math.sin(angle)),
      added: null,
      unit: 1,
    };
    const all = Int32Array.from({ length: count }, (_, i) => i);
    const rivals: Rivals = { outer: all, inner: all };
    const cell: Cell = {
      ...rivals,
      chart: "near",
      x: 0.4 * (2 * random.uniform() - 1),
      y: 0.4 * (2 * random.uniform() - 1),
      halfX: size,
      halfY: size * (0.6 + random.uniform()),
      edges: new Int32Array(0),
      home: null,
      nearest: 0,
    };
    return { problem, rivals, cell, random };
  });

describe("FewRivals", () => {
  it("forbids no cell that holds a centre below the limit, by witnesses or by what carried its whole", () => {
    const said = { forbidden: 0, left: 0 };
    fc.assert(
      fc.property(situation, ({ problem, rivals, cell, random }) => {
        const measures = measuresFor(problem.count);
        const few = new FewRivals(problem, rivals, measures);
        measureRivals(problem, "near", cell.x, cell.y, rivals, measures);
        const bounds = boundsOf(cell, rivals, measures);
        const sides = sidesAround(cell, null, cell.x, cell.y, Infinity);
        few.remember(solveTangentProgram(measures, rivals.outer, rivals.inner, sides)!, rivals);
        for (const part of partsOf({ ...cell, nearest: bounds.nearest })) {
          const reached = Array.from({ length: 30 }, () => {
            const x = part.x + part.halfX * (2 * random.uniform() - 1);
            const y = part.y + part.halfY * (2 * random.uniform() - 1);
            return measureRivals(problem, "near", x, y, rivals, measuresFor(problem.count));
          });
          const least = Math.min(...reached);
          for (const limit of [least * 0.5, least * 0.99, least + 1e-9]) {
            for (const forbidden of [few.carriersForbid(part, limit), few.witnessesForbid(part, limit)]) {
              if (forbidden) expect(limit).toBeLessThanOrEqual(least);
              said[forbidden ? "forbidden" : "left"]++;
            }
          }
        }
      }),
    );
    expect(Math.min(said.forbidden, said.left)).toBeGreaterThan(100);
  });

  it("counts no point of a part nearer to its middle than it says", () => {
    fc.assert(
      fc.property(situation, ({ problem, rivals, cell }) => {
        const measures = measuresFor(problem.count);
        measureRivals(problem, "near", cell.x, cell.y, rivals, measures);
        const { nearest } = boundsOf(cell, rivals, measures);
        for (const part of partsOf({ ...cell, nearest })) {
          measureRivals(problem, "near", part.x, part.y, rivals, measures);
          expect(boundsOf(part, rivals, measures).nearest).toBeGreaterThan(part.nearest - 1e-12);
        }
      }),
    );
  });
});
