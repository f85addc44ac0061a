import type { BeamPiece, PointLoad } from "./beam-input.ts";

/** Standard gravity, m/s² = N/kg: exact by definition (3rd CGPM, 1901; ISO 80000-3). */
export const standardGravity = 9.80665;

/** A cylinder, solid where the inner diameter is 0. */
export interface ShaftSection {
  readonly lengthMm: number;
  readonly outerMm: number;
  readonly innerMm: number;
}

/** A stepped shaft of one material, its sections end to end from `startMm`, with what is carried on it. */
export interface Shaft {
  readonly startMm: number;
  readonly sections: readonly ShaftSection[];
  readonly densityKgPerMm3: number;
  readonly modulusNPerMm2: number;
  readonly masses: readonly { readonly zMm: number; readonly massKg: number }[];
}

/**
 * The sections as pieces of a beam: stiffness E·π(D⁴ − d⁴)/64 in N·mm², own weight ρ·g·π(D² − d²)/4 in N/mm (none where
 * `weightless`). The differences are taken as products, so that a thin wall loses no digits.
 */
export function piecesOf(
  { sections, densityKgPerMm3, modulusNPerMm2 }: Shaft,
  weightless = false,
): BeamPiece[] {
  return sections.map(({ lengthMm, outerMm, innerMm }) => {
    const ring = (outerMm - innerMm) * (outerMm + innerMm);
    const stiffnessNmm2 = (modulusNPerMm2 * Math.PI * ring * (outerMm * outerMm + innerMm * innerMm)) / 64;
    const weightNPerMm = (densityKgPerMm3 * standardGravity * Math.PI * ring) / 4;
    return { lengthMm, stiffnessNmm2, loadNPerMm: weightless ? 0 : weightNPerMm };
  });
}

/** What is carried, as weights in N. */
export function loadsOf({ masses }: Shaft): PointLoad[] {
  return masses.map(({ zMm, massKg }) => ({ zMm, downN: massKg * standardGravity }));
}
