import { describe, expect, it } from "vitest";
import {
  choiceOf,
  costed,
  fewestProblem,
  floating,
  movedIds,
  reasonOf,
} from "../../../tests/support/fewest-machines.ts";
import { feetAt, padsAt, partOn, range, stackOf, stationOff } from "../../../tests/support/move-problems.ts";
import { ComputeError } from "../compute-error.ts";
import type { MoveStation } from "../moves/move-problem.ts";
import { findFewestMoves } from "./find-fewest-moves.ts";

const within = (halfWidthMm: number) => ({
  tolerance: {
    form: "planes",
    h: range(-halfWidthMm, halfWidthMm),
    v: range(-halfWidthMm, halfWidthMm),
  } as const,
});
const off = (id: string, zMm: number, hMm: number, vMm: number, halfWidthMm: number): MoveStation =>
  stationOff(id, zMm, hMm, vMm, null, within(halfWidthMm));
const vTravel = (leastMm: number, mostMm: number) => ({
  travel: { h: range(-1, 1), v: range(leastMm, mostMm) },
});
const still = [floating("first", 0, 0), floating("last", 0, 0)];
const ends = [off("first", 0, 0, 0, 0.1), off("last", 1000, 0, 0, 0.1)] as const;
const near = (value: number, wanted: number, mm = 1e-12) => expect(Math.abs(value - wanted)).toBeLessThan(mm);

