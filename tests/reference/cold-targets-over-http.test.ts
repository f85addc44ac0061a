import { afterAll, beforeAll, expect } from "vitest";
import type { ColdTargetRequest, ColdTargetResult } from "../../shared/schemas/cold-targets.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** The published cases through the whole service: JSON in, a stored record, JSON out. */
let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  key = (await (await makeOrganisation(app.deps)).key("calculations:write")).secret;
});
afterAll(() => app.close());

async function post(body: ColdTargetRequest): Promise<ColdTargetResult> {
  const answer = await app.call().post("/v1/cold-targets").set("Authorization", `Bearer ${key}`).send(body);
  expect(answer.status, answer.text).toBe(201);
  return (answer.body as { result: ColdTargetResult }).result;
}

const millimetres = { axial: "mm", bore: "mm", offset: "mm" } as const;
const newtons = { ...millimetres, force: "N", mass: "kg", density: "kg/m3", modulus: "GPa" } as const;
const inches = {
  axial: "in",
  bore: "in",
  offset: "in",
  mass: "lb",
  density: "lb/in3",
  modulus: "psi",
} as const;
const rotorAt = (...places: number[]): ColdTargetRequest["stations"] =>
  places.map((z, i) => ({ id: `s${i}`, z, follows: "rotor" }));
/** Heights of the shaft at the stations. */
const heights = ({ stations }: ColdTargetResult) => stations.map(({ parts }) => parts.rotor!.v);

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

const modulus = 200; // GPa
/** A solid steel shaft and the weight per length of one kg/m³ of it, N/mm. */
const outer = 100;
const stiffness = (modulus * 1000 * Math.PI * outer ** 4) / 64;
const weightPerDensity = (1e-9 * 9.80665 * Math.PI * outer ** 2) / 4;

/** A shaft of 100 mm that weighs `w` N/mm: heights are those of the case times its EI over the shaft's. */
const evenShaft = (length: number, w: number, ...places: number[]) => ({
  sections: [{ length, outer }],
  modulus,
  density: w / weightPerDensity,
  supports: places.map((z) => ({ z })),
});

const uniform: Readonly<Record<string, (input: Uniform) => Promise<object>>> = {
  "beam-overhang-uniform-all": async ({ L, a, w, EI }) => {
    const stations = rotorAt(L + a);
    const result = await post({ units: newtons, stations, rotor: evenShaft(L + a, w, 0, L) });
    const [R1, R2] = result.rotor!.supports.map(({ reaction }) => reaction!.v);
    // Moments are not answered: they follow from the reactions by statics.
    return {
      R1,
      R2,
      support_moment: (w * a * a) / 2,
      span_moment: (R1! * R1!) / (2 * w),
      tip_deflection_down: (-heights(result)[0]! * stiffness) / EI,
    };
  },
  "beam-simple-formulas": async ({ L, w, P, a, E, I }) => {
    const loaded = await post({ units: newtons, stations: rotorAt(L / 2), rotor: evenShaft(L, w, 0, L) });
    const pressed = await post({
      units: newtons,
      stations: rotorAt(a, 2354.2486889354095),
      rotor: { ...evenShaft(L, 0, 0, L), masses: [{ z: a, mass: P / 9.80665 }] },
    });
    const scale = -stiffness / (E * I);
    const [under, most] = heights(pressed);
    return {
      udl_mid: heights(loaded)[0]! * scale,
      udl_end_slope: loaded.rotor!.supports[0]!.slope.v * scale,
      point_under: under! * scale,
      point_max: most! * scale,
      point_max_x: 2354.2486889354095,
    };
  },
  "beam-two-span-uniform": async ({ span, w }) => {
    const at = 0.4215351654086268;
    const rotor = evenShaft(2 * span, w, 0, span, 2 * span);
    const result = await post({ units: newtons, stations: rotorAt(at * span), rotor });
    const reactions = result.rotor!.supports.map(({ reaction }) => reaction!.v);
    return {
      reactions,
      support_moment: (w * span * span) / 2 - reactions[0]! * span,
      deflection_coefficient: (-heights(result)[0]! * stiffness) / (w * span ** 4),
      max_position_ratio: at,
    };
  },
};

