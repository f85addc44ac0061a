import { radialMm, type PlaneVector } from "../plane.ts";
import type { ClosingReading, TwoStations } from "./sight-line-input.ts";

export interface SightDrift {
  /** Closing less opening reading. */
  readonly change: PlaneVector;
  readonly within: boolean;
  readonly verdict: "accepted" | "shared_out" | "refused";
  /** What is to be added to the beam of each station, in the order read. */
  readonly corrections: readonly [PlaneVector, PlaneVector];
}

const none: PlaneVector = { hMm: 0, vMm: 0 };
/** Where the second station's reading stands between the opening and the closing one. */
const shareOfSecond = 1 / 2;

/**
 * How the beam wandered while it was read: the first station again at the end, less its first reading. Within the
 * allowed distance it is accepted, or shared out evenly over the readings in their order, all put back to the moment of
 * the first one; beyond it the survey is refused (common practice, no source). Millimetres.
 */
export function judgeDrift([first]: TwoStations, { beam, allowedMm, shareOut }: ClosingReading): SightDrift {
  const change = { hMm: beam.hMm - first.beam.hMm, vMm: beam.vMm - first.beam.vMm };
  const within = radialMm(change) <= allowedMm;
  if (!within) return { change, within, verdict: "refused", corrections: [none, none] };
  if (!shareOut) return { change, within, verdict: "accepted", corrections: [none, none] };
  const half = { hMm: -change.hMm * shareOfSecond, vMm: -change.vMm * shareOfSecond };
  return { change, within, verdict: "shared_out", corrections: [none, half] };
}
