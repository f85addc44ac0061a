/** Least and most deviation allowed in one plane, mm. A half-width T is [-T, T]. */
export interface PlaneTolerance {
  readonly minMm: number;
  readonly maxMm: number;
}

/** What a deviation may be: inside a circle, or inside a range in each plane. */
export type Tolerance =
  | { readonly form: "radial"; readonly halfWidthMm: number }
  | { readonly form: "planes"; readonly h: PlaneTolerance; readonly v: PlaneTolerance };

export type Verdict = "conforms" | "undecided" | "exceeds";
