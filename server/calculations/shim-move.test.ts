import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { shimMoveRequest, shimMoveResult, type ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import { unitChoices, type Units } from "../../shared/units.ts";
import { casing, moveRequest as base, padBearing } from "../../tests/support/move-requests.ts";
import { shimMoveKind } from "./shim-move.ts";

const answer = (request: ShimMoveRequest) => shimMoveKind.answer(request);

/** Exact by definition (international inch, 1959), stated here so that the service's own table is not its own witness. */
const millimetresPer = { mm: 1, um: 0.001, m: 1000, in: 25.4, mil: 0.0254, ft: 304.8 };

/** Every number of a value that is a length of the answer, scaled; clock angles and counts are no lengths. */
function scaled(value: unknown, factor: number, name = ""): unknown {
  if (typeof value === "number") return name === "clockDeg" || name === "order" ? value : value * factor;
  if (Array.isArray(value)) return value.map((item) => scaled(item, factor, name));
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, member]) => [key, scaled(member, factor, key)]));
}

function inUnits(request: ShimMoveRequest, units: Units): ShimMoveRequest {
  const offset = 1 / millimetresPer[units.offset];
  const axial = 1 / millimetresPer[units.axial];
  const place = <T extends { z: number }>(item: T): T => ({ ...item, z: item.z * axial });
  return {
    ...request,
    units,
    stations: request.stations.map(({ z, deviation, tolerance, ...station }) => ({
      ...station,
      z: z * axial,
      deviation: scaled(deviation, offset) as typeof deviation,
      tolerance: scaled(tolerance, offset) as typeof tolerance,
    })),
    components: request.components.map((component) => ({
      ...component,
      supports: (component.supports ?? []).map((support) => place(scaledSupport(support, offset))),
    })),
    maximumIncrement: request.maximumIncrement! * offset,
    indicators: request.indicators!.map(place),
  };
}

type Support = NonNullable<ShimMoveRequest["components"][number]["supports"]>[number];
function scaledSupport(support: Support, offset: number): Support {
  return { ...(scaled(support, offset) as Support), z: support.z };
}

