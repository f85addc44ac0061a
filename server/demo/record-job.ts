import type { Transaction } from "sequelize";
import type { Reading, SurveyRequest } from "../../shared/schemas/job-entries.ts";
import type { Deps } from "../deps.ts";
import type { By } from "../services/author.ts";
import { checkedReadings } from "../services/check-readings.ts";
import { inTransaction } from "../services/in-transaction.ts";
import {
  addComputed,
  computeSurvey,
  confirmSurveys,
  planMoves,
  type ComputedEntry,
} from "../services/job-computations.ts";
import { loadJob, type LoadedJob, type NewEntry } from "../services/job-store.ts";
import { addToJob, createJob, logMove, recordOf } from "../services/jobs.ts";
import { createMachine } from "../services/machines.ts";
import { signJob } from "../services/sign-job.ts";
import { fellgateDocument } from "./fellgate-document.ts";
import {
  asFoundReadings,
  asFoundSurvey,
  asLeftReadings,
  asLeftSurvey,
  fellgateChecks,
  fellgateJobDetails,
  movesAsPlanned,
} from "./fellgate-job.ts";

/**
 * Stores the demo's machine and a whole job on it, signed, each step from the answers before it, all in one transaction:
 * a start that is cut short leaves nothing of it, and the next makes it whole. Does nothing where the organisation has a
 * machine: what people made is left alone.
 */
export async function recordJob(deps: Deps, by: By): Promise<void> {
  const organisationId = by.caller.organisation.id;
  if (await deps.database.models.machines.findOne({ where: { organisationId } })) return;
  await inTransaction(deps.database.sequelize, (transaction) => writeJob(deps, transaction, by));
}

async function writeJob(deps: Deps, transaction: Transaction, by: By): Promise<void> {
  const order = { document: fellgateDocument, reason: "First description." };
  const { machine } = await createMachine(deps, transaction, order, by);
  const job = { machineId: machine.id, details: fellgateJobDetails };
  const { id } = await createJob(deps, transaction, job, by);
  const load = () => loadJob(deps, by.caller.organisation.id, id, { transaction });
  const add = async (...entries: NewEntry[]): Promise<string> => {
    const { ids } = await addToJob(deps, transaction, id, by, () => entries);
    return ids[0] ?? "";
  };
  const compute = async (work: (loaded: LoadedJob) => Promise<ComputedEntry>) =>
    addComputed(deps, transaction, id, by, await work(await load()));
  const survey = async (document: SurveyRequest, readings: readonly Reading[]): Promise<string> => {
    const surveyId = await add({ kind: "survey", document });
    await add(...(await checkedReadings(deps, await load(), surveyId, readings, null)));
    await compute((loaded) => computeSurvey(deps, loaded, surveyId, by));
    return surveyId;
  };

  await add(...fellgateChecks.map((document): NewEntry<"check"> => ({ kind: "check", document })));
  const found = await survey(asFoundSurvey, asFoundReadings());
  await compute((loaded) => planMoves(deps, loaded, { survey: found }, by, transaction));
  const { surveys, plans } = await recordOf(deps, await load(), transaction);
  const [result, plan] = [surveys[0]?.result, plans[0]?.result];
  if (!result || !plan) throw new Error("The demo's survey has no plan.");
  for (const move of movesAsPlanned(plan)) await logMove(deps, transaction, id, move, by);
  const left = await survey(asLeftSurvey, asLeftReadings(result, plan));
  await compute((loaded) => confirmSurveys(deps, loaded, { before: found, after: left }, by, transaction));
  await signJob(deps, transaction, id, { meaning: "As-left condition reviewed and accepted." }, by);
}
