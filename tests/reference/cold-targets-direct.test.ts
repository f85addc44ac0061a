import { expect } from "vitest";
import { stateAt, type Beam } from "../../server/compute/beam/beam.ts";
import type { BeamInput } from "../../server/compute/beam/beam-input.ts";
import { solveBeam } from "../../server/compute/beam/solve-beam.ts";
import { growthMm } from "../../server/compute/targets/growth.ts";
import { materials } from "../../server/compute/targets/materials.ts";
import { catenarySagMm, parabolaSagMm } from "../../server/compute/targets/wire-sag.ts";
import { crossing, placeOfGreatest } from "../support/golden-section.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** The published cases straight through the engine, each in its own consistent units. */
interface Uniform {
  readonly L: number;
  readonly span: number;
  readonly a: number;
  readonly w: number;
  readonly P: number;
  readonly E: number;
  readonly I: number;
  readonly EI: number;
}

const level = (...places: number[]) => places.map((zMm) => ({ zMm, upMm: 0 }));
const even = (
  lengthMm: number,
  stiffnessNmm2: number,
  loadNPerMm: number,
  ...places: number[]
): BeamInput => ({
  startMm: 0,
  pieces: [{ lengthMm, stiffnessNmm2, loadNPerMm }],
  loads: [],
  supports: level(...places),
});
const down = (beam: Beam) => (z: number) => -stateAt(beam, z).upMm;
const reactions = ({ supports }: Beam) => supports.map(({ reactionN }) => reactionN);

/** What each case asks for, from the engine. */
const uniform: Readonly<Record<string, (input: Uniform) => object>> = {
  "beam-overhang-uniform-all": ({ L, a, w, EI }) => {
    const beam = solveBeam(even(L + a, EI, w, 0, L));
    const moment = (z: number) => stateAt(beam, z).momentNmm;
    const [R1, R2] = reactions(beam);
    return {
      support_moment: -beam.supports[1]!.momentNmm,
      span_moment: moment(placeOfGreatest(moment, 0, L)),
      tip_deflection_down: down(beam)(L + a),
      R1,
      R2,
    };
  },
  "beam-simple-formulas": ({ L, w, P, a, E, I }) => {
    const loaded = solveBeam(even(L, E * I, w, 0, L));
    const pressed = solveBeam({ ...even(L, E * I, 0, 0, L), loads: [{ zMm: a, downN: P }] });
    // The greatest sag lies where the slope is 0: there the place is sharper than the sag.
    const flat = crossing((z) => stateAt(pressed, z).slope, a, L);
    return {
      udl_mid: down(loaded)(L / 2),
      udl_end_slope: -loaded.supports[0]!.slope,
      point_under: down(pressed)(a),
      point_max: down(pressed)(flat),
      point_max_x: flat,
    };
  },
  "beam-two-span-uniform": ({ span, w, E, I }) => {
    const beam = solveBeam(even(2 * span, E * I, w, 0, span, 2 * span));
    const lowest = placeOfGreatest(down(beam), 0, span);
    return {
      reactions: reactions(beam),
      support_moment: -beam.supports[1]!.momentNmm,
      deflection_coefficient: (down(beam)(lowest) * E * I) / (w * span ** 4),
      max_position_ratio: lowest / span,
    };
  },
};

describeCases<Uniform, object>("beams: beam-uniform", ["beam-uniform"], (reference) => {
  const got = uniform[reference.id]!(reference.input);
  expect(mismatches(reference, got)).toEqual([]);
});

interface Force {
  readonly x: number;
  readonly P: number;
}
interface Stepped {
  readonly E: number;
  readonly segments: readonly { readonly x0: number; readonly x1: number; readonly diameter: number }[];
  readonly supports: readonly number[];
  readonly point_loads?: readonly Force[];
  readonly loads_xz?: readonly Force[];
  readonly loads_xy?: readonly Force[];
  readonly query_x?: readonly number[];
}

/** Forces are up positive in these cases. */
function bend({ E, segments, supports }: Stepped, forces: readonly Force[] = []): Beam {
  return solveBeam({
    startMm: segments[0]!.x0,
    pieces: segments.map(({ x0, x1, diameter }) => ({
      lengthMm: x1 - x0,
      stiffnessNmm2: (E * Math.PI * diameter ** 4) / 64,
      loadNPerMm: 0,
    })),
    loads: forces.map(({ x, P }) => ({ zMm: x, downN: -P })),
    supports: level(...supports),
  });
}

const stepped: Readonly<Record<string, (input: Stepped) => object>> = {
  "beam-shigley-4-7-stepped": (input) => {
    const beam = bend(input, input.point_loads);
    return {
      deflection: input.query_x!.map((x) => stateAt(beam, x).upMm),
      slope_at_supports: beam.supports.map(({ slope }) => slope),
      reactions: reactions(beam),
    };
  },
  "beam-shigley-7-3-seven-diameters": (input) => {
    const planes = [bend(input, input.loads_xz), bend(input, input.loads_xy)];
    const loads = input.loads_xz!.map(({ x }) => x);
    const together = (of: (beam: Beam) => number) => Math.hypot(...planes.map(of));
    return {
      slope_rad: [...input.supports, ...loads].map((x) => together((beam) => stateAt(beam, x).slope)),
      deflection_in: loads.map((x) => together((beam) => stateAt(beam, x).upMm)),
    };
  },
};