describe("shimMoveKind.answer", () => {
  const { result, cautions, level } = answer(base);
  const [bearing, moved] = result.components;

  it("raises a bearing by v with +v·cos 45° on each of two lower pads (common practice, no source)", () => {
    const at = (place: string) => bearing!.stacks.find((stack) => stack.place === place)!;
    expect(at("right").change).toBeCloseTo(0.1 * Math.SQRT1_2, 14);
    expect(at("left").change).toBeCloseTo(0.1 * Math.SQRT1_2, 14);
    expect(at("top").change).toBeCloseTo(-0.1, 14);
  });

  it("moves a casing at each support by what its stations ask, feet alike, keys opposed", () => {
    // Two stations at the two supports: the move is minus each deviation (statics of a rigid line, by hand).
    expect(moved!.moves).toEqual([
      { support: "forward", h: expect.closeTo(0.1, 12) as number, v: expect.closeTo(0.2, 12) as number },
      { support: "rear", h: expect.closeTo(-0.1, 12) as number, v: expect.closeTo(0.3, 12) as number },
    ]);
    const changes = Object.fromEntries(
      moved!.stacks.map((stack) => [`${stack.support} ${stack.place}`, stack]),
    );
    expect(changes["forward left"]!.change).toBeCloseTo(0.2, 12);
    expect(changes["forward right"]!.change).toBeCloseTo(0.2, 12);
    expect(changes["forward key-left"]!.change).toBeCloseTo(0.1, 12);
    expect(changes["forward key-right"]!.change).toBeCloseTo(-0.1, 12);
    expect(changes["rear left"]!.to).toBeCloseTo(8.3, 12);
  });

  it("moves the casing before the bearing, in equal parts within the largest increment", () => {
    expect(result.steps.map(({ order, component }) => [order, component])).toEqual([
      [1, "casing"],
      [2, "bearing"],
    ]);
    const [first] = result.steps;
    // Largest move 0.3, at most 0.15 at once: 2 parts.
    expect(first!.increments.map(({ indicators }) => indicators[0]!.reading)).toEqual([
      expect.closeTo(0.15, 12),
      expect.closeTo(0.3, 12),
    ]);
  });

  it("says that no shims were chosen, which side is set by jack, and the cautions", () => {
    const codes = result.advice.map(({ code }) => code);
    expect(codes).toEqual(expect.arrayContaining(["shims_not_chosen", "set_by_jack", "bearing_afterwards"]));
    expect(result.advice.find(({ code }) => code === "set_by_jack")!.detail).toContain("rear in h");
    expect(cautions.length).toBeGreaterThanOrEqual(4);
    expect(level).toBe(0.95);
  });

  const combinations = unitChoices.axial.flatMap((axial) =>
    unitChoices.offset.map((offset) => ({ axial, bore: "mm" as const, offset })),
  );
  it.each(combinations)("answers alike with z in $axial and offsets in $offset", (units) => {
    const other = answer(inUnits(base, units)).result;
    const back = scaled({ ...other, advice: null }, millimetresPer[units.offset]);
    const numbers = (value: unknown): number[] =>
      typeof value === "number"
        ? [value]
        : typeof value === "object" && value !== null
          ? Object.values(value).flatMap(numbers)
          : [];
    // A clock angle of a deviation of zero is rounding; the others are compared.
    const still = (value: typeof result) => ({
      ...value,
      predicted: value.predicted.map(({ id, deviation: { h, v }, verdict }) => ({ id, h, v, verdict })),
      advice: null,
    });
    const [got, wanted] = [numbers(still(back as typeof result)), numbers(still(result))];
    expect(got.length).toBe(wanted.length);
    wanted.forEach((number, k) => expect(Math.abs(got[k]! - number)).toBeLessThan(1e-11));
  });

  it("chooses pieces, and predicts from them, not from the ideal move", () => {
    const { result: cut } = answer({
      ...base,
      shims: { cutToSize: { increment: 0.05 } },
      maximumMisfit: 0.05,
    });
    for (const { change, add, remove, from, to } of cut.components.flatMap(({ stacks }) => stacks)) {
      const total = (pieces: number[]) => pieces.reduce((sum, piece) => sum + piece, 0);
      expect(total(add) - total(remove)).toBeCloseTo(change, 12);
      expect(to - from).toBeCloseTo(change, 12);
      for (const piece of add) expect(Math.abs(piece / 0.05 - Math.round(piece / 0.05))).toBeLessThan(1e-9);
    }
    const realised = cut.components[0]!.realised[0]!;
    const { deviation } = cut.predicted[0]!;
    expect(deviation.v).toBeCloseTo(-0.1 + realised.v, 12);
    // The lattice of 0.05 on both pads gives v = 0.05·√2 a step: 0.0707 is nearer to 0.1 than 0.1414.
    expect(realised.v).toBeCloseTo(0.05 * Math.SQRT2, 12);
  });

  it("gives the same answer to the last bit again, and leaves the request as it was", () => {
    const request = structuredClone(base);
    expect(JSON.stringify(answer(request))).toBe(JSON.stringify(answer(structuredClone(base))));
    expect(request).toEqual(base);
  });

  it("names the limit that binds by its pointer, in words of the caller's unit", () => {
    const travelled = { ...padBearing.supports![0]!, travel: { v: [-0.02, 0.02] } };
    const { components } = answer({
      ...base,
      components: [{ ...padBearing, supports: [travelled] }, casing],
    }).result;
    expect(components[0]!.unreachable).toMatchObject({
      cause: "limit",
      limit: "/components/0/supports/0/travel/v/1",
      reason: expect.stringContaining("0.02 mm") as string,
    });
  });

  it("names a fixed part, a reference station that is held, and what is blocked", () => {
    const whyOf = (request: ShimMoveRequest) => answer(request).result.components[0]!.unreachable?.limit;
    expect(whyOf({ ...base, components: [{ ...padBearing, fixed: true }, casing] })).toBe(
      "/components/0/fixed",
    );
    expect(whyOf({ ...base, reference: ["brg"] })).toBe("/reference/0");
    const blocked = { ...padBearing.supports![0]!, blocked: ["v" as const] };
    expect(whyOf({ ...base, components: [{ ...padBearing, supports: [blocked] }, casing] })).toBe(
      "/components/0/supports/0/blocked",
    );
  });

  it("answers every example request, in the shape of its schema", () => {
    const folder = new URL("../../examples/requests/shim-moves/", import.meta.url);
    const files = readdirSync(folder);
    expect(files.length).toBeGreaterThanOrEqual(2);
    for (const file of files) {
      const request = shimMoveRequest.parse(JSON.parse(readFileSync(new URL(file, folder), "utf8")));
      const { result: answered } = answer(request);
      expect(shimMoveResult.parse(answered)).toEqual(answered);
    }
  });
});
