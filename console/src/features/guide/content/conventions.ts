import type { Dimension, FurtherDimension } from "../../../../../shared/units.ts";

export const zSays: readonly string[] = [
  "`z` is the position along the bore line from one common face, increasing downstream. Downstream is an end named for each machine, such as toward the generator: trains and double-flow casings have no single flow.",
];

export const sectionSays: readonly string[] = [
  "A cross-section is seen looking downstream: `h` is positive to the right, `v` positive up. `clockDeg` is the angle clockwise from 12 o'clock in that view.",
  "Every bore says from which end it was read: `seen` is downstream or upstream, and has no default. What was read from the other end is turned on entry, `clockDeg` to 360 − `clockDeg` and h to −h, because nothing in the residuals would show the mistake. Answers are always in the downstream view.",
];

export const deviationSays: readonly string[] = [
  "deviation = centre − target − axis(z), in h and v, with its length and its own clock angle. Positive: the bore lies right, or high. A target says where a centre should lie relative to the axis, so a reference station sits at its target, not on the axis itself.",
];

export const numberSays: readonly string[] = [
  "1 in = 25.4 mm and 1 mil = 0.001 in, exactly. Inside, every length is a 64-bit float in millimetres; answers come back in the units asked in.",
  "Uncertainties sent in are standard (k = 1). Expanded ones in answers carry k and the degrees of freedom; `dof` null is infinite. A missing datum is absent or null, never 0. Gauge readings are sent as read, never halved.",
];

export const shimSays: readonly string[] = [
  "The change of a stack is positive when it becomes thicker. Left and right are as seen downstream.",
];

export interface UnitUse {
  readonly dimension: Dimension | FurtherDimension;
  readonly used: string;
}

/** What each unit of a call is the unit of. The last five are stated by the calls that use them. */
export const unitUses: readonly UnitUse[] = [
  { dimension: "axial", used: "z, and lengths along the machine" },
  { dimension: "bore", used: "coordinates of points on a wall, diameters" },
  {
    dimension: "offset",
    used: "readings from nominal, centres, targets, deviations, tolerances, shims, uncertainties; covariances in its square",
  },
  {
    dimension: "temperature",
    used: "hot and cold metal, gauge and part; expansion is per degree of it, a gradient in it per m or ft",
  },
  { dimension: "mass", used: "masses on the rotor, a hung mass; a wire's mass per m or ft" },
  { dimension: "force", used: "tension of a wire; reactions" },
  { dimension: "density", used: "of the shaft" },
  { dimension: "modulus", used: "of elasticity of the shaft" },
];
