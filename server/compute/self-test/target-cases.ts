import { stateAt, type Beam } from "../beam/beam.ts";
import type { BeamInput } from "../beam/beam-input.ts";
import { solveBeam } from "../beam/solve-beam.ts";
import { growthMm } from "../targets/growth.ts";
import { materials } from "../targets/materials.ts";
import { catenarySagMm } from "../targets/wire-sag.ts";
import type { SelfCase } from "./self-case.ts";

const level = (...places: number[]) => places.map((zMm) => ({ zMm, upMm: 0 }));

/** Two spans of 120 in under 10 lb/in, E = 29,000, I = 150: consistent units, as in print. */
const twoSpans = (): Readonly<Record<string, number>> => {
  const [spanLength, load, stiffness] = [120, 10, 29_000 * 150];
  const beam = solveBeam({
    startMm: 0,
    pieces: [{ lengthMm: 2 * spanLength, stiffnessNmm2: stiffness, loadNPerMm: load }],
    loads: [],
    supports: level(0, spanLength, 2 * spanLength),
  });
  const lowest = stateAt(beam, 0.4215 * spanLength).upMm;
  return {
    endReaction: beam.supports[0]!.reactionN,
    middleReaction: beam.supports[1]!.reactionN,
    middleMoment: -beam.supports[1]!.momentNmm,
    coefficient: (-lowest * stiffness) / (load * spanLength ** 4),
  };
};

/** The countershaft of seven diameters, in inches and pounds-force; one plane of its gear forces (up positive). */
function countershaft(forces: readonly { readonly x: number; readonly up: number }[]): Beam {
  const steps = [
    [1.25, 1],
    [0.5, 1.4],
    [1.75, 1.625],
    [4, 2],
    [2.25, 1.625],
    [0.5, 1.4],
    [1.25, 1],
  ] as const;
  const pieces: BeamInput["pieces"] = steps.map(([lengthMm, diameter]) => ({
    lengthMm,
    stiffnessNmm2: (30e6 * Math.PI * diameter ** 4) / 64,
    loadNPerMm: 0,
  }));
  const loads = forces.map(({ x, up }) => ({ zMm: x, downN: -up }));
  return solveBeam({ startMm: 0, pieces, loads, supports: level(0.75, 10.75) });
}

const sevenDiameters = (): Readonly<Record<string, number>> => {
  const planes = [
    countershaft([
      { x: 2.75, up: 540 },
      { x: 8.5, up: -2431 },
    ]),
    countershaft([
      { x: 2.75, up: -197 },
      { x: 8.5, up: -885 },
    ]),
  ];
  const together = (of: (beam: Beam) => number) => Math.hypot(...planes.map(of));
  return {
    leftSlope: together((beam) => beam.supports[0]!.slope),
    rightSlope: together((beam) => beam.supports[1]!.slope),
    firstLoadHeight: together((beam) => stateAt(beam, 2.75).upMm),
    secondLoadHeight: together((beam) => stateAt(beam, 8.5).upMm),
  };
};

/** A wire of 625 ft and 2 lb/ft that hangs by 25 ft: c = (s² − h²)/2h = 1,940.625 ft, s half its length. */
const slackWire = (): Readonly<Record<string, number>> => {
  const c = (312.5 ** 2 - 25 ** 2) / 50;
  const span = 2 * c * Math.asinh(312.5 / c);
  const sag = catenarySagMm({ weightNPerMm: 2, tensionN: 2 * c, fromMm: 0, toMm: span }, span / 2);
  return { sag, greatestTension: 2 * (c + sag) };
};

const growths = (): Readonly<Record<string, number>> => {
  const grown = (expansionPerK: number) =>
    1000 * growthMm({ direction: "v", expansionPerK, lengthMm: 1000, riseK: 40, uncertaintyMm: null });
  return {
    steel_1020: grown(materials.steel_1020.expansionPerK),
    stainless_304: grown(materials.stainless_304.expansionPerK),
    stainless_405: grown(materials.stainless_405.expansionPerK),
  };
};

/** Beams, a wire and growths in print. Lengths are in the units of each source. */
export const targetCases: readonly SelfCase[] = [
  {
    id: "beam-two-spans",
    area: "cold-target",
    source:
      "M. Lindeburg, Civil Engineering Reference Manual, beam tables (AISC): two equal spans, even load",
    figures: [
      { figure: "endReaction", expected: 450, tolerance: 1e-6 },
      { figure: "middleReaction", expected: 1500, tolerance: 1e-6 },
      { figure: "middleMoment", expected: 18_000, tolerance: 1e-6 },
      { figure: "coefficient", expected: 0.00541, tolerance: 1e-5 },
    ],
    compute: twoSpans,
  },
  {
    id: "beam-seven-diameters",
    area: "cold-target",
    source: "Shigley's Mechanical Engineering Design, 9th ed., examples 7-2 and 7-3 (partly from memory)",
    figures: [
      { figure: "leftSlope", expected: 0.000501, tolerance: 1.1e-6 },
      { figure: "rightSlope", expected: 0.001095, tolerance: 1.1e-6 },
      { figure: "firstLoadHeight", expected: 0.0009155, tolerance: 2e-7 },
      { figure: "secondLoadHeight", expected: 0.0017567, tolerance: 2e-7 },
    ],
    compute: sevenDiameters,
  },
  {
    id: "wire-625-feet",
    area: "cold-target",
    source:
      "Catenary problems with solutions: wire of 625 ft, 2 lb/ft, sag 25 ft, greatest tension 3,931.25 lb",
    figures: [
      { figure: "sag", expected: 25, tolerance: 1e-9 },
      { figure: "greatestTension", expected: 3931.25, tolerance: 1e-6 },
    ],
    compute: slackWire,
  },
  {
    id: "growth-one-metre",
    area: "cold-target",
    source: "W. D. Callister, Materials Science and Engineering, table B.6: 1,000 mm over 40 K, micrometres",
    figures: [
      { figure: "steel_1020", expected: 468, tolerance: 1e-9 },
      { figure: "stainless_304", expected: 688, tolerance: 1e-9 },
      { figure: "stainless_405", expected: 432, tolerance: 1e-9 },
    ],
    compute: growths,
  },
];
