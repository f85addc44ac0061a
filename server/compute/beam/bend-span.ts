import type { BeamStretch, CutBeam } from "./cut-beam.ts";

/**
 * A span between two supports as an element: how its ends turn. With M₀ the moment of the span alone on its two supports,
 * ξ from 0 to 1 along it, and unit end moments 1 − ξ and ξ (J. M. Gere, B. J. Goodno, Mechanics of Materials: theorem of
 * three moments; here for any steps of stiffness).
 */
export interface SpanElement {
  readonly fromMm: number;
  readonly toMm: number;
  /** Left reaction of the span alone, N. */
  readonly leftReactionN: number;
  /** ∫(1 − ξ)²/EI, ∫ξ(1 − ξ)/EI, ∫ξ²/EI, 1/(N·mm). */
  readonly nearNear: number;
  readonly nearFar: number;
  readonly farFar: number;
  /** ∫M₀(1 − ξ)/EI and ∫M₀ξ/EI: how far the loads turn the left end down and the right end up. */
  readonly loadNear: number;
  readonly loadFar: number;
}

/** Bends one span on its own supports. `stretches` are those of the span, from left to right. Linear in their number. */
export function bendSpan(
  stretches: readonly BeamStretch[],
  forces: CutBeam["forces"],
  [fromMm, toMm]: readonly [number, number],
): SpanElement {
  const lengthMm = toMm - fromMm;
  const inner = (zMm: number) => (zMm > fromMm && zMm < toMm ? (forces.get(zMm) ?? 0) : 0);
  let leftReactionN = 0;
  for (const { fromMm: left, toMm: right, loadNPerMm } of stretches) {
    leftReactionN += loadNPerMm * (right - left) * ((toMm - left + (toMm - right)) / (2 * lengthMm));
    leftReactionN += inner(left) * ((toMm - left) / lengthMm);
  }
  const sums = { nearNear: 0, nearFar: 0, farFar: 0, loadNear: 0, loadFar: 0 };
  let momentNmm = 0;
  let shearN = leftReactionN;
  for (const { fromMm: left, toMm: right, stiffnessNmm2, loadNPerMm } of stretches) {
    const h = right - left;
    shearN -= inner(left);
    // Simpson's rule is exact for these cubics.
    for (const [share, weight] of simpson) {
      const t = share * h;
      const far = (left - fromMm + t) / lengthMm;
      const near = (toMm - right + (h - t)) / lengthMm;
      const moment = momentNmm + t * (shearN - (t * loadNPerMm) / 2);
      const flexibility = (weight * h) / stiffnessNmm2;
      sums.nearNear += flexibility * near * near;
      sums.nearFar += flexibility * near * far;
      sums.farFar += flexibility * far * far;
      sums.loadNear += flexibility * near * moment;
      sums.loadFar += flexibility * far * moment;
    }
    momentNmm += h * (shearN - (h * loadNPerMm) / 2);
    shearN -= h * loadNPerMm;
  }
  return { fromMm, toMm, leftReactionN, ...sums };
}

const simpson = [
  [0, 1 / 6],
  [1 / 2, 2 / 3],
  [1, 1 / 6],
] as const;

/** What an overhanging end puts on its support: its weight and the (hogging, negative) moment of it about the support. */
export function overhangAt(
  stretches: readonly BeamStretch[],
  forces: CutBeam["forces"],
  supportMm: number,
): { readonly downN: number; readonly momentNmm: number } {
  let downN = 0;
  let momentNmm = 0;
  const add = (force: number, zMm: number) => {
    downN += force;
    momentNmm -= force * Math.abs(zMm - supportMm);
  };
  const cuts = new Set<number>();
  for (const { fromMm, toMm, loadNPerMm } of stretches) {
    add(loadNPerMm * (toMm - fromMm), fromMm + (toMm - fromMm) / 2);
    cuts.add(fromMm).add(toMm);
  }
  for (const zMm of cuts) if (zMm !== supportMm) add(forces.get(zMm) ?? 0, zMm);
  return { downN, momentNmm };
}
