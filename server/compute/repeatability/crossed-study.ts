import { assertFinite } from "../compute-error.ts";
import type { PlaneCovariance, PlaneVector } from "../plane.ts";
import { fUpperTail } from "../statistics/f-distribution.ts";
import { crossedSums, type CrossedReadings, type CrossedSums, type SquaresLine } from "./crossed-sums.ts";
import { meanSquare, varianceComponents, type VarianceComponents } from "./variance-components.ts";

export interface CrossedInput {
  readonly readings: CrossedReadings;
  /** Coverage probability: an effect is significant when chance makes one as large at most 1 − level of the time. */
  readonly level: number;
  /** Pool the interaction with the repeats when its probability is above this in both planes; null: never. */
  readonly poolAbove: number | null;
}

export type LineName = "station" | "person" | "interaction" | "repeatability" | "total";

/** One line of the table in one plane. */
export interface AnovaLine {
  readonly name: LineName;
  readonly sumOfSquaresMm2: number;
  readonly dof: number;
  /** Null for the total. */
  readonly meanSquareMm2: number | null;
  /** Null where there is nothing to divide by, and for the last two lines. */
  readonly f: number | null;
  readonly pValue: number | null;
  readonly significant: boolean | null;
}

export interface CrossedStudy {
  readonly stations: number;
  readonly people: number;
  readonly repeats: number;
  readonly mean: PlaneVector;
  readonly personOffsets: readonly PlaneVector[];
  /** Pooled: without a line for the interaction, whose squares are in repeatability. */
  readonly table: { readonly h: readonly AnovaLine[]; readonly v: readonly AnovaLine[] };
  readonly pooled: boolean;
  /** The probability that chance makes as large an interaction; null where repeats do not vary. */
  readonly interactionPValue: { readonly h: number | null; readonly v: number | null };
  readonly components: VarianceComponents;
  /** Degrees of freedom of repeatability, and of person + interaction + repeatability (null: nothing varies). */
  readonly dof: {
    readonly repeatability: number;
    readonly reading: { readonly h: number | null; readonly v: number | null };
  };
}

type Plane = "hhMm2" | "vvMm2";

/**
 * A crossed two-way study, stations × people × repeats, by analysis of variance in h and in v and, for the components,
 * in both at once. Stations and people are taken as drawn at random: both are tested against the interaction, and the
 * interaction against the repeats (Montgomery, Design and Analysis of Experiments, 13.3, from memory). Pooled, where
 * asked for and where the interaction's probability is above `poolAbove` in both planes (0.25: AIAG, Measurement
 * Systems Analysis, from memory), station and person are tested against the pooled error. O(readings).
 * @throws ComputeError result_overflow; not_converged
 */
export function analyseCrossedStudy({ readings, level, poolAbove }: CrossedInput): CrossedStudy {
  const sums = crossedSums(readings);
  const { hhMm2, hvMm2, vvMm2 } = sums.total.sums;
  for (const value of [hhMm2, hvMm2, vvMm2]) assertFinite(value, "A sum of squares");
  const { stations, people, repeats, mean, personOffsets } = sums;
  const interactionPValue = {
    h: ratioTest(sums.interaction, sums.repeatability, "hhMm2").pValue,
    v: ratioTest(sums.interaction, sums.repeatability, "vvMm2").pValue,
  };
  const probabilities = [interactionPValue.h ?? 1, interactionPValue.v ?? 1];
  const pooled = poolAbove !== null && probabilities.every((probability) => probability > poolAbove);
  const error = pooled ? joined(sums.interaction, sums.repeatability) : sums.repeatability;
  const meanSquares = {
    station: meanSquare(sums.station),
    person: meanSquare(sums.person),
    interaction: pooled ? meanSquare(error) : meanSquare(sums.interaction),
    repeatability: meanSquare(error),
  };
  const components = varianceComponents(sums, meanSquares);
  return {
    stations,
    people,
    repeats,
    mean,
    personOffsets,
    table: {
      h: tableOf(sums, error, pooled, "hhMm2", 1 - level),
      v: tableOf(sums, error, pooled, "vvMm2", 1 - level),
    },
    pooled,
    interactionPValue,
    components,
    dof: {
      repeatability: error.dof,
      reading: {
        h: readingDof(sums, error, pooled, components, "hhMm2"),
        v: readingDof(sums, error, pooled, components, "vvMm2"),
      },
    },
  };
}

