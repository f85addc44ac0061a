import { worstVarianceMm2, type PlaneCovariance } from "../plane.ts";
import type { CrossedSums, SquaresLine } from "./crossed-sums.ts";

export type ComponentName = "repeatability" | "person" | "interaction" | "station";

/** One source of scatter: how much it adds to the variance of a single reading. */
export interface VarianceComponent {
  /** As estimated, mm²: below 0 where chance alone made the mean squares come out in the wrong order. */
  readonly estimate: PlaneCovariance;
  /** `estimate` with 0 for what came out below 0, mm². */
  readonly hVarianceMm2: number;
  readonly vVarianceMm2: number;
  /** The nearest matrix that can be a covariance: `estimate` with 0 for eigenvalues below 0, mm². */
  readonly covariance: PlaneCovariance;
}

export type VarianceComponents = Readonly<Record<ComponentName, VarianceComponent>>;

/** Mean squares of the lines that the components are estimated from. */
export interface MeanSquares {
  readonly station: PlaneCovariance;
  readonly person: PlaneCovariance;
  /** That of the pooled error where the interaction was pooled. */
  readonly interaction: PlaneCovariance;
  readonly repeatability: PlaneCovariance;
}

/**
 * Components of variance of a crossed study, stations and people both taken as drawn at random, from the expected mean
 * squares (Montgomery, Design and Analysis of Experiments, 13.3, from memory): repeatability MSₑ; interaction
 * (MSᵢ − MSₑ)/r; person (MSₚ − MSᵢ)/(a·r); station (MSₛ − MSᵢ)/(b·r). Where the interaction is pooled MSᵢ = MSₑ, the
 * pooled one, and its component is 0. In both planes at once, as matrices.
 */
export function varianceComponents(
  { stations: a, people: b, repeats: r }: Pick<CrossedSums, "stations" | "people" | "repeats">,
  mean: MeanSquares,
): VarianceComponents {
  return {
    repeatability: component(mean.repeatability),
    interaction: component(difference(mean.interaction, mean.repeatability, r)),
    person: component(difference(mean.person, mean.interaction, a * r)),
    station: component(difference(mean.station, mean.interaction, b * r)),
  };
}

/** Sums of squares over their degrees of freedom. */
export function meanSquare({ sums, dof }: SquaresLine): PlaneCovariance {
  return { hhMm2: sums.hhMm2 / dof, hvMm2: sums.hvMm2 / dof, vvMm2: sums.vvMm2 / dof };
}

/** What several sources add together. */
export function sumOfComponents(parts: readonly VarianceComponent[]): VarianceComponent {
  const add = (of: (part: VarianceComponent) => number) => parts.reduce((sum, part) => sum + of(part), 0);
  const matrix = (name: "estimate" | "covariance"): PlaneCovariance => ({
    hhMm2: add((part) => part[name].hhMm2),
    hvMm2: add((part) => part[name].hvMm2),
    vvMm2: add((part) => part[name].vvMm2),
  });
  return {
    estimate: matrix("estimate"),
    hVarianceMm2: add((part) => part.hVarianceMm2),
    vVarianceMm2: add((part) => part.vVarianceMm2),
    covariance: matrix("covariance"),
  };
}

/** Whether chance made the estimate come out below 0 in a plane, so that 0 stands for it. */
export function isNegative({ estimate }: VarianceComponent): boolean {
  return estimate.hhMm2 < 0 || estimate.vvMm2 < 0;
}

function component(estimate: PlaneCovariance): VarianceComponent {
  return {
    estimate,
    hVarianceMm2: Math.max(0, estimate.hhMm2),
    vVarianceMm2: Math.max(0, estimate.vvMm2),
    covariance: nearestCovariance(estimate),
  };
}

function difference(of: PlaneCovariance, less: PlaneCovariance, over: number): PlaneCovariance {
  return {
    hhMm2: (of.hhMm2 - less.hhMm2) / over,
    hvMm2: (of.hvMm2 - less.hvMm2) / over,
    vvMm2: (of.vvMm2 - less.vvMm2) / over,
  };
}

function nearestCovariance(matrix: PlaneCovariance): PlaneCovariance {
  const larger = worstVarianceMm2(matrix);
  const smaller = matrix.hhMm2 + matrix.vvMm2 - larger;
  if (smaller >= 0) return matrix;
  if (larger <= 0) return { hhMm2: 0, hvMm2: 0, vvMm2: 0 };
  // What the larger eigenvalue leaves: its own direction, which lies at half this angle from h.
  const twice = Math.atan2(2 * matrix.hvMm2, matrix.hhMm2 - matrix.vvMm2);
  return {
    hhMm2: (larger * (1 + Math.cos(twice))) / 2,
    hvMm2: (larger * Math.sin(twice)) / 2,
    vvMm2: (larger * (1 - Math.cos(twice))) / 2,
  };
}
