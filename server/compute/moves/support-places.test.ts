import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  feetAt,
  jointKeysAt,
  padsAt,
  solvePart,
  stackOf,
  stationOff,
} from "../../../tests/support/move-problems.ts";
import { placesOf } from "./support-places.ts";

const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

/** cos 45°, as an aligner's table has it. */
const cos45 = Math.SQRT1_2;
const keyed = {
  left: stackOf(5),
  right: stackOf(5),
  "key-left": stackOf(4),
  "key-right": stackOf(4),
};

describe("pads", () => {
  it("takes +v·cos 45° at each of two lower pads at 135 and 225 degrees for a lift of v (common practice, no source)", () => {
    const { answer, stack } = solvePart([stationOff("b", 0, 0, -0.4)], [padsAt("seat", 0, [135, 225])]);
    near(answer.realised[0]!.vMm, 0.4);
    near(stack("p135").changeMm, 0.4 * cos45);
    near(stack("p225").changeMm, 0.4 * cos45);
  });

  it("moves the bore left by thickening the right pad and thinning the left one", () => {
    const { answer, stack } = solvePart([stationOff("b", 0, 0.2, 0)], [padsAt("seat", 0, [135, 225])]);
    near(answer.realised[0]!.hMm, -0.2);
    near(stack("p135").changeMm, 0.2 * cos45);
    near(stack("p225").changeMm, -0.2 * cos45);
  });

  it("changes a third pad at the bottom by all of the lift", () => {
    const { stack } = solvePart([stationOff("b", 0, 0.1, -0.3)], [padsAt("seat", 0, [120, 180, 240])]);
    near(stack("p180").changeMm, 0.3);
    // −(δ_h·sin φ + δ_v·cos φ) with δ = (−0.1, 0.3), φ = 120° and 240°.
    near(stack("p120").changeMm, 0.1 * Math.sqrt(0.75) + 0.3 * 0.5);
    near(stack("p240").changeMm, -0.1 * Math.sqrt(0.75) + 0.3 * 0.5);
  });

  it("lets upper pads follow: thinner by as much as the bore comes toward them", () => {
    const { stack } = solvePart([stationOff("b", 0, 0, -0.4)], [padsAt("seat", 0, [45, 135, 225, 315])]);
    near(stack("p45").changeMm, -0.4 * cos45);
    near(stack("p315").changeMm, -0.4 * cos45);
  });

  it("gives upper pads no say in the realised move: they take what the shims of the lower ones made", () => {
    const { answer, stack } = solvePart([stationOff("b", 0, 0, -0.4)], [padsAt("seat", 0, [0, 135, 225])], {
      cutIncrementMm: 0.05,
      maximumMisfitMm: 0.03,
    });
    // 0.4·cos 45° = 0.2828…: 0.30 is the nearer step (0.0172 against 0.0328), which lifts by 0.30/cos 45° = 0.42426.
    near(stack("p135").changeMm, 0.3);
    near(stack("p225").changeMm, 0.3);
    near(answer.realised[0]!.vMm, 0.3 / cos45);
    near(stack("p0").idealMm, -0.4);
    near(stack("p0").changeMm, -0.4);
    near(stack("p0").misfitMm, 0.3 / cos45 - 0.4);
    near(stack("p135").misfitMm, 0);
  });

  it("refuses a choice whose upper pad could only follow worse than the misfit allows", () => {
    const { answer, stack } = solvePart([stationOff("b", 0, 0, -0.4)], [padsAt("seat", 0, [0, 135, 225])], {
      cutIncrementMm: 0.05,
      maximumMisfitMm: 0.02,
    });
    // As above the upper pad would be 0.024 off. Next best is one lower pad a step less: 0.275/cos 45° = 0.38891 up and
    // 0.035 to the side, 0.037 from target; both a step less would leave 0.046.
    const lower = [stack("p135").changeMm, stack("p225").changeMm].sort((a, b) => a - b);
    near(lower[0]!, 0.25);
    near(lower[1]!, 0.3);
    near(answer.realised[0]!.vMm, 0.275 / cos45);
    near(stack("p0").changeMm, -0.4);
  });

  it("counts pads at 90 and 270 degrees as bearing load, and those above as not", () => {
    const bears = (clockDeg: number) => placesOf(padsAt("seat", 0, [clockDeg]), 0)[0]!.bearsLoad;
    expect([90, 91, 180, 270, -90, 450].map(bears)).toEqual(new Array(6).fill(true));
    expect([0, 89, 271, -89, 360, 449].map(bears)).toEqual(new Array(6).fill(false));
  });

  it("changes a pad at any clock angle by −(δ_h·sin φ + δ_v·cos φ)", () => {
    const move = fc.double({ min: -1, max: 1, noNaN: true });
    fc.assert(
      fc.property(move, move, fc.double({ min: -360, max: 360, noNaN: true }), (h, v, clockDeg) => {
        const { stack } = solvePart(
          [stationOff("b", 0, -h, -v)],
          [padsAt("seat", 0, [135, 225, clockDeg], stackOf(10))],
        );
        const rad = (clockDeg * Math.PI) / 180;
        near(stack(`p${clockDeg}`).changeMm, -(h * Math.sin(rad) + v * Math.cos(rad)));
      }),
    );
  });
});