describe("findFewestMoves", () => {
  it("moves nothing, and leaves the axis of least squares, where every station conforms", () => {
    const part = costed(partOn("part", ["mid"], [feetAt("feet", 500)]), 7);
    const choice = choiceOf(
      fewestProblem([...ends, off("mid", 500, 0, -0.09, 0.1)], [part], { references: still }),
    );
    expect(choice).toMatchObject({ cost: 0, search: { method: "none_needed", proved: true, betterBy: 0 } });
    expect(movedIds(choice)).toEqual([]);
    expect(choice.predicted[2]!.deviation).toEqual({ hMm: 0, vMm: -0.09 });
  });

  it("floats the axis instead of moving a part, where its limits let it", () => {
    // 2a² + (−0.12 − a)² is least at a = −0.04: the mean of 0, −0.12 and 0.
    const part = costed(partOn("part", ["mid"], [feetAt("feet", 500)]));
    const stations = [...ends, off("mid", 500, 0, -0.12, 0.1)];
    const choice = choiceOf(
      fewestProblem(stations, [part], {
        references: [floating("first", 0, 0.05), floating("last", 0, 0.05)],
      }),
    );
    expect(choice.cost).toBe(0);
    for (const { vMm } of choice.axis.atReferences) near(vMm, -0.04);
    near(choice.axis.v.at0Mm, -0.04);
    near(choice.axis.v.slope, 0, 1e-15);
    expect(choice.predicted.map(({ deviation }) => Number(deviation.vMm.toFixed(12)))).toEqual([
      0.04, 0.04, -0.08,
    ]);
    const held = choiceOf(fewestProblem(stations, [part], { references: still }));
    expect(movedIds(held)).toEqual(["part"]);
    near(held.components[0]!.moves[0]!.vMm, 0.12);
  });

  it("moves the dear part when its travel alone reaches, and the cheap one when either does", () => {
    const stations = [...ends, off("a", 400, 0, 0.2, 0.1), off("b", 600, 0, -0.2, 0.1)];
    // The axis can serve one of the two stations, by 0.1 up or down, not both.
    const references = [floating("first", 0, 0.1), floating("last", 0, 0.1)];
    const parts = (travelMm: number) => [
      costed(partOn("a-part", ["a"], [feetAt("feet", 400, vTravel(-travelMm, travelMm))]), 1),
      costed(partOn("b-part", ["b"], [feetAt("feet", 600)]), 5),
    ];
    expect(movedIds(choiceOf(fewestProblem(stations, parts(0.5), { references })))).toEqual(["a-part"]);
    expect(movedIds(choiceOf(fewestProblem(stations, parts(0.05), { references })))).toEqual(["b-part"]);
  });

  it("takes of equally dear choices the one that leaves the least sum of squares, and tells of the others", () => {
    const stations = [...ends, off("a", 400, 0, 0.195, 0.1), off("b", 600, 0, -0.2, 0.1)];
    const references = [floating("first", 0, 0.12), floating("last", 0, 0.12)];
    const parts = ["a", "b"].map((id) => costed(partOn(`${id}-part`, [id], [feetAt("feet", 500)])));
    for (const components of [parts, [...parts].reverse()]) {
      const choice = choiceOf(fewestProblem(stations, components, { references }));
      // The axis goes to the part that stays, and less far for 0.195 than for −0.2.
      expect(movedIds(choice)).toEqual(["b-part"]);
      expect(choice.search.tied).toBe(1);
    }
  });

  it("holds a station on its circle, where the others pull it outside", () => {
    // Nine bores at 0 hold the axis near 0; the tenth, 0.15 off along (0.8, 0.6), is let to 0.1: the axis goes 0.05 that way.
    const many = Array.from({ length: 9 }, (_, k) => stationOff(`s${k}`, 500, 0, 0, 0.1));
    const stations = [
      stationOff("first", 0, 0, 0, null),
      ...many,
      stationOff("out", 500, 0.12, 0.09, 0.1),
      stationOff("last", 1000, 0, 0, null),
    ];
    const idle = costed(partOn("idle", ["s0"], [feetAt("feet", 500)]));
    const choice = choiceOf(
      fewestProblem(stations, [idle], {
        references: [floating("first", 0.1, 0.1), floating("last", 0.1, 0.1)],
      }),
    );
    expect(choice.cost).toBe(0);
    near(choice.predicted[10]!.deviation.hMm, 0.08, 1e-10);
    near(choice.predicted[10]!.deviation.vMm, 0.06, 1e-10);
    expect(choice.predicted[10]).toMatchObject({ verdict: "conforms", atLimit: true });
    near(choice.axis.atReferences[0]!.hMm, 0.04, 1e-10);
    near(choice.axis.atReferences[1]!.vMm, 0.03, 1e-10);
  });

  it("keeps the expanded uncertainty, and the margin, free of the tolerance", () => {
    // u = 0.01, U = 1.959964·u (normal distribution, two-sided 0.95): 0.08 + 0.0196 is inside 0.1; 0.081 is not.
    const covariance = { hhMm2: 1e-4, hvMm2: 0, vvMm2: 1e-4 };
    const station = { ...off("mid", 500, 0, -0.3, 0.1), covariance };
    const withTravel = (mostMm: number, rest = {}) =>
      fewestProblem(
        [...ends, station],
        [costed(partOn("part", ["mid"], [feetAt("feet", 500, vTravel(-1, mostMm))]))],
        { references: still, ...rest },
      );
    expect(choiceOf(withTravel(0.22)).predicted[2]!.verdict).toBe("conforms");
    expect(choiceOf(withTravel(0.2, { rule: "simple" })).predicted[2]!.atLimit).toBe(true);
    expect(reasonOf(withTravel(0.219)).cause).toBe("contradiction");
    expect(reasonOf(withTravel(0.22, { marginMm: 0.001 })).cause).toBe("contradiction");
    expect(choiceOf(withTravel(0.22, { marginMm: 0.0004 })).cost).toBe(1);
  });

  it("measures one-sided tolerances from their middle", () => {
    const tolerance = { form: "planes", h: range(-0.1, 0.1), v: range(0.02, 0.06) } as const;
    const station = stationOff("mid", 500, 0, 0, null, { tolerance });
    const part = costed(partOn("part", ["mid"], [feetAt("feet", 500)]));
    const choice = choiceOf(fewestProblem([station], [part]));
    near(choice.components[0]!.moves[0]!.vMm, 0.04);
  });

  it("moves a carrier once for what rests in it, and what rests in it alone when the carrier lies well", () => {
    const travel = { travel: { h: range(-0.5, 0.5), v: range(-0.5, 0.5) } };
    const machine = (casing: number, bearing: number) =>
      choiceOf(
        fewestProblem(
          [...ends, off("cas", 400, 0, casing, 0.05), off("brg", 600, 0, bearing, 0.05)],
          [
            costed(partOn("casing", ["cas"], [feetAt("feet", 500, travel)]), 3),
            costed(
              partOn("bearing", ["brg"], [padsAt("seat", 600, [135, 225], stackOf(3), travel)], {
                kind: "bearing",
                carriedById: "casing",
              }),
            ),
          ],
          { references: still },
        ),
      );
    const both = machine(-0.3, -0.3);
    expect(movedIds(both)).toEqual(["casing"]);
    expect(both.predicted.map(({ verdict }) => verdict)).toEqual(Array(4).fill("conforms"));
    near(both.components[0]!.moves[0]!.vMm, 0.3);
    expect(movedIds(machine(0, -0.3))).toEqual(["bearing"]);
    const apart = machine(-0.3, 0.1);
    expect([movedIds(apart), apart.cost]).toEqual([["casing", "bearing"], 4]);
    // The bearing rides up with its casing and is brought back by its own move.
    near(apart.predicted[3]!.deviation.vMm, 0);
    near(apart.components[1]!.moves[0]!.vMm, -0.4);
  });

  it("turns a part about a blocked support, and leaves a blocked plane alone", () => {
    const stations = [...ends, off("mid", 1000, 0, -0.2, 0.05)];
    const supports = [feetAt("a", 500, { blocked: ["v"] }), feetAt("b", 1500)];
    const choice = choiceOf(
      fewestProblem(stations, [costed(partOn("part", ["mid"], supports))], { references: still }),
    );
    const [a, b] = choice.components[0]!.moves;
    expect(a!.vMm).toBe(0);
    near(b!.vMm, 0.4);
  });

  it("moves a part whose own limits leave out staying, whatever the stations ask", () => {
    const part = costed(partOn("part", ["mid"], [feetAt("feet", 500, vTravel(0.05, 0.2))]), 2);
    const choice = choiceOf(
      fewestProblem([...ends, off("mid", 500, 0, 0, 0.1)], [part], { references: still }),
    );
    expect(choice).toMatchObject({ cost: 2, mustMove: [0], search: { method: "none_needed", proved: true } });
    near(choice.components[0]!.moves[0]!.vMm, 0.05);
  });

  it("keeps a part that holds a reference station, unless it may move", () => {
    const stations = [off("first", 0, 0, -0.3, 0.1), ends[1]];
    const part = (allowReferenceMove: boolean) =>
      costed(partOn("part", ["first"], [feetAt("feet", 0)], { allowReferenceMove }));
    const problem = (allow: boolean) => fewestProblem(stations, [part(allow)], { references: still });
    expect(reasonOf(problem(false)).cause).toBe("contradiction");
    expect(movedIds(choiceOf(problem(true)))).toEqual(["part"]);
  });

  it("names a smallest set of demands and limits that contradict each other", () => {
    const part = costed(partOn("part", ["mid"], [feetAt("feet", 500, vTravel(-0.1, 0.1))]));
    const why = reasonOf(
      fewestProblem([...ends, off("mid", 500, 0, -0.3, 0.1)], [part], {
        references: [floating("first", 0, 0.02), floating("last", 0, 0.02)],
      }),
    );
    if (why.cause !== "contradiction") throw new Error(why.cause);
    expect(why.limits).toHaveLength(4);
    expect(why.limits).toEqual(
      expect.arrayContaining([
        { of: "station", station: 2, plane: "v", side: "min" },
        { of: "component", component: 0, limit: { of: "travel", support: 0, plane: "v", side: "max" } },
        { of: "float", reference: 0, plane: "v", side: "min" },
        { of: "float", reference: 1, plane: "v", side: "min" },
      ]),
    );
  });

  it("says so where three floats leave no straight axis", () => {
    const stations = [
      stationOff("a", 0, 0, 0, 1),
      stationOff("b", 500, 0, 0, 1),
      stationOff("c", 1000, 0, 0, 1),
    ];
    const at = (id: string, least: number, most: number) => ({
      stationId: id,
      float: { h: range(0, 0), v: range(least, most) },
    });
    const why = reasonOf(
      fewestProblem(stations, [costed(partOn("part", ["b"], [feetAt("feet", 0)]))], {
        references: [at("a", 0, 0.1), at("b", 0.3, 0.4), at("c", 0, 0.1)],
      }),
    );
    expect(why).toMatchObject({
      cause: "contradiction",
      limits: [{ of: "float" }, { of: "float" }, { of: "float" }],
    });
  });

  it("names every station whose uncertainty fills its tolerance", () => {
    const covariance = { hhMm2: 1e-4, hvMm2: 0, vvMm2: 1e-2 };
    const stations = [...ends, { ...off("mid", 500, 0, 0, 0.1), covariance }];
    const problem = fewestProblem(stations, [costed(partOn("part", ["mid"], [feetAt("feet", 500)]))]);
    expect(reasonOf(problem)).toMatchObject({
      cause: "uncertainty",
      stations: [{ station: 2, plane: "v", halfWidthMm: 0.1 }],
    });
    expect(choiceOf({ ...problem, rule: "simple" }).cost).toBe(0);
  });

  it("asks nothing of stations without a tolerance", () => {
    const part = costed(partOn("part", ["mid"], [feetAt("feet", 500)]));
    const choice = choiceOf(fewestProblem([stationOff("mid", 500, 9, 9, null)], [part]));
    expect(choice).toMatchObject({ cost: 0, predicted: [{ verdict: null, deviation: { hMm: 9, vMm: 9 } }] });
  });

  it("answers with the best it has, its gap and no proof, where the search is cut short", () => {
    const stations = [...ends, off("a", 400, 0, 0.2, 0.1), off("b", 600, 0, -0.2, 0.1)];
    const parts = [
      costed(partOn("a-part", ["a"], [feetAt("feet", 400)]), 1),
      costed(partOn("b-part", ["b"], [feetAt("feet", 600)]), 5),
    ];
    const problem = fewestProblem(stations, parts, { references: still });
    const short = { firstSeconds: 1, nextSeconds: 1, programsMost: 0, tiedMost: 0 };
    const found = findFewestMoves(problem, short);
    expect(found).toMatchObject({
      possible: true,
      choice: { cost: 6, search: { proved: false, betterBy: 5 } },
    });
    if (found.possible)
      expect(found.choice.predicted.every(({ verdict }) => verdict === "conforms")).toBe(true);
    expect(choiceOf(problem).search).toMatchObject({ proved: true, betterBy: 0 });
  });

  it("answers or refuses by its code whatever the sizes", () => {
    for (const scale of [1e-9, 1e-3, 1e6, 1e12]) {
      for (const z of [1e-4, 1e9]) {
        const stations = [
          off("first", 0, 0, 0, scale),
          off("mid", z / 2, 0, 1.5 * scale, scale),
          off("last", z, 0, 0, scale),
        ];
        const part = costed(partOn("part", ["mid"], [feetAt("feet", z / 2, { stacks: {} })]));
        try {
          const found = findFewestMoves(fewestProblem(stations, [part], { references: still }));
          expect(found.possible && movedIds(found.choice)).toEqual(["part"]);
          if (found.possible) near(found.choice.predicted[1]!.deviation.vMm / scale, 0, 1e-9);
        } catch (error) {
          expect(error).toBeInstanceOf(ComputeError);
        }
      }
    }
  });
});
