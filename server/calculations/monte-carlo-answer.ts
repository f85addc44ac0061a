import type {
  BoreMonteCarlo,
  MonteCarloFigure,
  MonteCarloRequest,
  StationMonteCarlo,
} from "../../shared/schemas/monte-carlo.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { StationTrials } from "../compute/axis/axis-trials.ts";
import type { BoreFit } from "../compute/bore/bore-fit.ts";
import type { BoreTrials } from "../compute/bore/bore-trials.ts";
import type { TrialSummary } from "../compute/monte-carlo/confirm-interval.ts";
import type { TrialPlan } from "../compute/monte-carlo/trial-plan.ts";

type Warnings = BoreMonteCarlo["warnings"];

/** The plan of a call's trials; the digits are those of the call's own offset unit. */
export function readTrialPlan(asked: MonteCarloRequest, offset: Converter): TrialPlan {
  const { trials, seed, significantDigits } = asked;
  return { trials, seed, digits: significantDigits ?? null, unitMm: offset.toMm(1) };
}

/** The trials of a bore in the units of the call. */
export function answerBoreTrials(
  plan: TrialPlan,
  fit: BoreFit,
  found: BoreTrials | null,
  { bore, offset }: Record<Dimension, Converter>,
): BoreMonteCarlo {
  const figures = {
    h: found && answerFigure(found.h, offset, offset),
    v: found && answerFigure(found.v, offset, offset),
    diameter: found?.diameter ? answerFigure(found.diameter, bore, offset) : null,
  };
  const putAside = fit.form === "rotating_target" ? 0 : fit.exclusions.length;
  const held =
    found && putAside > 0
      ? [
          {
            code: "exclusions_held",
            detail: `The ${putAside} readings put aside stay aside in every trial: that the rule might choose others is not in the numbers.`,
          },
        ]
      : [];
  return { ...answerOf(plan, figures, found?.failures ?? new Map(), held), ...figures };
}

/** The trials of a station's deviation in the units of the call. */
export function answerStationTrials(
  plan: TrialPlan,
  found: StationTrials | null,
  failures: ReadonlyMap<string, number>,
  offset: Converter,
): StationMonteCarlo {
  const figures = {
    h: found && answerFigure(found.h, offset, offset),
    v: found && answerFigure(found.v, offset, offset),
  };
  return { ...answerOf(plan, figures, found ? failures : new Map(), []), ...figures };
}

function answerFigure(found: TrialSummary, place: Converter, offset: Converter): MonteCarloFigure {
  const { mean, standard, interval, digits, tolerance, difference, sampling, confirmed } = found;
  const ends = (pair: { low: number; high: number } | null) =>
    pair && { low: offset.fromMm(pair.low), high: offset.fromMm(pair.high) };
  return {
    mean: mean === null ? null : plain(place.fromMm(mean)),
    standardUncertainty: standard === null ? null : offset.fromMm(standard),
    interval: interval && [plain(place.fromMm(interval.low)), plain(place.fromMm(interval.high))],
    significantDigits: digits,
    tolerance: offset.fromMm(tolerance),
    difference: ends(difference),
    sampling: ends(sampling),
    confirmed,
  };
}

function answerOf(
  { trials, seed }: TrialPlan,
  figures: Readonly<Record<string, MonteCarloFigure | null>>,
  failures: ReadonlyMap<string, number>,
  others: Warnings,
) {
  const known = Object.entries(figures).flatMap(([name, figure]) => (figure ? [{ name, ...figure }] : []));
  const named = (confirmed: boolean | null) =>
    known.filter((figure) => figure.confirmed === confirmed).map(({ name }) => name);
  const failed = [...failures.values()].reduce((sum, count) => sum + count, 0);
  const [refuted, open] = [named(false), named(null)];
  const confirmed =
    known.length === 0 || (open.length > 0 && refuted.length === 0) ? null : refuted.length === 0;
  const byCode = [...failures].map(([code, count]) => `${code} ${count}`).join(", ");
  const warn = (when: boolean, code: string, detail: string) => (when ? [{ code, detail }] : []);
  const warnings = [
    ...warn(
      known.length === 0,
      "uncertainty_unknown",
      "No uncertainty is known of what was read, so there is nothing to draw and nothing to confirm.",
    ),
    ...warn(
      refuted.length > 0,
      "first_order_not_confirmed",
      `The first-order interval of ${refuted.join(", ")} lies farther than the tolerance from that of the trials: use the latter.`,
    ),
    ...warn(
      open.length > 0,
      "trials_too_few",
      `Whether the first-order interval of ${open.join(", ")} is confirmed cannot be told by the trials that were computed; more would tell.`,
    ),
    ...warn(
      failed > 0,
      "trials_failed",
      `${failed} of ${trials} trials could not be computed (${byCode}). Mean and standard uncertainty are those of the others; each might have fallen anywhere, and sampling allows for that.`,
    ),
    ...warn(
      known.some(({ mean, standardUncertainty }) => mean === null || standardUncertainty === null),
      "moments_undefined",
      "With so few degrees of freedom the distribution has no standard deviation, at one or fewer no mean; its interval stands.",
    ),
    ...others,
  ];
  return { trials, seed, failed, confirmed, warnings };
}

/** Without the sign of a negative zero, which JSON drops. */
function plain(value: number): number {
  return value + 0;
}