describeCases<Stepped, object>("beams: beam-stepped", ["beam-stepped"], (reference) => {
  const got = stepped[reference.id]!(reference.input);
  expect(mismatches(reference, got)).toEqual([]);
});

describeCases<Stepped, Record<string, unknown>>(
  "beams: beam-stepped, against 50-digit arithmetic",
  ["beam-stepped"],
  (reference) => {
    const { expected, recomputed, input, id } = reference;
    const sharp = Object.fromEntries(Object.keys(expected).map((field) => [field, { rel: 1e-12 }]));
    const got = stepped[id]!(input);
    expect(mismatches({ expected: recomputed, tolerance: sharp }, got)).toEqual([]);
  },
);

interface Hanging {
  readonly length: number;
  readonly sag: number;
  readonly w: number;
  readonly span: number;
  readonly mass_per_length: number;
  readonly g: number;
}

/** The catenary c = H/w of a wire of given length that hangs by `sag`, found from the engine's sag alone. */
function catenaryOfLength({ length, sag }: Hanging): number {
  const spanOf = (c: number) => 2 * c * Math.asinh(length / 2 / c);
  const hangs = (c: number) =>
    catenarySagMm({ weightNPerMm: 1, tensionN: c, fromMm: 0, toMm: spanOf(c) }, spanOf(c) / 2);
  return crossing((c) => sag - hangs(c), length / 4, length * 50);
}

function ofLength(input: Hanging) {
  const c = catenaryOfLength(input);
  return { c, span: 2 * c * Math.asinh(input.length / 2 / c), T_max: input.w * (c + input.sag) };
}

const hanging: Readonly<Record<string, (input: Hanging) => object>> = {
  "catenary-625ft": ofLength,
  "catenary-800m": ofLength,
  "catenary-versus-parabola-meriam": ({ span, sag, mass_per_length, g }) => {
    const w = mass_per_length * g;
    const wire = (tensionN: number) => ({ weightNPerMm: w, tensionN, fromMm: 0, toMm: span });
    const tension = (sagOf: typeof catenarySagMm) =>
      crossing((force) => sag - sagOf(wire(force), span / 2), 100, 1e6);
    const [exact, taut] = [tension(catenarySagMm), tension(parabolaSagMm)];
    return {
      parabola_T0: taut / 1000,
      parabola_Tmax: Math.hypot(taut, (w * span) / 2) / 1000,
      catenary_T0: exact / 1000,
      catenary_Tmax: (exact + w * sag) / 1000,
      catenary_length: ((2 * exact) / w) * Math.sinh((w * span) / 2 / exact),
    };
  },
};

describeCases<Hanging, object>("wires: wire-sag", ["wire-sag"], (reference) => {
  const got = hanging[reference.id]!(reference.input);
  expect(mismatches(reference, got)).toEqual([]);
});

interface Growing {
  readonly alpha: number;
  readonly L: number;
  readonly dT: number;
  readonly alpha_1e6_per_K: Readonly<Record<string, number>>;
  readonly L_mm: number;
  readonly dT_K: number;
}

const grow = (expansionPerK: number, lengthMm: number, riseK: number) =>
  growthMm({ direction: "v", expansionPerK, lengthMm, riseK, uncertaintyMm: null });

const growing: Readonly<Record<string, (input: Growing) => object>> = {
  "thermal-openstax-bridge": ({ alpha, L, dT }) => ({ dL: grow(alpha, L, dT) }),
  "thermal-coefficients-callister": ({ alpha_1e6_per_K, L_mm, dT_K }) => ({
    growth_um: Object.values(alpha_1e6_per_K).map((alpha) => 1000 * grow(alpha * 1e-6, L_mm, dT_K)),
  }),
};

describeCases<Growing, object>("growth: thermal-growth", ["thermal-growth"], (reference) => {
  const got = growing[reference.id]!(reference.input);
  expect(mismatches(reference, got)).toEqual([]);
});

describeCases<Growing, object>(
  "growth: the engine's own table of materials",
  ["thermal-growth"],
  ({ input }) => {
    const printed = Object.entries(input.alpha_1e6_per_K);
    const of = (words: string) => printed.find(([name]) => name.includes(words))![1];
    const { steel_1020, steel_1040, steel_4140, steel_4340, stainless_304, stainless_316 } = materials;
    const { stainless_405, stainless_440a, grey_iron_g3000 } = materials;
    expect(
      [steel_1020, steel_1040, steel_4140, steel_4340, stainless_304, stainless_316, stainless_405]
        .concat(stainless_440a, grey_iron_g3000)
        .map(({ expansionPerK }) => Number((expansionPerK * 1e6).toPrecision(12))),
    ).toEqual(["1020", "1040", "4140", "4340", "304", "316", "405", "440A", "grey cast iron"].map(of));
  },
  // The other case is of one bridge.
  ({ input }) => "alpha_1e6_per_K" in input,
);
