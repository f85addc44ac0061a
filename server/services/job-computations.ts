import type { Transaction } from "sequelize";
import type { z } from "zod";
import { limits } from "../../shared/limits.ts";
import type { jobConfirmationRequest, planRequest } from "../../shared/schemas/job-entries.ts";
import { axisDeviationKind } from "../calculations/axis-deviation.ts";
import { boreFitKind } from "../calculations/bore-fit.ts";
import { confirmationKind } from "../calculations/confirmation.ts";
import { shimMoveKind } from "../calculations/shim-move.ts";
import type { Deps } from "../deps.ts";
import { problemOfFaults } from "../http/http-problem.ts";
import { countingReadings, type EntryDocuments } from "../jobs/job-log.ts";
import {
  axisRequestOf,
  boreFitRequestOf,
  confirmationRequestOf,
  moveRequestOf,
  surveyTitle,
} from "../jobs/job-requests.ts";
import { surveyDriftOf } from "../jobs/survey-drift.ts";
import type { By } from "./author.ts";
import { loadResults } from "./job-results.ts";
import {
  appendEntries,
  loadJob,
  refuseSigned,
  type Added,
  type LoadedJob,
  type NewEntry,
} from "./job-store.ts";
import type { ComputedRecord } from "./run-calculation.ts";
import { computePart } from "./compute-part.ts";
import { computedSurvey, surveyOf } from "./find-survey.ts";
import { writeRecords } from "./write-records.ts";

/** An entry that was computed, with the records that it names: stored together or not at all. */
export interface ComputedEntry {
  readonly entry: NewEntry;
  readonly records: readonly ComputedRecord[];
}

/**
 * Stores what was computed for a job in the transaction that takes its row: the calculations, and the entry in its log.
 * Readings that arrived while it was computed make the entry outdated, which the job then says.
 * @throws HttpProblem not_found, job_signed where the job was signed meanwhile
 */
export async function addComputed(
  deps: Deps,
  transaction: Transaction,
  id: string,
  by: By,
  { entry, records }: ComputedEntry,
): Promise<Added> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id, { transaction });
  refuseSigned(loaded.row);
  await writeRecords(deps.database, records, transaction);
  return appendEntries(deps, transaction, loaded, [entry], by);
}

/**
 * Computes a survey: the fits of the readings that count, then the deviations. Stores nothing but a refusal.
 * @throws HttpProblem survey_empty as too_few_items, or the engine's refusal with the id of its record
 */
export async function computeSurvey(
  deps: Deps,
  loaded: LoadedJob,
  surveyId: string,
  by: By,
): Promise<ComputedEntry> {
  refuseSigned(loaded.row);
  const { row, machine, state } = loaded;
  const basis = { machine, details: state.details };
  const survey = surveyOf(state.surveys, surveyId);
  if (countingReadings(survey).opening.length === 0) {
    throw problemOfFaults([
      { pointer: "", code: "too_few_items", detail: "The survey has no readings yet." },
    ]);
  }
  const call = { deps, caller: by.caller, requestId: by.requestId };
  const note = noteOf(state.details.title, surveyTitle(survey.entry));
  const fit = await computePart(
    call,
    { part: "The bores of the survey", kind: boreFitKind, path: "/v1/bore-fits" },
    { ...boreFitRequestOf(basis, survey, note), jobId: row.id },
  );
  const { bores } = fit.result;
  const deviation = await computePart(
    call,
    { part: "The axis of the survey", kind: axisDeviationKind, path: "/v1/axis-deviations" },
    { ...axisRequestOf(basis, bores, note), jobId: row.id },
  );
  const document: EntryDocuments["survey_result"] = {
    survey: surveyId,
    boreFit: fit.id,
    axisDeviation: deviation.id,
    engineVersion: deviation.engineVersion,
    readings: [...survey.counting],
    drift: surveyDriftOf(basis, survey, bores),
  };
  return { entry: { kind: "survey_result", document }, records: [fit.record, deviation.record] };
}

/** Plans moves from a computed survey. Reads through `transaction` inside of one. */
export async function planMoves(
  deps: Deps,
  loaded: LoadedJob,
  order: z.infer<typeof planRequest>,
  by: By,
  transaction?: Transaction,
): Promise<ComputedEntry> {
  refuseSigned(loaded.row);
  const { row, machine, state } = loaded;
  if ((machine.components ?? []).length === 0) {
    throw problemOfFaults([
      { pointer: "", code: "too_few_items", detail: "The machine has no components that could be moved." },
    ]);
  }
  const { survey, result } = computedSurvey(state.surveys, order.survey);
  const results = await loadResults(deps, loaded, transaction);
  const deviations = results.deviations(result.document.axisDeviation);
  const note = order.note ?? noteOf(state.details.title, `moves from ${surveyTitle(survey.entry)}`);
  const body = moveRequestOf(
    { machine, details: state.details },
    deviations?.stations ?? [],
    order.objective,
    note,
  );
  const moves = await computePart(
    { deps, caller: by.caller, requestId: by.requestId },
    { part: "The moves", kind: shimMoveKind, path: "/v1/shim-moves" },
    { ...body, jobId: row.id },
  );
  const document = { survey: order.survey, surveyResult: result.id, calculation: moves.id };
  return { entry: { kind: "plan", document }, records: [moves.record] };
}

/** Compares two computed surveys of a job. Reads through `transaction` inside of one. */
export async function confirmSurveys(
  deps: Deps,
  loaded: LoadedJob,
  order: z.infer<typeof jobConfirmationRequest>,
  by: By,
  transaction?: Transaction,
): Promise<ComputedEntry> {
  refuseSigned(loaded.row);
  const { row, machine, state } = loaded;
  const before = computedSurvey(state.surveys, order.before);
  const after = computedSurvey(state.surveys, order.after);
  if (state.surveys.indexOf(before.survey) >= state.surveys.indexOf(after.survey)) {
    throw problemOfFaults([
      { pointer: "/after", code: "combination_invalid", detail: "after is a survey later than before." },
    ]);
  }
  const results = await loadResults(deps, loaded, transaction);
  const plan = state.plans.at(-1);
  const [nameOfAfter, nameOfBefore] = [after, before].map(({ survey }) => surveyTitle(survey.entry));
  const body = confirmationRequestOf(
    { machine, details: state.details },
    state,
    {
      before: before.survey,
      after: after.survey,
      fitsOf: ({ result }) => (result ? results.fits(result.document.boreFit) : []),
    },
    plan ? results.moves(plan.document.calculation) : null,
    order.note ?? noteOf(state.details.title, `${nameOfAfter} against ${nameOfBefore}`),
  );
  const confirmed = await computePart(
    { deps, caller: by.caller, requestId: by.requestId },
    { part: "The confirmation", kind: confirmationKind, path: "/v1/confirmations" },
    { ...body, jobId: row.id },
  );
  const document = {
    before: order.before,
    beforeResult: before.result.id,
    after: order.after,
    afterResult: after.result.id,
    calculation: confirmed.id,
  };
  return { entry: { kind: "confirmation", document }, records: [confirmed.record] };
}

const noteOf = (title: string, what: string): string => `${title}, ${what}`.slice(0, limits.noteLength);
