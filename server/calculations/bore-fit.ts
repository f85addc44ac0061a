import type { Fault } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import {
  boreFitRequest,
  boreSchema,
  type BoreFitRequest,
  type BoreFitResult,
  type BoreRequest,
} from "../../shared/schemas/bore-fits.ts";
import { boreFitUnits } from "../../shared/schemas/bore-temperatures.ts";
import { seenSchema } from "../../shared/schemas/common.ts";
import type { BoreMonteCarlo, MonteCarloRequest } from "../../shared/schemas/monte-carlo.ts";
import { convertersFor } from "../../shared/units.ts";
import { fitPreparedBore, prepareBore } from "../compute/bore/fit-bore.ts";
import { fitPreparedCriterion, prepareCriterion } from "../compute/bore/fit-criterion.ts";
import type { BoreInput } from "../compute/bore/bore-input.ts";
import { runBoreTrials } from "../compute/bore/bore-trials.ts";
import { boreAnswerOf } from "./bore-answer.ts";
import { boresIn, duplicateFaults, memberFaults, readingsFault, readingsInCall } from "./bore-faults.ts";
import { boreInputOf, type CallSettings } from "./bore-input.ts";
import { readReduction, temperatureFaults, temperatureUnitFaults } from "./bore-temperature.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { attemptEach, faultOf } from "./collect-faults.ts";
import { answerBoreTrials, readTrialPlan } from "./monte-carlo-answer.ts";
import {
  boreTrialWork,
  levelDefault,
  monteCarloFaults,
  monteCarloFaultsBesideSchema,
} from "./monte-carlo-faults.ts";

/** Readings fitted in less time than a thread takes to be worth it. */
const readingsInPlace = 5_000;
/** A criterion that compares every centre takes as long as least squares of this many readings, and as many times each. */
const searchCost = { each: 500, perReading: 20 };

type Units = BoreFitRequest["units"];

export interface BoreFitAnswer {
  readonly units: Units;
  readonly seen: "downstream";
  readonly level: number;
  readonly result: { readonly bores: readonly BoreFitResult[] };
}

/** POST /v1/bore-fits: every bore of the call is fitted, or every fault of every bore is named. */
export const boreFitKind: CalculationKind<BoreFitRequest, BoreFitAnswer> = {
  kind: "bore-fit",
  request: boreFitRequest,
  answer: answerOf,
  isLong: (request) =>
    request.monteCarlo !== undefined || readingsInCall(request) + searchesIn(request) > readingsInPlace,
  faultsBesideSchema,
};

/** What the searches of a call add to its readings. */
function searchesIn({ bores }: BoreFitRequest): number {
  return bores.reduce((sum, bore) => {
    if ((bore.method ?? "least_squares") === "least_squares") return sum;
    return sum + searchCost.each + searchCost.perReading * readingsInCall({ bores: [bore] });
  }, 0);
}

function answerOf(request: BoreFitRequest): BoreFitAnswer {
  const { units, seen, level = levelDefault, bores, monteCarlo } = request;
  const tooLarge = readingsFault(request);
  if (tooLarge) throw new CalculationRefusal([tooLarge]);
  const duplicates = duplicateFaults(bores);
  const { results: fits, faults } = attemptEach(bores, ["bores"], (bore, index) =>
    fitOne(bore, index, duplicates.get(index), { seen, level }, units),
  );
  // Trials take long: they wait until every bore is known to be fitted.
  const work = fits.reduce((sum, { trialWork }) => sum + trialWork, 0);
  const all = [
    ...temperatureUnitFaults(bores, units),
    ...faults,
    ...monteCarloFaults(monteCarlo, level, work),
  ];
  if (all.length > 0) throw new CalculationRefusal(all);
  const answers = fits.map(({ answer, tried }) =>
    monteCarlo ? { ...answer, monteCarlo: tried(monteCarlo) } : answer,
  );
  return { units, seen: "downstream", level, result: { bores: answers } };
}

/** A fitted bore, and what it would take to try it by Monte Carlo. */
interface Fitted {
  readonly answer: BoreFitResult;
  readonly trialWork: number;
  readonly tried: (asked: MonteCarloRequest) => BoreMonteCarlo;
}

/**
 * @throws CalculationRefusal naming every fault of this bore that shows before the fit
 * @throws ComputeError what the fit itself meets
 */
function fitOne(
  bore: BoreRequest,
  index: number,
  duplicate: Fault | undefined,
  call: CallSettings,
  units: Units,
): Fitted {
  const convert = convertersFor(units);
  const input = boreInputOf(bore, call, convert);
  const prepared = prepare(bore, input);
  const refusals = prepared.kind === "refused" ? prepared.refusals : [];
  const faults = [
    ...(duplicate ? [duplicate] : []),
    ...memberFaults(bore, index),
    ...temperatureFaults(bore, index, units.temperature),
    ...refusals.map((refusal) => faultOf(refusal, ["bores", index])),
  ];
  if (faults.length > 0) throw new CalculationRefusal(faults);
  const fit = prepared.kind === "criterion" ? fitPreparedCriterion(prepared) : fitPreparedBore(prepared);
  return {
    answer: boreAnswerOf(bore, fit, convert, readReduction(bore, units.temperature)),
    trialWork: boreTrialWork(bore, prepared),
    tried: (asked) => {
      const plan = readTrialPlan(asked, convert.offset);
      const found = runBoreTrials(input, bore.method ?? "least_squares", fit, bore.id, plan);
      return answerBoreTrials(plan, fit, found, convert);
    },
  };
}

/** By its criterion; a form that takes least squares only is looked at by that, its method refused beside. */
function prepare({ method = "least_squares" }: BoreRequest, input: BoreInput) {
  const walled = input.form === "points" || input.form === "turned_gauge";
  return walled && method !== "least_squares" ? prepareCriterion(input, method) : prepareBore(input);
}

/**
 * Domain faults of the bores that are well formed, in a body that is not: fitted as if the others were not there.
 * Without sound units only what needs no number can be judged.
 */
function faultsBesideSchema(body: unknown, schemaFaults: readonly Fault[]): readonly Fault[] {
  const bores = boresIn(body);
  if (bores.length === 0 || bores.length > limits.boresPerCall || readingsFault(body)) return [];
  const duplicates = duplicateFaults(bores);
  const sent = body as { readonly units?: unknown; readonly seen?: unknown };
  const units = boreFitUnits.safeParse(sent.units).data;
  const seen = seenSchema.safeParse(sent.seen).data ?? "downstream";
  const { faults } = attemptEach(bores, ["bores"], (one, index) => {
    const faulty = schemaFaults.some(({ pointer }) => `${pointer}/`.startsWith(`/bores/${index}/`));
    const bore = faulty ? undefined : boreSchema.safeParse(one).data;
    const duplicate = duplicates.get(index);
    if (bore && units) return fitOne(bore, index, duplicate, { seen, level: levelDefault }, units);
    throw new CalculationRefusal([
      ...(duplicate ? [duplicate] : []),
      ...(bore ? [...memberFaults(bore, index), ...temperatureFaults(bore, index, undefined)] : []),
    ]);
  });
  return [...temperatureUnitFaults(bores, sent.units), ...faults, ...monteCarloFaultsBesideSchema(body)];
}
