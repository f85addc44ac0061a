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

/** Units of what is no length, stated by the calls that use it. */
export const furtherUnitChoices = {
  temperature: ["C", "F"],
  mass: ["kg", "lb"],
  force: ["N", "lbf"],
  density: ["kg/m3", "lb/in3"],
  modulus: ["GPa", "psi"],
} as const;

export type FurtherDimension = keyof typeof furtherUnitChoices;
export type FurtherUnit<D extends FurtherDimension> = (typeof furtherUnitChoices)[D][number];
export type FurtherUnits = { readonly [D in FurtherDimension]?: FurtherUnit<D> | undefined };

/** International pound of 1959, exact. */
const kilogramsPerPound = 0.45359237;
/** The pound under standard gravity, 9.80665 m/s² (3rd CGPM, 1901): exact. */
const newtonsPerPoundForce = 4.4482216152605;

/**
 * The units used inside, in each of those stated: kelvin (of a difference of temperature), kilogram, newton, kilogram per
 * cubic millimetre, newton per square millimetre. Exact by definition, but for the last place of a quotient.
 */
export const insidePer = {
  temperature: { C: 1, F: 5 / 9 },
  mass: { kg: 1, lb: kilogramsPerPound },
  force: { N: 1, lbf: newtonsPerPoundForce },
  density: { "kg/m3": 1e-9, "lb/in3": kilogramsPerPound / 25.4 ** 3 },
  modulus: { GPa: 1000, psi: newtonsPerPoundForce / 25.4 ** 2 },
} as const satisfies { readonly [D in FurtherDimension]: Readonly<Record<FurtherUnit<D>, number>> };

/** Absolute zero in each unit of temperature, exact by definition. */
export const absoluteZero = { C: -273.15, F: -459.67 } as const;

/** The standard reference temperature of lengths, 20 °C by ISO 1:2016, in each unit of temperature, exact. */
export const referenceTemperature = { C: 20, F: 68 } as const;

/** The two directions of what is no length. */
export interface FurtherConverter {
  readonly unit: string;
  readonly toInside: (value: number) => number;
  readonly fromInside: (value: number) => number;
}

/** @throws RangeError where no unit is stated: a call is refused for that before anything of it is converted. */
export function furtherConverter<D extends FurtherDimension>(
  dimension: D,
  unit: FurtherUnit<D> | undefined,
): FurtherConverter {
  if (unit === undefined) throw new RangeError(`units.${dimension} is not stated.`);
  return byFactor(unit, (insidePer[dimension] as Readonly<Record<string, number>>)[unit]!);
}

/** Mass per length, kg/mm inside: with kg goes the metre, with lb the foot. @throws RangeError as `furtherConverter` */
export function massPerLengthConverter(massUnit: FurtherUnits["mass"]): FurtherConverter {
  const length = massUnit === "lb" ? "ft" : "m";
  const { unit, toInside } = furtherConverter("mass", massUnit);
  return byFactor(`${unit}/${length}`, toInside(1) / millimetresPer[length]);
}

/** Expansion per degree of the stated unit, 1/K inside. @throws RangeError as `furtherConverter` */
export function expansionConverter(temperatureUnit: FurtherUnits["temperature"]): FurtherConverter {
  const { unit, toInside, fromInside } = furtherConverter("temperature", temperatureUnit);
  return { unit: `1/${unit}`, toInside: fromInside, fromInside: toInside };
}

/** Temperature along a length, K/mm inside: with C goes the metre, with F the foot. @throws RangeError as `furtherConverter` */
export function gradientConverter(temperatureUnit: FurtherUnits["temperature"]): FurtherConverter {
  const length = temperatureUnit === "F" ? "ft" : "m";
  const { unit, toInside } = furtherConverter("temperature", temperatureUnit);
  return byFactor(`${unit}/${length}`, toInside(1) / millimetresPer[length]);
}

function byFactor(unit: string, factor: number): FurtherConverter {
  return { unit, toInside: (value) => value * factor, fromInside: (value) => value / factor };
}