function joined(one: SquaresLine, other: SquaresLine): SquaresLine {
  const add = (entry: keyof PlaneCovariance) => one.sums[entry] + other.sums[entry];
  return {
    sums: { hhMm2: add("hhMm2"), hvMm2: add("hvMm2"), vvMm2: add("vvMm2") },
    dof: one.dof + other.dof,
  };
}

/** F of two mean squares. Against repeats that do not vary an effect is certain, or, where it is 0 too, unknown. */
function ratioTest(
  effect: SquaresLine,
  error: SquaresLine,
  plane: Plane,
): { f: number | null; pValue: number | null } {
  const [square, rest] = [effect.sums[plane], error.sums[plane]];
  if (rest === 0) return { f: null, pValue: square === 0 ? null : 0 };
  const f = square / effect.dof / (rest / error.dof);
  return { f, pValue: fUpperTail(f, effect.dof, error.dof) };
}

function tableOf(
  sums: CrossedSums,
  error: SquaresLine,
  pooled: boolean,
  plane: Plane,
  alpha: number,
): AnovaLine[] {
  const plain = (name: LineName, line: SquaresLine, meanSquareMm2: number | null): AnovaLine => ({
    name,
    sumOfSquaresMm2: line.sums[plane],
    dof: line.dof,
    meanSquareMm2,
    f: null,
    pValue: null,
    significant: null,
  });
  const tested = (name: LineName, line: SquaresLine, against: SquaresLine): AnovaLine => {
    const { f, pValue } = ratioTest(line, against, plane);
    const significant = pValue === null ? null : pValue <= alpha;
    return { ...plain(name, line, line.sums[plane] / line.dof), f, pValue, significant };
  };
  const against = pooled ? error : sums.interaction;
  return [
    tested("station", sums.station, against),
    tested("person", sums.person, against),
    ...(pooled ? [] : [tested("interaction", sums.interaction, sums.repeatability)]),
    plain("repeatability", error, error.sums[plane] / error.dof),
    plain("total", sums.total, null),
  ];
}

/**
 * Degrees of freedom of the variance of one reading by anybody, a sum of mean squares with coefficients:
 * (Σ c·MS)²/Σ((c·MS)²/ν) (Satterthwaite, Biometrics Bulletin 2 (1946) 110). A component that came out below 0 is left
 * out, as it is from the sum.
 */
function readingDof(
  { person, interaction, stations: a, repeats: r }: CrossedSums,
  error: SquaresLine,
  pooled: boolean,
  components: VarianceComponents,
  plane: Plane,
): number | null {
  const byPerson = components.person.estimate[plane] > 0 ? 1 / (a * r) : 0;
  const byInteraction = !pooled && components.interaction.estimate[plane] > 0 ? 1 / r : 0;
  const crossed = byInteraction - byPerson;
  const parts = [
    { line: person, share: byPerson },
    ...(pooled
      ? [{ line: error, share: 1 - byPerson }]
      : [
          { line: interaction, share: crossed },
          { line: error, share: 1 - byInteraction },
        ]),
  ].map(({ line, share }) => ({ part: (share * line.sums[plane]) / line.dof, dof: line.dof }));
  const total = parts.reduce((sum, { part }) => sum + part, 0);
  if (!(total > 0)) return null;
  return 1 / parts.reduce((sum, { part, dof }) => sum + (part / total) ** 2 / dof, 0);
}