describeCases<Uniform, object>("POST /v1/cold-targets: beam-uniform", ["beam-uniform"], async (reference) => {
  const got = await uniform[reference.id]!(reference.input);
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

/**
 * A weightless shaft in inches and pounds under one force of a case, as a mass that weighs as many pounds-force.
 * Forces up are turned: heights come back with the sign of the force.
 */
async function press({ E, segments, supports }: Stepped, { x, P }: Force, ...places: number[]) {
  const result = await post({
    units: { ...inches, force: "lbf" },
    stations: rotorAt(...places),
    rotor: {
      sections: segments.map(({ x0, x1, diameter }) => ({ length: x1 - x0, outer: diameter })),
      modulus: E,
      density: 0,
      masses: [{ z: x, mass: Math.abs(P) }],
      supports: supports.map((z) => ({ z })),
    },
  });
  const sign = -Math.sign(P);
  return {
    up: heights(result).map((up) => up * sign),
    slopes: result.rotor!.supports.map(({ slope }) => slope.v * sign),
    reactions: result.rotor!.supports.map(({ reaction }) => reaction!.v * sign),
  };
}

const stepped: Readonly<Record<string, (input: Stepped) => Promise<object>>> = {
  "beam-shigley-4-7-stepped": async (input) => {
    const { up, slopes, reactions } = await press(input, input.point_loads![0]!, ...input.query_x!);
    return { deflection: up, slope_at_supports: slopes, reactions };
  },
  "beam-shigley-7-3-seven-diameters": async (input) => {
    const loads = input.loads_xz!.map(({ x }) => x);
    // The slope at a load is half the difference of two heights beside it, over their distance.
    const beside = 1e-4;
    const asked = [...loads, ...loads.flatMap((x) => [x - beside, x + beside])];
    const planes = [input.loads_xz!, input.loads_xy!].map(async (forces) => {
      const each = await Promise.all(forces.map((force) => press(input, force, ...asked)));
      const sum = (of: (one: (typeof each)[number]) => number) => each.reduce((all, one) => all + of(one), 0);
      return {
        up: loads.map((_, i) => sum(({ up }) => up[i]!)),
        slopes: [
          ...input.supports.map((_, i) => sum(({ slopes }) => slopes[i]!)),
          ...loads.map((_, i) => sum(({ up }) => up[2 * i + 3]! - up[2 * i + 2]!) / (2 * beside)),
        ],
      };
    });
    const [first, second] = await Promise.all(planes);
    return {
      slope_rad: first!.slopes.map((slope, i) => Math.hypot(slope, second!.slopes[i]!)),
      deflection_in: first!.up.map((up, i) => Math.hypot(up, second!.up[i]!)),
    };
  },
};

describeCases<Stepped, object>("POST /v1/cold-targets: beam-stepped", ["beam-stepped"], async (reference) => {
  const got = await stepped[reference.id]!(reference.input);
  expect(mismatches(reference, got)).toEqual([]);
});

interface Hanging {
  readonly length: number;
  readonly sag: number;
  readonly w: number;
  readonly span: number;
  readonly mass_per_length: number;
  readonly g: number;
}
type Wire = NonNullable<ColdTargetRequest["wire"]>;

/** A wire alone, and its greatest sags in metres or feet. */
async function hang(wire: Wire, units: ColdTargetRequest["units"], perLength: number) {
  const stations = [{ id: "end", z: wire.span[0]!, follows: "bearing_line" as const }];
  const found = await post({ units, stations, wire });
  expect(found.stations[0]!.wireSag).toBe(0);
  const { greatestSag, greatestSagByParabola } = found.wire!;
  return { catenary: greatestSag / perLength, parabola: greatestSagByParabola / perLength };
}

const metres = { axial: "m", bore: "mm", offset: "mm", mass: "kg", force: "N" } as const;
const feet = { axial: "ft", bore: "in", offset: "in", mass: "lb", force: "lbf" } as const;
const near = (got: number, wanted: number) => expect(Math.abs(got / wanted - 1)).toBeLessThan(1e-12);

const hanging: Readonly<Record<string, (input: Hanging) => Promise<void>>> = {
  // c = 1940.625 ft and the span follow from length and sag; the service must find that sag again.
  "catenary-625ft": async ({ length, sag, w }) => {
    const c = 1940.625;
    const span = [0, 2 * c * Math.asinh(length / 2 / c)];
    near((await hang({ massPerLength: w, tension: w * c, span }, feet, 12)).catenary, sag);
    // A pound hung weighs a pound-force.
    near((await hang({ massPerLength: w, hungMass: w * c, span }, feet, 12)).catenary, sag);
  },
  "catenary-800m": async ({ length, sag, w }) => {
    const c = 960;
    const span = [0, 2 * c * Math.asinh(length / 2 / c)];
    near((await hang({ massPerLength: w, hungMass: w * c, span }, metres, 1000)).catenary, sag);
  },
  "catenary-versus-parabola-meriam": async ({ span, sag, mass_per_length, g }) => {
    const massPerLength = (mass_per_length * g) / 9.80665;
    const wire = (tension: number) => ({ massPerLength, tension, span: [0, span] });
    near((await hang(wire(23_162.44311377395), metres, 1000)).catenary, sag);
    near((await hang(wire(22_072.5), metres, 1000)).parabola, sag);
  },
};

describeCases<Hanging, object>("POST /v1/cold-targets: wire-sag", ["wire-sag"], async ({ id, input }) => {
  await hanging[id]!(input);
  expect(Object.keys(hanging)).toContain(id);
});

interface Growing {
  readonly alpha: number;
  readonly L: number;
  readonly dT: number;
  readonly alpha_1e6_per_K: Readonly<Record<string, number>>;
  readonly L_mm: number;
  readonly dT_K: number;
}

/** Bearings on the axis, each grown by one coefficient per degree. */
function grow(
  units: ColdTargetRequest["units"],
  coefficients: readonly number[],
  length: number,
  rise: number,
) {
  const stations = coefficients.map((coefficient, i) => ({
    id: `s${i}`,
    z: i,
    follows: "bearing_line" as const,
    growth: { length, coefficient, hot: rise, cold: 0 },
  }));
  return post({ units, stations });
}

const growing: Readonly<Record<string, (input: Growing) => Promise<object>>> = {
  "thermal-openstax-bridge": async ({ alpha, L, dT }) => {
    const { stations } = await grow({ ...millimetres, temperature: "C" }, [alpha], L * 1000, dT);
    return { dL: stations[0]!.parts.growth.v / 1000 };
  },
  "thermal-coefficients-callister": async ({ alpha_1e6_per_K, L_mm, dT_K }) => {
    const perKelvin = Object.values(alpha_1e6_per_K).map((alpha) => alpha * 1e-6);
    const celsius = { ...millimetres, offset: "um", temperature: "C" } as const;
    const fahrenheit = { ...celsius, temperature: "F" } as const;
    const { stations } = await grow(celsius, perKelvin, L_mm, dT_K);
    const same = await grow(
      fahrenheit,
      perKelvin.map((alpha) => alpha / 1.8),
      L_mm,
      dT_K * 1.8,
    );
    same.stations.forEach(({ target }, i) => near(target.v, stations[i]!.target.v));
    return { growth_um: stations.map(({ target }) => -target.v) };
  },
};

describeCases<Growing, object>(
  "POST /v1/cold-targets: thermal-growth",
  ["thermal-growth"],
  async (reference) => {
    const got = await growing[reference.id]!(reference.input);
    expect(mismatches(reference, got)).toEqual([]);
  },
);
