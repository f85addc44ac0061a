import { millimetresPer, type LengthUnit } from "../units.ts";

/** Decimals to a tenth of a micrometre or finer across the bore, and to a tenth of a millimetre along the machine. */
const acrossDecimals: Record<LengthUnit, number> = { mm: 4, um: 1, m: 7, in: 5, mil: 2, ft: 6 };
const alongDecimals: Record<LengthUnit, number> = { mm: 1, um: 0, m: 4, in: 2, mil: 0, ft: 3 };

export function decimalsAcross(unit: LengthUnit): number {
  return acrossDecimals[unit];
}
export function decimalsAlong(unit: LengthUnit): number {
  return alongDecimals[unit];
}

/** Decimals at which three figures of the largest of `values` are seen, never fewer than `least`. */
export function decimalsFor(values: readonly (number | null | undefined)[], least: number): number {
  const largest = values.reduce<number>((most, value) => Math.max(most, Math.abs(value ?? 0)), 0);
  if (largest === 0) return least;
  return Math.min(15, Math.max(least, 2 - Math.floor(Math.log10(largest))));
}

/** Fixed decimals with a true minus sign; a value that rounds to nothing has no sign. */
export function writeNumber(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? `\u2212${text}` : text;
}

/** The same with a plus sign, for what has a direction. */
export function writeSigned(value: number, decimals: number): string {
  const text = writeNumber(value, decimals);
  return value > 0 && Number(text) !== 0 ? `+${text}` : text;
}

/** A tick of a scale: as many decimals as its step needs. */
export function writeTick(value: number, step: number): string {
  return writeNumber(value, Math.min(12, Math.max(0, -Math.floor(Math.log10(step) + 1e-9))));
}

/** A factor of exaggeration: two figures, in groups of three. */
export function writeFactor(factor: number): string {
  const rounded = Number(factor.toPrecision(2));
  if (rounded >= 1e9 || rounded < 0.1) return rounded.toExponential(0);
  return rounded >= 1000 ? String(rounded).replace(/\B(?=(\d{3})+$)/g, "\u00a0") : String(rounded);
}

/** Multiplies a length in `from` into `to`. */
export function convertLength(value: number, from: LengthUnit, to: LengthUnit): number {
  return from === to ? value : (value * millimetresPer[from]) / millimetresPer[to];
}
