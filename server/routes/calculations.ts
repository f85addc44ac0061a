import { Op, type WhereOptions } from "sequelize";
import type { z } from "zod";
import {
  calculationPage,
  calculationRecord,
  listCalculationsQuery,
  replaySchema,
} from "../../shared/schemas/calculations.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { presentCalculation, presentCalculationSummary } from "../presenters/present-calculation.ts";
import { readCallerNames } from "../services/caller-names.ts";
import { findCalculation } from "../services/find-calculation.ts";
import { readPage } from "../services/read-page.ts";
import { replayCalculation } from "../services/replay-calculation.ts";
import { matchesText } from "../services/text-search.ts";

type Filters = z.infer<typeof listCalculationsQuery>;

const HEAVY_COLUMNS = ["requestText", "requestCanonical", "answerText"];

const listCalculations = defineOperation({
  operationId: "listCalculations",
  method: "get",
  path: "/v1/calculations",
  tag: "Records",
  summary: "List calculations",
  description:
    "Records of the organisation, newest first, a page at a time. Rows that arrive meanwhile move no other row.",
  query: listCalculationsQuery,
  response: { status: 200, description: "One page.", schema: calculationPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { cursor, limit, ...filters } = call.query;
    const organisationId = callerOf(call).organisation.id;
    const page = await readPage(
      call.deps,
      call.deps.database.models.calculations,
      { list: "calculations", organisationId, filters },
      { cursor, limit },
      { where: whereOf(filters), attributes: { exclude: HEAVY_COLUMNS } },
    );
    const names = await readCallerNames(call.deps.database, organisationId, page.rows);
    return reply(200, {
      data: page.rows.map((row) => presentCalculationSummary(row, names)),
      nextCursor: page.nextCursor,
      limit: page.limit,
    });
  },
});

const readCalculation = defineOperation({
  operationId: "readCalculation",
  method: "get",
  path: "/v1/calculations/{id}",
  tag: "Records",
  summary: "Read a calculation",
  description:
    "What was asked, as received, and what was answered, as sent; who asked, with which key, and which engine answered.",
  response: { status: 200, description: "The record. It never changes.", schema: calculationRecord },
  errors: [],
  handle: async (call) => {
    const organisationId = callerOf(call).organisation.id;
    const row = await findCalculation(call.deps, organisationId, call.params.id ?? "");
    const names = await readCallerNames(call.deps.database, organisationId, [row]);
    const headers = { ETag: `"${row.id}"`, "Cache-Control": "private, no-cache", Vary: "Authorization" };
    return reply(200, presentCalculation(row, names), headers);
  },
});

const replayCalculationOperation = defineOperation({
  operationId: "replayCalculation",
  method: "post",
  path: "/v1/calculations/{id}/replay",
  tag: "Records",
  summary: "Replay a calculation",
  description:
    "Computes the stored request anew with today's engine and tells whether the answer is the same, and where it is not. Stores nothing.",
  response: { status: 200, description: "Same, or every place that differs.", schema: replaySchema },
  errors: [],
  handle: async (call) => {
    const row = await findCalculation(call.deps, callerOf(call).organisation.id, call.params.id ?? "");
    return reply(200, await replayCalculation(call.deps, row));
  },
});

function whereOf({
  kind,
  status,
  jobId,
  keyId,
  from,
  to,
  q,
}: Omit<Filters, "cursor" | "limit">): WhereOptions {
  const conditions: WhereOptions[] = [];
  if (kind) conditions.push({ kind });
  if (status) conditions.push({ status });
  if (jobId) conditions.push({ jobId });
  if (keyId) conditions.push({ keyId });
  if (from) conditions.push({ createdAt: { [Op.gte]: new Date(from) } });
  if (to) conditions.push({ createdAt: { [Op.lt]: new Date(to) } });
  if (q !== undefined) conditions.push(matchesText("note", q));
  return { [Op.and]: conditions };
}

export const calculationOperations = [listCalculations, readCalculation, replayCalculationOperation];
