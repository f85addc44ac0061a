import type { z } from "zod";
import { axisDeviationResponse } from "../../shared/schemas/axis-deviations.ts";
import { boreFitResponse } from "../../shared/schemas/bore-fits.ts";
import { shimMoveResponse } from "../../shared/schemas/shim-moves.ts";
import { axisDeviationKind } from "../calculations/axis-deviation.ts";
import { boreFitKind } from "../calculations/bore-fit.ts";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import { shimMoveKind } from "../calculations/shim-move.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Caller } from "../services/caller.ts";
import { computeAs } from "../services/compute-part.ts";
import { inTransaction } from "../services/in-transaction.ts";
import type { ComputedRecord } from "../services/run-calculation.ts";
import { writeRecords } from "../services/write-records.ts";
import {
  cutShortRequest,
  deviationRequest,
  foundCentres,
  leftCentres,
  moveRequest,
  surveyRequest,
} from "./outage-requests.ts";

/**
 * Stores the records of one invented outage, each call made from the answers before it, as a crew would: a survey cut
 * short and refused, as found, deviations, moves, as left. All of them or none: a start that is cut short is completed by
 * the next. Does nothing where anything was computed before.
 */
export async function recordOutage(deps: Deps, caller: Caller): Promise<void> {
  const organisationId = caller.organisation.id;
  if (await deps.database.models.calculations.findOne({ where: { organisationId } })) return;
  const records: ComputedRecord[] = [];
  const run = runnerOf(deps, caller, records);
  const boreFits = { kind: boreFitKind, response: boreFitResponse, path: "/v1/bore-fits" };
  const axisDeviations = {
    kind: axisDeviationKind,
    response: axisDeviationResponse,
    path: "/v1/axis-deviations",
  };
  const shimMoves = { kind: shimMoveKind, response: shimMoveResponse, path: "/v1/shim-moves" };

  const asFound = { centres: foundCentres(), seed: 1, withSlips: true };
  const cutShort = cutShortRequest("Unit 2, brg-2: gauge slipped after two readings", "brg-2", 2, asFound);
  await expectRefusal(run(boreFits, cutShort));

  const found = await run(boreFits, surveyRequest("Unit 2, as found", asFound));
  const before = await run(axisDeviations, deviationRequest("Unit 2, as found", found.result.bores));
  const moves = await run(shimMoves, moveRequest("Unit 2, moves to the axis", before.result));

  const asLeft = { centres: leftCentres(before.result, moves.result), seed: 4, withSlips: false };
  const left = await run(boreFits, surveyRequest("Unit 2, as left", asLeft));
  await run(axisDeviations, deviationRequest("Unit 2, as left", left.result.bores));
  const { database } = deps;
  await inTransaction(database.sequelize, (transaction) => writeRecords(database, records, transaction));
}

interface Target<Request, Response> {
  readonly kind: CalculationKind<Request, { result: unknown }>;
  readonly response: z.ZodType<Response>;
  readonly path: string;
}

/** Computes, and keeps the record for later: of an answer as of a refusal. */
function runnerOf(deps: Deps, caller: Caller, records: ComputedRecord[]) {
  return async <Request extends { readonly note?: string | null | undefined }, Response>(
    { kind, response, path }: Target<Request, Response>,
    body: Request,
  ): Promise<Response> => {
    const record = await computeAs({ deps, caller, requestId: "demo" }, { kind, path }, body);
    records.push(record);
    if ("refusal" in record.told) throw record.told.refusal;
    return response.parse(record.told.answer);
  };
}

/** The demo shows a failed record too; one that did not fail would be a fault of ours. */
async function expectRefusal(run: Promise<unknown>): Promise<void> {
  const outcome = await run.catch((error: unknown) => error);
  if (!(outcome instanceof HttpProblem))
    throw new Error("The survey cut short was not refused.", { cause: outcome });
}
