import { stateAt, type Beam } from "../beam/beam.ts";
import { solveBeam } from "../beam/solve-beam.ts";
import { growthMm } from "../targets/growth.ts";
import { catenarySagMm, parabolaSagMm } from "../targets/wire-sag.ts";
import type { SelfCase } from "./self-case.ts";

const level = (...places: number[]) => places.map((zMm) => ({ zMm, upMm: 0 }));

/** Supports 10 apart, 3 of overhang, 10 a length on all of it, EI = 1. */
const overhang = (): Readonly<Record<string, number>> => {
  const beam = solveBeam({
    startMm: 0,
    pieces: [{ lengthMm: 13, stiffnessNmm2: 1, loadNPerMm: 10 }],
    loads: [],
    supports: level(0, 10),
  });
  const [first, second] = beam.supports;
  return {
    supportMoment: -(second?.momentNmm ?? Number.NaN),
    // The moment is greatest where the shear is 0: R₁/w from the first support.
    spanMoment: stateAt(beam, (first?.reactionN ?? Number.NaN) / 10).momentNmm,
    firstReaction: first?.reactionN ?? Number.NaN,
    secondReaction: second?.reactionN ?? Number.NaN,
    tip: -stateAt(beam, 13).upMm,
  };
};

/** A shaft of 1.5 in, then 1.75 in, under 600 lbf. */
function stepShaft(): Readonly<Record<string, number>> {
  const piece = (lengthMm: number, diameter: number) => ({
    lengthMm,
    stiffnessNmm2: (30e6 * Math.PI * diameter ** 4) / 64,
    loadNPerMm: 0,
  });
  const beam: Beam = solveBeam({
    startMm: 0,
    pieces: [piece(8.5, 1.5), piece(11.5, 1.75)],
    loads: [{ zMm: 8, downN: 600 }],
    supports: level(0, 20),
  });
  return {
    leftSlope: beam.supports[0]?.slope ?? Number.NaN,
    rightSlope: beam.supports[1]?.slope ?? Number.NaN,
    heightAt9: stateAt(beam, 9).upMm,
  };
}

/** A cable of 800 m and 0.4 kg/m that hangs by 80 m: c = (s² − h²)/2h = 960 m, s half its length. */
function slackCable(): Readonly<Record<string, number>> {
  const c = (400 ** 2 - 80 ** 2) / 160;
  const span = 2 * c * Math.asinh(400 / c);
  const sag = catenarySagMm({ weightNPerMm: 0.4, tensionN: 0.4 * c, fromMm: 0, toMm: span }, span / 2);
  return { sag, greatestTension: 0.4 * (c + sag) };
}

/** A cable of 12 kg/m over 300 m with the tensions in print: its sag by both curves. */
function cableOfPrint(): Readonly<Record<string, number>> {
  const wire = (kilonewtons: number) => ({
    weightNPerMm: 12 * 9.81,
    tensionN: 1000 * kilonewtons,
    fromMm: 0,
    toMm: 300,
  });
  return { parabola: parabolaSagMm(wire(22.1), 150), catenary: catenarySagMm(wire(23.2), 150) };
}

/** More beams, wires and growths in print, in the units of each source. */
export const sagCases: readonly SelfCase[] = [
  {
    id: "beam-overhang",
    area: "cold-target",
    source:
      "CISC, Handbook of Steel Construction, 11th ed., 5-138, diagram 24: overhanging beam, even load on all of it; its tip from memory",
    figures: [
      { figure: "supportMoment", expected: 45, tolerance: 1e-10 },
      { figure: "spanMoment", expected: 103.5125, tolerance: 1e-10 },
      { figure: "firstReaction", expected: 45.5, tolerance: 1e-10 },
      { figure: "secondReaction", expected: 84.5, tolerance: 1e-10 },
      { figure: "tip", expected: -698.75, tolerance: 1e-6 },
    ],
    compute: overhang,
  },
  {
    id: "beam-step-shaft",
    area: "cold-target",
    source:
      "Shigley's Mechanical Engineering Design, 9th ed., example 4-7: equations (3) and (4) with their four digits",
    figures: [
      { figure: "leftSlope", expected: -0.0016855, tolerance: 1.5e-6 },
      { figure: "rightSlope", expected: 0.0011979, tolerance: 1.5e-6 },
      { figure: "heightAt9", expected: -0.0093355, tolerance: 6e-6 },
    ],
    compute: stepShaft,
  },
  {
    id: "wire-800-metres",
    area: "cold-target",
    source: "Pinoybix, greatest tension of a cable of 800 m, 0.4 kg/m, sag 80 m: 416 kg",
    figures: [
      { figure: "sag", expected: 80, tolerance: 1e-9 },
      { figure: "greatestTension", expected: 416, tolerance: 1e-9 },
    ],
    compute: slackCable,
  },
  {
    id: "wire-parabola-and-catenary",
    area: "cold-target",
    source:
      "J. L. Meriam, L. G. Kraige, Engineering Mechanics: Statics, sample problems 5/17 and 5/18: 300 m, 12 kg/m, 22.1 and 23.2 kN hang by 60 m (from memory)",
    // Half of the tensions' last digit, 0.05 kN, is worth 0.14 m of sag.
    figures: [
      { figure: "parabola", expected: 60, tolerance: 0.14 },
      { figure: "catenary", expected: 60, tolerance: 0.14 },
    ],
    compute: cableOfPrint,
  },
  {
    id: "growth-bridge",
    area: "cold-target",
    source: "OpenStax, College Physics, example 13.3: 1,275 m of steel over 55 K (answer from memory)",
    figures: [{ figure: "growth", expected: 0.84, tolerance: 0.005 }],
    compute: () => ({
      growth: growthMm({
        direction: "v",
        expansionPerK: 12e-6,
        lengthMm: 1275,
        riseK: 55,
        uncertaintyMm: null,
      }),
    }),
  },
];
