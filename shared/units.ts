/**
 * The one table of units. Inside the service every length is a float64 in millimetres;
 * factors are exact by definition (1 in = 25.4 mm, 1 mil = 0.001 in).
 */
export const millimetresPer = {
  mm: 1,
  um: 0.001,
  m: 1000,
  in: 25.4,
  mil: 0.0254,
  ft: 304.8,
} as const;

export type LengthUnit = keyof typeof millimetresPer;

/** The units each dimension of a call may be stated in. */
export const unitChoices = {
  axial: ["mm", "m", "in", "ft"],
  bore: ["mm", "in"],
  offset: ["mm", "um", "in", "mil"],
} as const;

export type Dimension = keyof typeof unitChoices;
export type Units = { [D in Dimension]: (typeof unitChoices)[D][number] };

/** Multiplies a length in `unit` into millimetres. */
export function toMillimetres(value: number, unit: LengthUnit): number {
  return value * millimetresPer[unit];
}

/** Divides a length in millimetres into `unit`: division, so that a round trip stays within one unit in the last place. */
export function fromMillimetres(valueMm: number, unit: LengthUnit): number {
  return valueMm / millimetresPer[unit];
}

/** The two directions of one dimension of one call, bound to the units that the call states. */
export interface Converter {
  readonly unit: LengthUnit;
  toMm(value: number): number;
  fromMm(valueMm: number): number;
  /** Squares (variances, covariances): unit² to mm². */
  squareToMm2(value: number): number;
  squareFromMm2(valueMm2: number): number;
}

/** Converters for the three dimensions of a call. */
export function convertersFor(units: Units): Record<Dimension, Converter> {
  return { axial: converter(units.axial), bore: converter(units.bore), offset: converter(units.offset) };
}

function converter(unit: LengthUnit): Converter {
  const factor = millimetresPer[unit];
  return {
    unit,
    toMm: (value) => value * factor,
    fromMm: (valueMm) => valueMm / factor,
    squareToMm2: (value) => value * factor * factor,
    squareFromMm2: (valueMm2) => valueMm2 / factor / factor,
  };
}
