/**
 * Criteria of the circle, with the names of ISO 12181-1: least squares (LSCI), minimum zone (MZCI), maximum inscribed
 * (MICI), minimum circumscribed (MCCI); and the geometric least-squares ellipse.
 */
export type CircleMethod = "least_squares" | LimitingMethod | "ellipse";

/** Criteria whose circles lie on the outermost or innermost readings: their contacts. */
export type LimitingMethod = "minimum_zone" | "maximum_inscribed" | "minimum_circumscribed";
