import { radialMm, type PlaneVector } from "../compute/plane.ts";
import type { SightLineInput } from "../compute/sight-line/sight-line-input.ts";
import type { SightLineSetup } from "../compute/sight-line/set-up-sight-line.ts";

interface Warning {
  code: string;
  detail: string;
}

/** Amplification above which stations stand close together for how far the source is (common practice, no source). */
export const amplificationMax = 5;
/** Radians: beyond it a tilt is a slip of units or signs, and a shear is no longer a turn (own rule). */
const tiltMax = 0.05;

/** What the reader must know before the source is moved, or the line of sight is used. */
export function sightLineWarnings(
  { uncertaintyMm, wantedMm }: SightLineInput,
  { move, guardMm, amplification, sourceInside, drift }: SightLineSetup,
  bends: readonly PlaneVector[],
): Warning[] {
  const bendMm = Math.max(0, ...bends.map(radialMm));
  return [
    ...told(
      sourceInside,
      "source_inside_stations",
      "The source stands between the two stations: set it up outside the stations measured, guarded from knocks and heat.",
    ),
    ...told(
      amplification > amplificationMax,
      "stations_close_together",
      `The stations are close together for how far the source is: what is uncertain of a spot is ${amplification.toPrecision(3)} times as large in the shift of the source. Read stations farther apart.`,
    ),
    ...told(
      guardMm !== null && guardMm > wantedMm,
      "wanted_below_guard",
      "The uncertainty of a spot alone is larger than the distance wanted: no reading can show that the beam is within it.",
    ),
    ...told(
      move !== null && Math.hypot(move.tilt.h, move.tilt.v) > tiltMax,
      "tilt_not_small",
      `The tilt is beyond ${tiltMax * 1000} mrad: check units, signs and z before anything is moved.`,
    ),
    ...told(
      drift?.verdict === "refused",
      "drift_refused",
      "The beam wandered by more than is allowed while it was read: no move is answered. Hold the source still, let temperatures settle, and read again.",
    ),
    ...told(
      uncertaintyMm !== null && bendMm > uncertaintyMm,
      "bend_exceeds_uncertainty",
      "Air bends the beam by more than a spot is uncertain: take heat, sun and draught away, or carry the bend in the uncertainty of what is measured off this line.",
    ),
  ];
}

function told(condition: boolean, code: string, detail: string): Warning[] {
  return condition ? [{ code, detail }] : [];
}
