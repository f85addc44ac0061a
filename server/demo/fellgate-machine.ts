import type { z } from "zod";
import type { offsetPair, toleranceSchema } from "../../shared/schemas/common.ts";
import type { Units } from "../../shared/units.ts";

/** h to the right and v up, in millimetres. */
export type OffsetPair = z.infer<typeof offsetPair>;
type Tolerance = z.infer<typeof toleranceSchema>;

/** How a bore is read, and the shape of its wall. Lengths in millimetres, clock angles in the downstream view. */
export interface Wall {
  readonly instrument: "points" | "turned_gauge";
  readonly seen: "downstream" | "upstream";
  readonly everyDeg: number;
  /** Where nothing can be read: blades, oil grooves, a probe in the way. */
  readonly gapsDeg: readonly (readonly [from: number, to: number])[];
  readonly oversize: number;
  /** Largest radius less the mean one, and the clock angle of the long axis. */
  readonly outOfRound: number;
  readonly longAxisDeg: number;
  /** Standard uncertainty stated for one reading; the scatter put on it is the same. */
  readonly readingUncertainty: number;
  /** The reading that went wrong in the as-found survey, and by how much. */
  readonly slip?: { readonly index: number; readonly by: number };
}

/** One bore of the machine. Lengths in millimetres. */
export interface FellgateStation {
  readonly id: string;
  readonly z: number;
  readonly nominalDiameter: number;
  readonly target: OffsetPair;
  readonly targetUncertainty: OffsetPair;
  readonly tolerance: Tolerance;
  readonly wall: Wall;
  /** Where the bore lay when the outage began, off its target. */
  readonly foundOff: OffsetPair;
}

export const units: Units = { axial: "mm", bore: "mm", offset: "mm" };
/** The stations that the axis is laid through: a bearing at one end, a shroud at the other. */
export const referenceStations = ["brg-1", "shr-3"];

const bearingSpan = 6900;
const rotorSagAtMidspan = 0.11;

/**
 * How far the rotor's own weight lowers it at z between its bearings, in millimetres: the deflection of a uniform beam on
 * two simple supports, 16/5·(ξ − 2ξ³ + ξ⁴) of that at midspan (any handbook of beams).
 */
function rotorSag(z: number): number {
  const share = z / bearingSpan;
  return (16 / 5) * rotorSagAtMidspan * (share - 2 * share ** 3 + share ** 4);
}

/** To the micrometre, as targets are issued and instruments read. */
export const micrometre = (valueMm: number): number => Math.round(valueMm * 1000) / 1000;

const bearingTolerance: Tolerance = { h: 0.05, v: [-0.03, 0.07] };
const bearingWall: Wall = {
  instrument: "turned_gauge",
  seen: "downstream",
  everyDeg: 15,
  gapsDeg: [
    [80, 100],
    [260, 280],
  ],
  oversize: 0.02,
  outOfRound: 0.004,
  longAxisDeg: 90,
  readingUncertainty: 0.008,
};
const casingWall: Wall = {
  instrument: "points",
  seen: "downstream",
  everyDeg: 10,
  gapsDeg: [[150, 210]],
  oversize: 0.12,
  outOfRound: 0.01,
  longAxisDeg: 8,
  readingUncertainty: 0.03,
};
const ringWall: Wall = { ...casingWall, everyDeg: 12, oversize: 0.06, readingUncertainty: 0.025 };

interface Growth {
  /** Upwards, from the supports to the centre line, between cold and steady running. */
  readonly v: number;
  /** Its standard uncertainty. */
  readonly u: number;
}
type Rest = Pick<FellgateStation, "tolerance" | "wall" | "foundOff">;

/** A part round the rotor: its target is the rotor less its growth. */
function part(id: string, z: number, nominalDiameter: number, growth: Growth, rest: Rest): FellgateStation {
  return { id, z, nominalDiameter, ...targetAt(-rotorSag(z), growth), ...rest };
}

/** A bearing: its target is the line less its growth; its journal runs off it by its own oil film. */
function bearing(
  id: string,
  z: number,
  nominalDiameter: number,
  growth: Growth,
  rest: Rest,
): FellgateStation {
  return { id, z, nominalDiameter, ...targetAt(0, growth), ...rest };
}

const targetAt = (rotorV: number, growth: Growth) => ({
  target: { h: 0, v: micrometre(rotorV - growth.v) },
  targetUncertainty: { h: 0.003, v: growth.u },
});