describe("feet", () => {
  it("changes both feet by the lift", () => {
    const { stack } = solvePart([stationOff("s", 0, 0, -0.3)], [feetAt("f", 0)]);
    near(stack("left").changeMm, 0.3);
    near(stack("right").changeMm, 0.3);
  });

  it("thickens key-left and thins key-right for a move to the right, keys outside the feet", () => {
    const { stack } = solvePart([stationOff("s", 0, -0.12, 0)], [feetAt("f", 0, { stacks: keyed })]);
    near(stack("key-left").changeMm, 0.12);
    near(stack("key-right").changeMm, -0.12);
  });

  it("does the reverse with keys inside the feet", () => {
    const support = feetAt("f", 0, { stacks: keyed, keys: "inside" });
    const { stack } = solvePart([stationOff("s", 0, -0.12, 0)], [support]);
    near(stack("key-left").changeMm, -0.12);
    near(stack("key-right").changeMm, 0.12);
  });

  it("moves sideways by jack without keys: to the ideal, whatever the increment of the shims", () => {
    const { answer, plan } = solvePart([stationOff("s", 0, 0.1234, -0.3)], [feetAt("f", 0)], {
      cutIncrementMm: 0.05,
    });
    near(answer.realised[0]!.hMm, -0.1234);
    near(answer.realised[0]!.vMm, 0.3);
    expect(plan.advice).toContainEqual({
      code: "set_by_jack",
      componentId: "part",
      supports: [{ id: "f", planes: ["h"] }],
    });
  });

  it("shims feet on unlike stacks alike, so that the part does not roll", () => {
    const stacks = { left: stackOf(5, { maxMm: 5.1 }), right: stackOf(3.005, { piecesMm: [3, 0.005] }) };
    const { stack } = solvePart([stationOff("s", 0, 0, -0.3)], [feetAt("f", 0, { stacks })], {
      cutIncrementMm: 0.01,
    });
    near(stack("left").changeMm, 0.1);
    near(stack("right").changeMm, 0.1);
  });

  it("takes the steps nearest to each other where two feet cannot be changed alike", () => {
    // The left foot's pack must come out: it can become 2.50, 2.52 …; the right one is added to in steps of 0.02.
    const stacks = {
      left: stackOf(2.47, { maxCount: 1 }),
      right: stackOf(2.5),
    };
    const { answer, stack } = solvePart([stationOff("s", 0, 0, -0.05)], [feetAt("f", 0, { stacks })], {
      cutIncrementMm: 0.02,
    });
    // Left may change by 0.05 (to 2.52), right by 0.04 or 0.06: each is the other's nearest.
    near(stack("left").changeMm, 0.05, 1e-9);
    expect([0.04, 0.06].some((step) => Math.abs(stack("right").changeMm - step) < 1e-9)).toBe(true);
    near(answer.realised[0]!.vMm, (stack("left").changeMm + stack("right").changeMm) / 2, 1e-9);
    near(stack("left").misfitMm, -stack("right").misfitMm, 1e-9);
  });
});

describe("joint keys", () => {
  it("sets the height at both joint keys and the side at the bottom key", () => {
    const { stack, plan } = solvePart([stationOff("s", 0, 0.07, -0.2)], [jointKeysAt("j", 0)], {
      cutIncrementMm: 0.01,
    });
    near(stack("key-left").changeMm, 0.2);
    near(stack("key-right").changeMm, 0.2);
    near(stack("key-bottom").changeMm, -0.07);
    expect(plan.advice).toContainEqual({ code: "key_bottom_cheeks", componentId: "part" });
  });
});
