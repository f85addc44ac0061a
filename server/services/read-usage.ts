import { QueryTypes } from "sequelize";
import type { z } from "zod";
import type { readUsageQuery, usageGroups } from "../../shared/schemas/usage.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { readCallerNames } from "./caller-names.ts";

const DAY_MS = 24 * 60 * 60 * 1000;
const DEFAULT_DAYS = 30;

interface UsageRow {
  readonly groupValue: string | null;
  readonly calls: string;
  readonly succeeded: string;
  readonly durationMs: number;
}

/** What each group is counted by. Days are UTC, and so is the connection. */
const groupColumn: Readonly<Record<(typeof usageGroups)[number], string>> = {
  day: "DATE_FORMAT(createdAt, '%Y-%m-%d')",
  key: "keyId",
  endpoint: "endpoint",
};

/** Calls of an organisation that reached the engine, counted from the events that were stored with them. */
export async function readUsage(deps: Deps, organisationId: string, query: z.infer<typeof readUsageQuery>) {
  const to = query.to ?? dayOf(deps.now());
  const from = query.from ?? dayOf(new Date(Date.parse(to) - (DEFAULT_DAYS - 1) * DAY_MS));
  const groupBy = query.groupBy ?? "day";
  if (from > to) {
    const detail = "from is not after to.";
    throw new HttpProblem("invalid_parameter", detail, {
      errors: [{ parameter: "from", code: "invalid_parameter", detail }],
    });
  }
  const rows = await deps.database.sequelize.query<UsageRow>(
    `SELECT ${groupColumn[groupBy]} AS groupValue, COUNT(*) AS calls, SUM(status = 'succeeded') AS succeeded, SUM(durationMs) AS durationMs
     FROM usage_events WHERE organisationId = $organisationId AND createdAt >= $from AND createdAt < $end
     GROUP BY groupValue ORDER BY ${groupBy === "day" ? "groupValue" : "calls DESC, groupValue"}`,
    {
      bind: { organisationId, from: new Date(from), end: new Date(Date.parse(to) + DAY_MS) },
      type: QueryTypes.SELECT,
    },
  );
  const names = await readCallerNames(
    deps.database,
    organisationId,
    rows.map(({ groupValue }) => ({ memberId: null, keyId: groupBy === "key" ? groupValue : null })),
  );
  const data = rows.map((row) => ({ ...groupOf(row.groupValue), ...countsOf(row) }));
  return { from, to, groupBy, data, total: sumOf(data) };

  function groupOf(value: string | null) {
    if (groupBy === "key") return { key: names.key(value) };
    return groupBy === "day" ? { day: value ?? "" } : { endpoint: value ?? "" };
  }
}

type Counts = { calls: number; succeeded: number; failed: number; durationMs: number };

function countsOf(row: UsageRow): Counts {
  const calls = Number(row.calls);
  const succeeded = Number(row.succeeded);
  return { calls, succeeded, failed: calls - succeeded, durationMs: Number(row.durationMs) };
}

function sumOf(rows: readonly Counts[]): Counts {
  const total: Counts = { calls: 0, succeeded: 0, failed: 0, durationMs: 0 };
  for (const row of rows) {
    total.calls += row.calls;
    total.succeeded += row.succeeded;
    total.failed += row.failed;
    total.durationMs += row.durationMs;
  }
  return total;
}

function dayOf(time: Date): string {
  return time.toISOString().slice(0, 10);
}
