import type { PlaneCovariance, PlaneVector } from "../plane.ts";
import { isRounding, seriesOf, sumOfProducts, type Series } from "./series.ts";

/** Readings by station, then person, then repeat, mm: every cell alike. */
export type CrossedReadings = readonly (readonly (readonly PlaneVector[])[])[];

/** One line of an analysis of variance: sums of squares and products in both planes, mm². */
export interface SquaresLine {
  readonly sums: PlaneCovariance;
  readonly dof: number;
}

export interface CrossedSums {
  readonly stations: number;
  readonly people: number;
  readonly repeats: number;
  readonly mean: PlaneVector;
  /** Each person's mean of all readings less the mean of all, in the order of the readings. */
  readonly personOffsets: readonly PlaneVector[];
  readonly station: SquaresLine;
  readonly person: SquaresLine;
  readonly interaction: SquaresLine;
  readonly repeatability: SquaresLine;
  readonly total: SquaresLine;
}

/** What the means of a crossed study lie off the mean of all, in one plane. */
interface Effects {
  readonly station: Float64Array;
  readonly person: Float64Array;
  readonly interaction: Float64Array;
  readonly rest: Float64Array;
  readonly all: Float64Array;
}

/**
 * Sums of squares of a balanced crossed two-way study with repeats (Montgomery, Design and Analysis of Experiments,
 * 5.3, from memory): stations b·r·Σ(ȳᵢ.. − ȳ)², people a·r·Σ(ȳ.ⱼ. − ȳ)², interaction r·Σ(ȳᵢⱼ. − ȳᵢ.. − ȳ.ⱼ. + ȳ)²,
 * repeats Σ(y − ȳᵢⱼ.)², a stations, b people, r repeats; and the sums of products of h and v alike. What rounding alone
 * leaves is 0. Callers see to it that every cell has the same number of readings. O(readings).
 */
export function crossedSums(readings: CrossedReadings): CrossedSums {
  const [a, b, r] = [readings.length, readings[0]!.length, readings[0]![0]!.length];
  const flat = readings.flat(2);
  const h = seriesOf(flat.map(({ hMm }) => hMm));
  const v = seriesOf(flat.map(({ vMm }) => vMm));
  const [inH, inV] = [effectsOf(h, a, b, r), effectsOf(v, a, b, r)];
  const line = (name: keyof Effects, each: number, dof: number): SquaresLine => ({
    sums: sumsOf(inH[name], inV[name], each, { h, v }),
    dof,
  });
  return {
    stations: a,
    people: b,
    repeats: r,
    mean: { hMm: h.meanMm, vMm: v.meanMm },
    personOffsets: Array.from(inH.person, (hMm, j) => ({ hMm, vMm: inV.person[j]! })),
    station: line("station", b * r, a - 1),
    person: line("person", a * r, b - 1),
    interaction: line("interaction", r, (a - 1) * (b - 1)),
    repeatability: line("rest", 1, a * b * (r - 1)),
    total: line("all", 1, a * b * r - 1),
  };
}

function effectsOf({ deviationsMm: all }: Series, a: number, b: number, r: number): Effects {
  const station = new Float64Array(a);
  const person = new Float64Array(b);
  const cell = new Float64Array(a * b);
  for (let c = 0; c < a * b; c += 1) {
    let sum = 0;
    for (let k = 0; k < r; k += 1) sum += all[c * r + k]!;
    cell[c] = sum / r;
    station[Math.floor(c / b)]! += sum / (b * r);
    person[c % b]! += sum / (a * r);
  }
  return {
    station,
    person,
    interaction: cell.map((value, c) => value - station[Math.floor(c / b)]! - person[c % b]!),
    rest: all.map((value, i) => value - cell[Math.floor(i / r)]!),
    all,
  };
}

function sumsOf(
  inH: Float64Array,
  inV: Float64Array,
  each: number,
  { h, v }: { readonly h: Series; readonly v: Series },
): PlaneCovariance {
  const squares = (effects: Float64Array, { largestMm }: Series) => {
    const sum = sumOfProducts(effects, effects);
    return isRounding(sum, effects.length, largestMm) ? 0 : each * sum;
  };
  const [hhMm2, vvMm2] = [squares(inH, h), squares(inV, v)];
  return { hhMm2, hvMm2: hhMm2 === 0 || vvMm2 === 0 ? 0 : each * sumOfProducts(inH, inV), vvMm2 };
}
