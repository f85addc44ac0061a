import fc from "fast-check";
import { describe, it } from "vitest";
import { feetAt, jointKeysAt, range, unlimited } from "../../../tests/support/move-problems.ts";
import {
  anyStack,
  both,
  expectSameChoice,
  feetGroup,
  grid,
  runs,
  stationsAt,
  supply,
} from "../../../tests/support/shim-choices.ts";

describe("the choice of shims cut to size against every choice tried", () => {
  it("for feet and side keys of one support, both planes and all stacks together", () => {
    const problem = fc.tuple(anyStack, anyStack, supply, stationsAt([0, 400], "both"));
    fc.assert(
      fc.property(problem, ([foot, key, { incrementMm, maximumMisfitMm }, stations]) => {
        const stacks = { left: foot, right: foot, "key-left": key, "key-right": key };
        expectSameChoice({
          supports: [feetAt("f", 0, { stacks })],
          task: {
            // Opposed keys keep their fit: what comes in at one goes out at the other.
            groups: [feetGroup(0, foot), { stack: key, places: both(0, 1, 0, -1) }],
            stations,
            freedoms: ["h", "v"],
            incrementMm,
            maximumMisfitMm,
            windowMm: 0.14,
          },
        });
      }),
      runs,
    );
  });

  it("for feet at two supports with two or three stations", () => {
    const problem = fc.tuple(anyStack, anyStack, supply, stationsAt([0, 600, 1000], "v"), fc.boolean());
    fc.assert(
      fc.property(problem, ([front, rear, { incrementMm, maximumMisfitMm }, stations, three]) => {
        expectSameChoice({
          supports: [
            feetAt("f", 0, { stacks: { left: front, right: front } }),
            feetAt("g", 1000, { stacks: { left: rear, right: rear } }),
          ],
          task: {
            groups: [feetGroup(0, front), feetGroup(1000, rear)],
            stations: three ? stations : stations.slice(0, 2),
            freedoms: ["v", "tilt-v"],
            incrementMm,
            maximumMisfitMm,
            windowMm: 0.3,
          },
        });
      }),
      runs,
    );
  });

  it("for feet at three supports, where the part follows only within the misfit", () => {
    const problem = fc.tuple(anyStack, anyStack, anyStack, supply, stationsAt([0, 1000], "v"));
    fc.assert(
      fc.property(problem, ([a, b, c, { incrementMm, maximumMisfitMm }, stations]) => {
        const zs = [0, 300, 1000];
        const stacks = [a, b, c];
        expectSameChoice({
          supports: zs.map((z, k) => feetAt(`f${k}`, z, { stacks: { left: stacks[k]!, right: stacks[k]! } })),
          task: {
            groups: zs.map((z, k) => feetGroup(z, stacks[k]!)),
            stations,
            freedoms: ["v", "tilt-v"],
            incrementMm,
            maximumMisfitMm,
            windowMm: 0.16,
          },
        });
      }),
      runs,
    );
  });

  it("for joint keys with a travel limit", () => {
    const problem = fc.tuple(anyStack, anyStack, supply, stationsAt([0], "both"), grid(0.01, 3));
    fc.assert(
      fc.property(problem, ([joint, bottom, { incrementMm, maximumMisfitMm }, stations, most]) => {
        const travel = { h: unlimited, v: range(-Math.abs(most), Math.abs(most)) };
        expectSameChoice({
          supports: [
            jointKeysAt("j", 0, {
              travel,
              stacks: { "key-left": joint, "key-right": joint, "key-bottom": bottom },
            }),
          ],
          task: {
            groups: [feetGroup(0, joint), { stack: bottom, places: [{ zMm: 0, h: 1, v: 0, sign: 1 }] }],
            stations,
            freedoms: ["h", "v"],
            incrementMm,
            maximumMisfitMm,
            windowMm: 0.14,
            travelV: [travel.v.minMm, travel.v.maxMm],
          },
        });
      }),
      runs,
    );
  });
});
