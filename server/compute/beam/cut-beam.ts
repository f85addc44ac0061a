import { ComputeError } from "../compute-error.ts";
import type { BeamInput, BeamPiece, BeamSupport, PointLoad } from "./beam-input.ts";

/** A place this far beyond an end, as a share of the length, is at the end: sums of section lengths are rounded. */
const endSlack = 1e-9;
/** Supports nearer than this share of the length are one. */
const supportGapMin = 1e-9;

/** An even stretch between two cuts. */
export interface BeamStretch extends Omit<BeamPiece, "lengthMm"> {
  readonly fromMm: number;
  readonly toMm: number;
}

/** A beam cut at every support and every force. */
export interface CutBeam {
  readonly stretches: readonly BeamStretch[];
  /** From left to right, with the place that each has in the input. */
  readonly supports: readonly (BeamSupport & { readonly index: number })[];
  /** Sum of the forces at each cut that has any. */
  readonly forces: ReadonlyMap<number, number>;
}

/** First and last place of pieces laid end to end from `startMm`, and how far beyond them still counts as at them. */
export function extentOf(
  startMm: number,
  pieces: readonly { readonly lengthMm: number }[],
): { readonly fromMm: number; readonly toMm: number; readonly slackMm: number } {
  const toMm = pieces.reduce((at, { lengthMm }) => at + lengthMm, startMm);
  return { fromMm: startMm, toMm, slackMm: endSlack * (toMm - startMm) };
}

/** Least distance of two supports that are two, on a beam of this length. */
export function leastSupportGapMm(lengthMm: number): number {
  return supportGapMin * lengthMm;
}

/**
 * Cuts a beam at its supports and forces. Linear but for the sorting of the cuts.
 * @throws ComputeError shaft_unsupported with fewer than two supports apart; out_of_range for a place beyond the ends
 */
export function cutBeam({ startMm, pieces, loads, supports }: BeamInput): CutBeam {
  const extent = extentOf(startMm, pieces);
  const place = <Placed extends BeamSupport | PointLoad>(
    one: Placed,
    list: string,
    index: number,
  ): Placed => {
    const { fromMm, toMm, slackMm } = extent;
    if (!(one.zMm >= fromMm - slackMm && one.zMm <= toMm + slackMm)) {
      throw new ComputeError("out_of_range", "It lies beyond the ends of the beam.", { at: [list, index] });
    }
    return { ...one, zMm: Math.min(toMm, Math.max(fromMm, one.zMm)) };
  };
  const held = supports
    .map((support, index) => ({ ...place(support, "supports", index), index }))
    .sort((a, b) => a.zMm - b.zMm);
  const gapMm = leastSupportGapMm(extent.toMm - extent.fromMm);
  if (held.length < 2 || held.some(({ zMm }, i) => i > 0 && zMm - held[i - 1]!.zMm <= gapMm)) {
    throw new ComputeError("shaft_unsupported", "A beam lies on two or more supports apart from each other.");
  }
  const forces = new Map<number, number>();
  for (const [index, load] of loads.entries()) {
    const { zMm, downN } = place(load, "loads", index);
    forces.set(zMm, (forces.get(zMm) ?? 0) + downN);
  }
  const cuts = [...new Set([...held.map(({ zMm }) => zMm), ...forces.keys()])].sort((a, b) => a - b);
  return { stretches: stretchesOf(startMm, pieces, cuts), supports: held, forces };
}

function stretchesOf(startMm: number, pieces: readonly BeamPiece[], cuts: readonly number[]): BeamStretch[] {
  const stretches: BeamStretch[] = [];
  let fromMm = startMm;
  let next = 0;
  for (const { lengthMm, stiffnessNmm2, loadNPerMm } of pieces) {
    const endMm = fromMm + lengthMm;
    while (next < cuts.length && cuts[next]! <= fromMm) next++;
    for (; next < cuts.length && cuts[next]! < endMm; next++) {
      stretches.push({ fromMm, toMm: cuts[next]!, stiffnessNmm2, loadNPerMm });
      fromMm = cuts[next]!;
    }
    if (endMm > fromMm) stretches.push({ fromMm, toMm: endMm, stiffnessNmm2, loadNPerMm });
    fromMm = endMm;
  }
  return stretches;
}
