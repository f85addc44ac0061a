import { convertLength } from "../write-number.ts";
import { stepAtMost } from "../pick-step.ts";
import type { Point } from "../shape.ts";
import type { BoreSectionModel } from "./bore-section-model.ts";

/** Where everything of a bore section lies on the sheet, and how much it is magnified. */
export interface BoreSectionScale {
  readonly centre: Point;
  /** The fitted circle as drawn. */
  readonly circleRadius: number;
  /** How far from the circle the largest residual in use may be drawn. */
  readonly reach: number;
  /** Sheet millimetres per offset unit of residual. */
  readonly residualScale: number;
  /** Residual between two rings, in the offset unit. */
  readonly ringStep: number;
  readonly rings: readonly number[];
  /** Sheet millimetres per offset unit of centre, null when the centre is at the origin. */
  readonly centreScale: number | null;
  /** Magnification of the residuals against the circle as drawn; null when the diameter is not known. */
  readonly exaggeration: number | null;
}

/**
 * Residuals are drawn as large as their band allows with rings at a 1, 2, 5 step; the way from the origin to the
 * centre is drawn inside the circle at a scale of its own.
 */
export function scaleBoreSection(model: BoreSectionModel, side: number): BoreSectionScale {
  const circleRadius = side * 0.315;
  const reach = side * 0.085;
  const largest = model.points
    .filter((point) => point.used)
    .reduce((most, point) => Math.max(most, Math.abs(point.residual)), 0);
  // Less than a nanometre is arithmetic, and nothing that a drawing should magnify.
  const nanometre = convertLength(1e-6, "mm", model.offsetUnit);
  // With no scatter at all any scale is true: one micrometre fills the band.
  const span = largest > nanometre ? largest : convertLength(0.001, "mm", model.offsetUnit);
  const residualScale = reach / span;
  const ringStep = stepAtMost(span * 0.75);
  const ringCount = Math.floor((reach * 1.02) / (ringStep * residualScale));
  const rings = Array.from({ length: 2 * ringCount + 1 }, (_, index) => (index - ringCount) * ringStep);
  const way = Math.hypot(model.centre.h, model.centre.v);
  const diameterInOffset =
    model.diameter === null ? null : convertLength(model.diameter, model.boreUnit, model.offsetUnit);
  return {
    centre: { x: side / 2, y: side / 2 },
    circleRadius,
    reach,
    residualScale,
    ringStep,
    rings: rings.filter((ring) => ring !== 0),
    centreScale: way > nanometre ? stepAtMost((side * 0.17) / way) : null,
    exaggeration: diameterInOffset === null ? null : residualScale / (circleRadius / (diameterInOffset / 2)),
  };
}
