import { describe, expect, it } from "vitest";
import {
  feetAt,
  jointKeysAt,
  padsAt,
  solvePart,
  stackOf,
  stationOff,
} from "../../../tests/support/move-problems.ts";
import type { MoveComponent, MoveProblem, MoveStation, MoveSupport } from "./move-problem.ts";

const low = stationOff("s", 0, 0, -0.4);
const keyed = { left: stackOf(5), right: stackOf(5), "key-left": stackOf(4), "key-right": stackOf(4) };

const adviceOf = (
  stations: readonly MoveStation[],
  supports: readonly MoveSupport[],
  rest: Partial<MoveProblem> = { cutIncrementMm: 0.01 },
  part: Partial<MoveComponent> = {},
) => solvePart(stations, supports, rest, part).plan.advice;

const codesOf = (...args: Parameters<typeof adviceOf>) => adviceOf(...args).map(({ code }) => code);

describe("advice", () => {
  it("says when no shims were chosen: every change is then the ideal one", () => {
    expect(codesOf([low], [feetAt("f", 0)], {})).toContain("shims_not_chosen");
    expect(codesOf([low], [feetAt("f", 0)])).not.toContain("shims_not_chosen");
    const { answer } = solvePart([stationOff("s", 0, 0, -0.1234)], [feetAt("f", 0)]);
    for (const { changeMm, idealMm, addMm, removeMm, misfitMm } of answer.stacks) {
      expect({ changeMm, addMm, removeMm, misfitMm }).toEqual({
        changeMm: idealMm,
        addMm: [],
        removeMm: [],
        misfitMm: 0,
      });
    }
  });

  it("tells good practice where stacks are changed, and not where nothing moves", () => {
    expect(codesOf([low], [feetAt("f", 0)])).toContain("shim_practice");
    expect(codesOf([stationOff("s", 0, 0, 0)], [feetAt("f", 0)])).toEqual([]);
  });

  it("names stacks that hold more than four pieces when done", () => {
    const pieces = [1, 1, 0.5, 0.5];
    const left = stackOf(3, { piecesMm: pieces });
    const stacks = { left, right: stackOf(3, { piecesMm: [3] }) };
    expect(adviceOf([low], [feetAt("f", 0, { stacks })])).toContainEqual({
      code: "stack_over_four_pieces",
      componentId: "part",
      places: ["f left"],
    });
    const three = { left: stackOf(2.5, { piecesMm: [1, 1, 0.5] }), right: stacks.right };
    expect(codesOf([low], [feetAt("f", 0, { stacks: three })])).not.toContain("stack_over_four_pieces");
  });

  it("says where a support is set by jack, in the planes that none of its stacks sets", () => {
    const jacked = (support: MoveSupport) =>
      adviceOf([stationOff("s", 0, 0.1, -0.4)], [support]).find(({ code }) => code === "set_by_jack");
    expect(jacked(feetAt("f", 0))).toEqual({
      code: "set_by_jack",
      componentId: "part",
      supports: [{ id: "f", planes: ["h"] }],
    });
    expect(jacked(feetAt("f", 0, { stacks: {} }))).toMatchObject({
      supports: [{ id: "f", planes: ["h", "v"] }],
    });
    expect(jacked(feetAt("f", 0, { stacks: keyed }))).toBe(undefined);
    expect(jacked(padsAt("f", 0, [135, 225]))).toBe(undefined);
    expect(jacked(padsAt("f", 0, [180]))).toMatchObject({ supports: [{ id: "f", planes: ["h"] }] });
    // Upper pads follow and set nothing.
    expect(jacked(padsAt("f", 0, [45, 315]))).toMatchObject({ supports: [{ id: "f", planes: ["h", "v"] }] });
    expect(codesOf([low], [feetAt("f", 0)])).not.toContain("set_by_jack");
  });

  it("reminds of the other cheek when a bottom key changes", () => {
    expect(codesOf([stationOff("s", 0, 0.1, 0)], [jointKeysAt("j", 0)])).toContain("key_bottom_cheeks");
    expect(codesOf([low], [jointKeysAt("j", 0)])).not.toContain("key_bottom_cheeks");
  });

  it("names stations without a tolerance, which ask for nothing", () => {
    const silent = stationOff("silent", 100, 0, 5, null);
    expect(adviceOf([low, silent], [feetAt("f", 0)])).toContainEqual({
      code: "stations_without_tolerance",
      componentId: "part",
      stationIds: ["silent"],
    });
  });

  it("lists what to check after a bearing has moved", () => {
    expect(adviceOf([low], [padsAt("f", 0, [135, 225])], {}, { kind: "bearing" })).toContainEqual({
      code: "bearing_afterwards",
      componentIds: ["part"],
    });
    const still = stationOff("s", 0, 0, 0);
    expect(codesOf([still], [padsAt("f", 0, [135, 225])], {}, { kind: "bearing" })).not.toContain(
      "bearing_afterwards",
    );
  });
});
