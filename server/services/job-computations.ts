import type { z } from "zod";
import { limits } from "../../shared/limits.ts";
import { boreFitRequest } from "../../shared/schemas/bore-fits.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";
import type { jobConfirmationRequest, planRequest } from "../../shared/schemas/job-entries.ts";
import { axisDeviationKind } from "../calculations/axis-deviation.ts";
import { boreFitKind } from "../calculations/bore-fit.ts";
import { confirmationKind } from "../calculations/confirmation.ts";
import { shimMoveKind } from "../calculations/shim-move.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { schemaFaults } from "../http/schema-faults.ts";
import { readingFaults } from "../jobs/job-faults.ts";
import { countingReadings, type SourceFile, type SurveyState } from "../jobs/job-log.ts";
import {
  axisRequestOf,
  boreFitCall,
  boreFitRequestOf,
  closingId,
  confirmationRequestOf,
  moveRequestOf,
  surveyTitle,
} from "../jobs/job-requests.ts";
import type { By } from "./author.ts";
import { loadJob, loadResults, refuseSigned, type LoadedJob, type NewEntry } from "./job-store.ts";
import { explaining, storeCalculation } from "./store-calculation.ts";

/**
 * Checks readings as the engine would, each at its own place: a reading that cannot be fitted is refused before any is
 * stored, while the crew still stands at the bore.
 * @throws HttpProblem naming every fault of every reading under /readings
 */
export async function checkedReadings(
  deps: Deps,
  { machine, state }: Pick<LoadedJob, "machine" | "state">,
  surveyId: string,
  readings: readonly Reading[],
  sourceFile: SourceFile | null,
): Promise<NewEntry<"reading">[]> {
  const survey = surveyOf(state.surveys, surveyId);
  const faults = readingFaults(readings, machine, state.details);
  if (faults.length > 0) throw problemOfFaults(faults);
  const call = boreFitCall(
    { machine, details: state.details },
    readings,
    survey.entry.document.instrument ?? null,
    null,
  );
  // Several readings of one station may come in one call; fitted together here, each needs a name of its own.
  const body = { ...call, bores: call.bores.map((bore, index) => ({ ...bore, id: `reading ${index}` })) };
  const shape = schemaFaults(boreFitRequest, body);
  const outcome = shape.length > 0 ? null : await deps.compute.run(boreFitKind, body);
  const refused = outcome?.status === "failed" ? outcome.faults : shape;
  if (refused.length > 0) {
    throw problemOfFaults(
      refused.map((fault) => ({ ...fault, pointer: fault.pointer.replace(/^\/bores\//, "/readings/") })),
    );
  }
  // Each keeps the end it was seen from: the job's may be entered anew, and must not turn what was read before.
  return readings.map((reading) => ({
    kind: "reading",
    document: {
      survey: surveyId,
      reading: { ...reading, seen: reading.seen ?? state.details.seen },
      sourceFile,
    },
  }));
}

/**
 * Computes a survey: the fits of the readings that count, then the deviations, each kept as a calculation of the job.
 * @throws HttpProblem survey_empty as too_few_items, or the engine's refusal with the id of its record
 */
export async function computeSurvey(
  deps: Deps,
  id: string,
  surveyId: string,
  by: By,
): Promise<NewEntry<"survey_result">> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id);
  refuseSigned(loaded.row);
  const { machine, state } = loaded;
  const basis = { machine, details: state.details };
  const survey = surveyOf(state.surveys, surveyId);
  if (countingReadings(survey).opening.length === 0) {
    throw problemOfFaults([
      { pointer: "", code: "too_few_items", detail: "The survey has no readings yet." },
    ]);
  }
  const call = { deps, caller: by.caller, requestId: by.requestId };
  const note = noteOf(state.details.title, surveyTitle(survey.entry));
  const fit = await explaining(
    "The bores of the survey",
    storeCalculation(
      call,
      { kind: boreFitKind, path: "/v1/bore-fits" },
      {
        ...boreFitRequestOf(basis, survey, note),
        jobId: id,
      },
    ),
  );
  const { bores } = fit.result;
  const deviation = await explaining(
    "The axis of the survey",
    storeCalculation(
      call,
      { kind: axisDeviationKind, path: "/v1/axis-deviations" },
      {
        ...axisRequestOf(basis, bores, note),
        jobId: id,
      },
    ),
  );
  return {
    kind: "survey_result",
    document: {
      survey: surveyId,
      boreFit: fit.id,
      axisDeviation: deviation.id,
      engineVersion: deviation.engineVersion,
      readings: [...survey.counting],
      drift: driftOf(survey, bores),
    },
  };
}

/** Plans moves from a computed survey, kept as a calculation of the job. */
export async function planMoves(
  deps: Deps,
  id: string,
  order: z.infer<typeof planRequest>,
  by: By,
): Promise<NewEntry<"plan">> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id);
  refuseSigned(loaded.row);
  const { machine, state } = loaded;
  if ((machine.components ?? []).length === 0) {
    throw problemOfFaults([
      { pointer: "", code: "too_few_items", detail: "The machine has no components that could be moved." },
    ]);
  }
  const survey = computedSurvey(state.surveys, order.survey);
  const deviations = (await loadResults(deps, loaded)).deviations(survey.axisDeviation);
  const note = order.note ?? noteOf(state.details.title, `moves from ${surveyTitle(survey.entry)}`);
  const body = moveRequestOf(
    { machine, details: state.details },
    deviations?.stations ?? [],
    order.objective,
    note,
  );
  const moves = await explaining(
    "The moves",
    storeCalculation(
      { deps, caller: by.caller, requestId: by.requestId },
      { kind: shimMoveKind, path: "/v1/shim-moves" },
      { ...body, jobId: id },
    ),
  );
  return { kind: "plan", document: { survey: order.survey, calculation: moves.id } };
}

