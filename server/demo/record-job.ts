import type { Transaction } from "sequelize";
import type { Reading, SurveyRequest } from "../../shared/schemas/job-entries.ts";
import type { Deps } from "../deps.ts";
import type { By } from "../services/author.ts";
import { inTransaction } from "../services/in-transaction.ts";
import { checkedReadings, computeSurvey, confirmSurveys, planMoves } from "../services/job-computations.ts";
import { loadJob, type NewEntry } from "../services/job-store.ts";
import { addToJob, createJob, logMove, readJobRecord } from "../services/jobs.ts";
import { createMachine } from "../services/machines.ts";
import { signJob } from "../services/sign-job.ts";
import { fellgateDocument } from "./fellgate-document.ts";
import {
  asFoundReadings,
  asLeftReadings,
  fellgateChecks,
  fellgateJobDetails,
  movesAsPlanned,
} from "./fellgate-job.ts";

/**
 * Stores the demo's machine and a whole job on it, signed, each step from the answers before it. Does nothing where the
 * organisation has a machine: what people made is left alone.
 */
export async function recordJob(deps: Deps, by: By): Promise<void> {
  const organisationId = by.caller.organisation.id;
  if (await deps.database.models.machines.findOne({ where: { organisationId } })) return;
  const change = <T>(work: (transaction: Transaction) => Promise<T>) =>
    inTransaction(deps.database.sequelize, work);

  // Machine and job in one transaction: a start that is cut short leaves neither, and the next makes both.
  const { id } = await change(async (transaction) => {
    const order = { document: fellgateDocument, reason: "First description." };
    const { machine } = await createMachine(deps, transaction, order, by);
    return createJob(deps, transaction, { machineId: machine.id, details: fellgateJobDetails }, by);
  });
  const add = async (...entries: NewEntry[]): Promise<string> => {
    const { ids } = await change((transaction) => addToJob(deps, transaction, id, by, () => entries));
    return ids[0] ?? "";
  };
  const survey = async (document: SurveyRequest, readings: readonly Reading[]): Promise<string> => {
    const surveyId = await add({ kind: "survey", document });
    await add(
      ...(await checkedReadings(deps, await loadJob(deps, organisationId, id), surveyId, readings, null)),
    );
    await add(await computeSurvey(deps, id, surveyId, by));
    return surveyId;
  };

  await add(...fellgateChecks.map((document): NewEntry<"check"> => ({ kind: "check", document })));
  const instrument = "gauge-1";
  const found = await survey({ stage: "as_found", sameSetUp: false, instrument }, asFoundReadings());
  await add(await planMoves(deps, id, { survey: found }, by));
  const { surveys, plans } = await readJobRecord(deps, organisationId, id);
  const [result, plan] = [surveys[0]?.result, plans[0]?.result];
  if (!result || !plan) throw new Error("The demo's survey has no plan.");
  for (const move of movesAsPlanned(plan)) {
    await change((transaction) => logMove(deps, transaction, id, move, by));
  }
  const left = await survey({ stage: "as_left", sameSetUp: true, instrument }, asLeftReadings(result, plan));
  await add(await confirmSurveys(deps, id, { before: found, after: left }, by));
  const meaning = "As-left condition reviewed and accepted.";
  await change((transaction) => signJob(deps, transaction, id, { meaning }, by));
}