/** Unit 2 of an invented works, toward the generator: the row of bores of a single-shaft gas turbine. */
export const fellgateStations: readonly FellgateStation[] = [
  bearing(
    "brg-1",
    0,
    360,
    { v: 0.14, u: 0.006 },
    {
      tolerance: bearingTolerance,
      wall: bearingWall,
      foundOff: { h: 0.01, v: 0.015 },
    },
  ),
  part(
    "cas-1",
    620,
    1480,
    { v: 0.09, u: 0.008 },
    {
      tolerance: { radial: 0.12 },
      wall: casingWall,
      foundOff: { h: 0.07, v: -0.13 },
    },
  ),
  part(
    "cas-2",
    1240,
    1440,
    { v: 0.1, u: 0.008 },
    {
      tolerance: { radial: 0.12 },
      wall: {
        ...casingWall,
        gapsDeg: [
          [20, 60],
          [300, 340],
        ],
      },
      foundOff: { h: 0.11, v: -0.17 },
    },
  ),
  part(
    "cas-3",
    1860,
    1390,
    { v: 0.12, u: 0.008 },
    {
      tolerance: { radial: 0.12 },
      wall: {
        ...casingWall,
        gapsDeg: [
          [100, 130],
          [230, 260],
        ],
      },
      foundOff: { h: 0.1, v: -0.21 },
    },
  ),
  part(
    "cas-4",
    2480,
    1350,
    { v: 0.14, u: 0.01 },
    {
      tolerance: { radial: 0.12 },
      wall: { ...casingWall, gapsDeg: [[200, 290]], slip: { index: 17, by: 0.6 } },
      foundOff: { h: 0.15, v: -0.22 },
    },
  ),
  part(
    "cas-5",
    3100,
    1320,
    { v: 0.17, u: 0.01 },
    {
      tolerance: { radial: 0.12 },
      wall: casingWall,
      foundOff: { h: 0.15, v: -0.27 },
    },
  ),
  part(
    "dif-1",
    3720,
    1300,
    { v: 0.19, u: 0.012 },
    {
      tolerance: { radial: 0.2 },
      wall: { ...casingWall, gapsDeg: [[60, 120]], outOfRound: 0.012 },
      foundOff: { h: 0.19, v: -0.29 },
    },
  ),
  part(
    "noz-1",
    4420,
    1780,
    { v: 0.22, u: 0.012 },
    {
      tolerance: { radial: 0.15 },
      wall: { ...ringWall, instrument: "turned_gauge" },
      foundOff: { h: 0.06, v: -0.24 },
    },
  ),
  part(
    "shr-1",
    4650,
    1820,
    { v: 0.22, u: 0.012 },
    {
      tolerance: { radial: 0.12 },
      wall: {
        ...ringWall,
        gapsDeg: [
          [0, 30],
          [330, 360],
        ],
      },
      foundOff: { h: -0.05, v: -0.19 },
    },
  ),
  part(
    "noz-2",
    4920,
    1920,
    { v: 0.21, u: 0.012 },
    {
      tolerance: { radial: 0.15 },
      wall: { ...ringWall, instrument: "turned_gauge", gapsDeg: [[120, 160]] },
      foundOff: { h: 0.09, v: -0.16 },
    },
  ),
  part(
    "shr-2",
    5150,
    1960,
    { v: 0.21, u: 0.012 },
    {
      tolerance: { radial: 0.12 },
      wall: ringWall,
      foundOff: { h: -0.07, v: -0.13 },
    },
  ),
  part(
    "shr-3",
    5680,
    2110,
    { v: 0.2, u: 0.008 },
    {
      tolerance: { radial: 0.12 },
      wall: { ...ringWall, seen: "upstream" },
      foundOff: { h: 0, v: 0.02 },
    },
  ),
  part(
    "exh-1",
    6240,
    980,
    { v: 0.16, u: 0.015 },
    {
      tolerance: { h: 0.3, v: 0.3 },
      wall: {
        ...casingWall,
        seen: "upstream",
        gapsDeg: [
          [30, 70],
          [150, 190],
          [270, 310],
        ],
      },
      foundOff: { h: -0.12, v: -0.41 },
    },
  ),
  bearing(
    "brg-2",
    6900,
    400,
    { v: 0.19, u: 0.006 },
    {
      tolerance: bearingTolerance,
      wall: { ...bearingWall, seen: "upstream" },
      foundOff: { h: 0.05, v: -0.11 },
    },
  ),
];