/** Compares two computed surveys of a job, kept as a calculation of it. */
export async function confirmSurveys(
  deps: Deps,
  id: string,
  order: z.infer<typeof jobConfirmationRequest>,
  by: By,
): Promise<NewEntry<"confirmation">> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id);
  refuseSigned(loaded.row);
  const { machine, state } = loaded;
  const before = computedSurvey(state.surveys, order.before);
  const after = computedSurvey(state.surveys, order.after);
  if (state.surveys.indexOf(before.survey) >= state.surveys.indexOf(after.survey)) {
    throw problemOfFaults([
      { pointer: "/after", code: "combination_invalid", detail: "after is a survey later than before." },
    ]);
  }
  const results = await loadResults(deps, loaded);
  const plan = state.plans.at(-1);
  const body = confirmationRequestOf(
    { machine, details: state.details },
    state,
    {
      before: before.survey,
      after: after.survey,
      fitsOf: ({ result }) => (result ? results.fits(result.document.boreFit) : []),
    },
    plan ? results.moves(plan.document.calculation) : null,
    order.note ??
      noteOf(state.details.title, `${surveyTitle(after.entry)} against ${surveyTitle(before.entry)}`),
  );
  const confirmed = await explaining(
    "The confirmation",
    storeCalculation(
      { deps, caller: by.caller, requestId: by.requestId },
      { kind: confirmationKind, path: "/v1/confirmations" },
      { ...body, jobId: id },
    ),
  );
  return {
    kind: "confirmation",
    document: { before: order.before, after: order.after, calculation: confirmed.id },
  };
}

/** @throws HttpProblem not_found */
export function surveyOf(surveys: readonly SurveyState[], id: string): SurveyState {
  const survey = surveys.find(({ entry }) => entry.id === id);
  if (!survey) throw new HttpProblem("not_found", "The job has no survey with this id.");
  return survey;
}

function computedSurvey(surveys: readonly SurveyState[], id: string) {
  const survey = surveyOf(surveys, id);
  if (!survey.result || !survey.isCurrent) {
    throw new HttpProblem("survey_not_computed", `Survey ${id} has readings that were not computed yet.`);
  }
  return { survey, entry: survey.entry, axisDeviation: survey.result.document.axisDeviation };
}

function driftOf(
  survey: SurveyState,
  bores: readonly { readonly id: string; readonly centre: { readonly h: number; readonly v: number } }[],
): NewEntry<"survey_result">["document"]["drift"] {
  const [closing] = countingReadings(survey).closing;
  if (!closing) return null;
  const { station } = closing.document.reading;
  const opened = bores.find(({ id }) => id === station)?.centre;
  const closed = bores.find(({ id }) => id === closingId(station))?.centre;
  return opened && closed ? { station, h: closed.h - opened.h, v: closed.v - opened.v } : null;
}

const noteOf = (title: string, what: string): string => `${title}, ${what}`.slice(0, limits.noteLength);
