import type { Transaction } from "sequelize";
import type { Database } from "../database.ts";
import { keyPrefix } from "./key-format.ts";

/** The people and keys behind records. Records refer to them by id alone, so their names are looked up for a page at once. */
export interface CallerNames {
  member(id: string | null): { id: string; name: string } | null;
  key(id: string | null): { id: string; name: string; prefix: string } | null;
}

interface Referring {
  readonly memberId: string | null;
  readonly keyId: string | null;
}

export async function readCallerNames(
  { models }: Database,
  organisationId: string,
  rows: readonly Referring[],
  transaction?: Transaction,
): Promise<CallerNames> {
  const within = transaction ? { transaction } : {};
  const memberIds = distinct(rows.map((row) => row.memberId));
  const keyIds = distinct(rows.map((row) => row.keyId));
  const [members, keys] = await Promise.all([
    memberIds.length === 0
      ? []
      : models.members.findAll({
          where: { organisationId, id: memberIds },
          attributes: ["id", "name"],
          ...within,
        }),
    keyIds.length === 0
      ? []
      : models.apiKeys.findAll({
          where: { organisationId, id: keyIds },
          attributes: ["id", "name", "selector"],
          ...within,
        }),
  ]);
  const memberOf = new Map(members.map(({ id, name }) => [id, { id, name }]));
  const keyOf = new Map(
    keys.map(({ id, name, selector }) => [id, { id, name, prefix: keyPrefix(selector) }]),
  );
  return {
    member: (id) => (id === null ? null : (memberOf.get(id) ?? null)),
    key: (id) => (id === null ? null : (keyOf.get(id) ?? null)),
  };
}

function distinct(ids: readonly (string | null)[]): string[] {
  return [...new Set(ids.filter((id) => id !== null))];
}
