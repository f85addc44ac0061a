import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  costOfPlan,
  feetAt,
  padsAt,
  range,
  solvePart,
  stackOf,
  stationOff,
} from "../../../tests/support/move-problems.ts";
import type { MoveStation } from "./move-problem.ts";

/** Σ (d/T)² in v of stations with equal T, after a lift of `a` at z = 0 and `b` at z = 1000. */
const costOf = (stations: readonly MoveStation[], a: number, b: number): number =>
  stations.reduce((sum, { zMm, deviation }) => {
    const share = zMm / 1000;
    return sum + ((deviation.vMm + a * (1 - share) + b * share) / 0.05) ** 2;
  }, 0);

const offset = fc.double({ min: -0.4, max: 0.4, noNaN: true });
const limit = fc
  .record({
    least: fc.double({ min: -0.3, max: 0.1, noNaN: true }),
    room: fc.double({ min: 0, max: 0.3, noNaN: true }),
  })
  .map(({ least, room }) => range(least, least + room));

const stationsOf = (zs: readonly number[], vs: readonly number[]) =>
  zs.map((z, i) => stationOff(`s${i}`, z, 0, vs[i]!));

describe("the ideal move inside limits", () => {
  it("is the cheapest point of a fine lattice of moves that keep travel and stacks, to the lattice's step", () => {
    const lift = fc.record({ travel: limit, room: limit });
    fc.assert(
      fc.property(fc.tuple(offset, offset, offset), lift, lift, (vs, front, rear) => {
        const stations = stationsOf([-200, 450, 1300], vs);
        const at = (id: string, z: number, { travel, room }: typeof front) => {
          const stack = stackOf(1, { minMm: 1 + room.minMm, maxMm: 1 + room.maxMm });
          return feetAt(id, z, {
            travel: { h: range(0, 0), v: travel },
            stacks: { left: stack, right: stack },
          });
        };
        const { answer, plan, problem } = solvePart(stations, [at("f", 0, front), at("g", 1000, rear)]);
        const bounds = [front, rear].map(({ travel, room }) =>
          range(Math.max(travel.minMm, room.minMm), Math.min(travel.maxMm, room.maxMm)),
        );
        if (bounds.some(({ minMm, maxMm }) => minMm > maxMm + 1e-9)) {
          expect(answer.unreachable?.cause).toBe("contradiction");
          return;
        }
        const [a, b] = answer.ideal.map(({ vMm }) => vMm);
        [a!, b!].forEach((lift, k) => {
          expect(lift).toBeGreaterThanOrEqual(bounds[k]!.minMm - 1e-9);
          expect(lift).toBeLessThanOrEqual(bounds[k]!.maxMm + 1e-9);
        });
        const cost = costOf(stations, a!, b!);
        expect(Math.abs(costOfPlan(problem, plan) - cost)).toBeLessThan(1e-9 * (1 + cost));
        const steps = Array.from({ length: 41 }, (_, i) => i / 40);
        const [f, g] = bounds as [(typeof bounds)[0], (typeof bounds)[0]];
        for (const i of steps) {
          for (const k of steps) {
            const other = costOf(
              stations,
              f.minMm + i * (f.maxMm - f.minMm),
              g.minMm + k * (g.maxMm - g.minMm),
            );
            expect(other).toBeGreaterThanOrEqual(cost - 1e-9 * (1 + cost));
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  it("cannot be bettered by a permitted step in h, v and both tilts together: oblique pads and blocked directions", () => {
    const away = fc.double({ min: -1, max: 1, noNaN: true });
    const stack = fc
      .record({
        down: fc.double({ min: 0, max: 0.2, noNaN: true }),
        up: fc.double({ min: 0, max: 0.2, noNaN: true }),
      })
      .map(({ down, up }) => stackOf(1, { minMm: 1 - down, maxMm: 1 + up }));
    fc.assert(
      fc.property(
        fc.array(fc.tuple(offset, offset), { minLength: 3, maxLength: 3 }),
        fc.tuple(stack, stack),
        fc.constantFrom([], ["h"] as const, ["v"] as const),
        fc.array(fc.tuple(away, away, away, away), { minLength: 60, maxLength: 60 }),
        (offs, [front, rear], blocked, directions) => {
          const zs = [-100, 400, 1200];
          const stations = zs.map((z, i) => stationOff(`s${i}`, z, offs[i]![0], offs[i]![1]));
          const supports = [
            padsAt("f", 0, [45, 135, 225], front),
            padsAt("g", 1000, [120, 180, 240], rear, { blocked }),
          ];
          const { answer } = solvePart(stations, supports);
          const [f, g] = answer.ideal;
          const cost = (move: readonly number[]) =>
            zs.reduce((sum, z, i) => {
              const along = (front: number, rear: number) => front + ((rear - front) * z) / 1000;
              const h = offs[i]![0] + along(move[0]!, move[2]!);
              const v = offs[i]![1] + along(move[1]!, move[3]!);
              return sum + (h * h + v * v) / 0.05 ** 2;
            }, 0);
          const permitted = (move: readonly number[]) =>
            supports.every(({ pads }, k) =>
              pads.every(({ clockDeg, stack: { minMm, maxMm } }) => {
                const rad = (clockDeg * Math.PI) / 180;
                const to = 1 - (move[2 * k]! * Math.sin(rad) + move[2 * k + 1]! * Math.cos(rad));
                return to >= minMm - 1e-9 && to <= maxMm + 1e-9;
              }),
            );
          const ideal = [f!.hMm, f!.vMm, g!.hMm, g!.vMm];
          expect(permitted(ideal)).toBe(true);
          for (const direction of directions) {
            for (const size of [0.3, 0.03, 0.003, 0.0003]) {
              const step = direction.map((part, k) =>
                (k === 2 && blocked[0] === "h") || (k === 3 && blocked[0] === "v") ? 0 : part * size,
              );
              const other = ideal.map((value, k) => value + step[k]!);
              if (permitted(other))
                expect(cost(other)).toBeGreaterThanOrEqual(cost(ideal) * (1 - 1e-6) - 1e-6);
            }
          }
        },
      ),
      { numRuns: 60 },
    );
  });
});
