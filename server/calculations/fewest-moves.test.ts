import { describe, expect, it } from "vitest";
import { cautions } from "../../shared/cautions.ts";
import {
  fewestMovesRequest,
  fewestMovesResult,
  type FewestMovesRequest,
} from "../../shared/schemas/fewest-moves.ts";
import { shimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import { fewestRequest as base } from "../../tests/support/fewest-requests.ts";
import { fewestMovesKind } from "./fewest-moves.ts";
import { shimMoveKind } from "./shim-move.ts";

const answer = (request: FewestMovesRequest) => fewestMovesKind.answer(request);
const movedIn = ({ result }: ReturnType<typeof answer>) =>
  result.components.filter(({ moved }) => moved).map(({ id }) => id);
const codesOf = ({ result }: ReturnType<typeof answer>) => result.advice.map(({ code }) => code);

/** The base call with its lengths along z in feet, those across in mil (exact: 1 ft = 304.8 mm, 1 mil = 0.0254 mm). */
const inMil: FewestMovesRequest = (() => {
  const z = <T extends { readonly z: number }>(item: T): T => ({ ...item, z: item.z / 304.8 });
  const across = <T>(value: T): T => {
    if (typeof value === "number") return (value / 0.0254) as T;
    if (Array.isArray(value)) return value.map(across) as T;
    if (typeof value !== "object" || value === null) return value;
    return Object.fromEntries(
      Object.entries(value).map(([key, member]) => [key, across<unknown>(member)]),
    ) as T;
  };
  return {
    ...base,
    units: { axial: "ft", bore: "in", offset: "mil" },
    stations: base.stations.map(({ covariance, dof, deviation, tolerance, ...station }) => ({
      ...z(station),
      deviation: across(deviation),
      ...(tolerance ? { tolerance: across(tolerance) } : {}),
      ...(covariance ? { covariance: across(across(covariance)), dof: dof ?? null } : {}),
    })),
    reference: base.reference!.map(({ id, float }) => ({ id, ...(float ? { float: across(float) } : {}) })),
    components: base.components.map((part) => ({
      ...part,
      ...(part.supports
        ? {
            supports: part.supports.map((support) => {
              const { travel, z: along, ...rest } = support;
              const stacks =
                support.form === "feet" && support.stacks ? { stacks: across(support.stacks) } : {};
              return {
                ...rest,
                z: along / 304.8,
                ...(travel ? { travel: across(travel) } : {}),
                ...stacks,
              };
            }),
          }
        : {}),
    })),
    margin: across(base.margin!),
  };
})();

describe("fewestMovesKind.answer", () => {
  const whole = answer(base);

  it("moves the casing, and floats the axis so that the rings stay", () => {
    expect(fewestMovesResult.safeParse(whole.result).error).toBeUndefined();
    expect(movedIn(whole)).toEqual(["casing"]);
    expect(whole.result).toMatchObject({ cost: 3, infeasible: null, search: { proved: true, gap: 0 } });
    expect(whole.result.predicted.map(({ verdict }) => verdict)).toEqual(Array(6).fill("conforms"));
    expect(whole.result.remeasure).toEqual(["brg-1", "brg-2", "cas-1", "cas-2"]);
    expect(whole.cautions).toBe(cautions);
    expect(codesOf(whole)).toEqual(["axis_floats", "shims_from_shim_moves", "uncertainty_not_known"]);
    const asSurveyed = answer({ ...base, reference: [{ id: "brg-1" }, { id: "brg-2" }] });
    expect(movedIn(asSurveyed)).toEqual(["casing", "ring-a", "ring-b"]);
    const still = answer({ ...base, reference: [] });
    expect(still.result.cost).toBe(5);
    expect(still.result.axis).toEqual({ float: [], h: { at0: 0, slope: 0 }, v: { at0: 0, slope: 0 } });
  });

  it("keeps the float inside its limits, and predicts from the axis that it answers", () => {
    const { axis, predicted, components } = whole.result;
    expect(axis.float.every(({ h, v }) => h === 0 && Math.abs(v) <= 0.05 + 1e-12)).toBe(true);
    base.stations.forEach(({ id, z, deviation }, k) => {
      const part = components.find(({ moved }, c) => moved && base.components[c]!.stations?.includes(id));
      const [fore, aft] = part?.moves ?? [];
      const move = fore && aft ? fore.v + ((aft.v - fore.v) * (z - 900)) / 1200 : 0;
      const wanted = deviation.v - (axis.v.at0 + axis.v.slope * z) + move;
      expect(Math.abs(predicted[k]!.deviation.v - wanted)).toBeLessThan(1e-12); // mm
    });
  });

  it("is the same in other units", () => {
    const other = answer(inMil);
    expect(movedIn(other)).toEqual(movedIn(whole));
    other.result.predicted.forEach(({ deviation }, k) => {
      const { h, v } = whole.result.predicted[k]!.deviation;
      expect(Math.hypot(deviation.h * 0.0254 - h, deviation.v * 0.0254 - v)).toBeLessThan(1e-9); // mm
    });
    expect(Math.abs((other.result.axis.v.slope * 0.0254) / 304.8 - whole.result.axis.v.slope)).toBeLessThan(
      1e-12,
    );
  });

  it("hands over a call of shim-moves that, with shims cut fine, brings every station inside", () => {
    for (const request of [base, { ...base, reference: [] }, inMil]) {
      const { shimMoves } = answer(request).result;
      const increment = request.units.offset === "mm" ? 0.01 : 0.5;
      const body = shimMoveRequest.parse({ ...shimMoves, shims: { cutToSize: { increment } } });
      expect(body.objective).toBe("least_squares");
      const { result } = shimMoveKind.answer(body);
      expect(result.predicted.map(({ verdict }) => verdict)).toEqual(Array(6).fill("conforms"));
      expect(result.components.filter(({ fixed }) => !fixed).map(({ id }) => id)).toEqual(
        movedIn(answer(request)),
      );
    }
  });

  it("says with which objective, or that the moves answered must be kept", () => {
    // Three bores on one casing: by least squares the middle one is left outside, by the least largest share none is.
    const at = (id: string, z: number, v: number) => ({
      id,
      z,
      deviation: { h: 0, v },
      tolerance: { h: 0.1, v: 0.1 },
    });
    const bent = {
      units: base.units,
      stations: [
        at("a", 0, 0.3),
        at("a2", 0, 0.3),
        at("b", 500, 0.12),
        at("c", 1000, 0.3),
        at("c2", 1000, 0.3),
      ],
      components: [
        {
          id: "casing",
          stations: ["a", "a2", "b", "c", "c2"],
          supports: [0, 1000].map((z) => ({ id: `f${z}`, z, form: "feet" as const })),
        },
      ],
    };
    const found = answer(bent);
    expect(found.result.shimMoves!.objective).toBe("minimax");
    const { result } = shimMoveKind.answer(found.result.shimMoves!);
    expect(result.predicted.every(({ verdict }) => verdict === "conforms")).toBe(true);
  });

  it("answers a machine that conforms with nothing to move and no further call", () => {
    const found = answer({
      ...base,
      stations: base.stations.map((each) => ({ ...each, deviation: { h: 0, v: 0 } })),
    });
    expect(found.result).toMatchObject({ cost: 0, shimMoves: null, remeasure: [] });
    expect(codesOf(found)).toEqual(["nothing_moves", "uncertainty_not_known"]);
  });

  it("answers, and does not refuse, where no choice does: as found, with reason and pointers", () => {
    const [casing, ...rest] = base.components;
    const short = {
      ...casing!,
      supports: casing!.supports!.map((support) => ({ ...support, travel: { v: [-0.1, 0.1] } })),
    };
    const { result } = answer({ ...base, components: [short, ...rest] });
    expect(fewestMovesResult.safeParse(result).error).toBeUndefined();
    expect(result).toMatchObject({ cost: null, search: null, shimMoves: null, advice: [] });
    expect(result.infeasible).toMatchObject({ cause: "contradiction" });
    expect(result.infeasible!.stations.every((id) => id.startsWith("cas-"))).toBe(true);
    expect(result.infeasible!.limits).toEqual(
      expect.arrayContaining(["/components/0/supports/0/travel/v/1", "/reference/0/float/v/0"]),
    );
    expect(result.infeasible!.reason).toContain("the most travel in v at fore of casing");
    expect(result.predicted[1]).toMatchObject({ deviation: { v: -0.41 }, verdict: "exceeds" });
  });

  it("tells why a station cannot follow any part", () => {
    const parts = base.components.map((part) => ({ ...part, fixed: true }));
    const { infeasible } = answer({ ...base, components: parts }).result;
    expect(infeasible!.reason).toMatch(/ stays: casing is fixed\.$/);
    const uncarried = answer({ ...base, components: base.components.slice(1) }).result.infeasible;
    expect(uncarried!.reason).toMatch(/ is carried by no component\.$/);
  });

  it("names the stations whose uncertainty fills their tolerance", () => {
    const [first, second, ...others] = base.stations;
    const vague = {
      ...second!,
      covariance: [
        [0.01, 0],
        [0, 0.01],
      ],
    };
    const { infeasible } = answer({ ...base, stations: [first!, vague, ...others] }).result;
    expect(infeasible).toMatchObject({
      cause: "uncertainty",
      stations: ["cas-1"],
      limits: ["/stations/1/tolerance"],
    });
    expect(infeasible!.reason).toContain("a margin of 0.01 mm");
  });

  it("tells of held and moved reference stations", () => {
    const holding = {
      id: "held",
      stations: ["brg-2"],
      supports: [{ id: "f", z: 5000, form: "feet" as const }],
    };
    const low = base.stations.map((each) =>
      each.id === "brg-2" ? { ...each, deviation: { h: 0, v: 0.3 } } : each,
    );
    const request = { ...base, stations: low, components: [...base.components, holding] };
    expect(answer(request).result.infeasible!.reason).toContain("held holds a reference station");
    const allowed = answer({
      ...request,
      components: [...base.components, { ...holding, allowReferenceMove: true }],
    });
    expect(codesOf(allowed)).toContain("axis_survey_anew");
    expect(codesOf(answer({ ...base, components: [...base.components, holding] }))).toContain(
      "reference_held",
    );
  });

  it("is always computed in a thread of its own", () => {
    expect(fewestMovesKind.isLong!(base)).toBe(true);
    expect(fewestMovesRequest.safeParse(base).success).toBe(true);
  });
});
