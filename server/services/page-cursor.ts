import { timingSafeEqual } from "node:crypto";
import { Op, type WhereOptions } from "sequelize";
import { limits } from "../../shared/limits.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Secrets } from "./secrets.ts";

interface Position {
  readonly createdAt: Date;
  readonly id: string;
}

/** What a cursor is good for: one organisation's list with the same filters. It grants no access of its own. */
export interface ListScope {
  readonly list: string;
  readonly organisationId: string;
  readonly filters: Readonly<Record<string, unknown>>;
}

/** The page size asked for, brought into range. */
export function pageSize(limit: string | undefined): number {
  if (limit === undefined) return limits.pageSizeDefault;
  const size = Number(limit);
  if (size < 1) {
    const detail = `limit is at least 1.`;
    throw new HttpProblem("invalid_parameter", detail, {
      errors: [{ parameter: "limit", code: "invalid_parameter", detail }],
    });
  }
  return Math.min(size, limits.pageSizeMax);
}

export function writeCursor(secrets: Secrets, scope: ListScope, { createdAt, id }: Position): string {
  const position = Buffer.from(JSON.stringify([createdAt.toISOString(), id])).toString("base64url");
  return `${position}.${sign(secrets, scope, position)}`;
}

/** @throws HttpProblem invalid_cursor for one that this list with these filters did not give */
export function readCursor(secrets: Secrets, scope: ListScope, cursor: string): Position {
  const [position = "", signature = ""] = cursor.split(".");
  const expected = sign(secrets, scope, position);
  if (
    signature.length !== expected.length ||
    !timingSafeEqual(Buffer.from(signature), Buffer.from(expected))
  ) {
    const detail = "The cursor was not given by this list with these filters.";
    throw new HttpProblem("invalid_cursor", detail, {
      errors: [{ parameter: "cursor", code: "invalid_cursor", detail }],
    });
  }
  const [createdAt, id] = JSON.parse(Buffer.from(position, "base64url").toString()) as [string, string];
  return { createdAt: new Date(createdAt), id };
}

function sign(secrets: Secrets, scope: ListScope, position: string): string {
  return secrets.hash("cursor", JSON.stringify([scope, position])).slice(0, 32);
}

/** Rows that come after `position` when the newest come first. */
export function rowsAfter({ createdAt, id }: Position): WhereOptions {
  return { [Op.or]: [{ createdAt: { [Op.lt]: createdAt } }, { createdAt, id: { [Op.lt]: id } }] };
}

export const newestFirst: [string, string][] = [
  ["createdAt", "DESC"],
  ["id", "DESC"],
];
