import type { Model, ModelStatic, FindOptions, WhereOptions, Attributes } from "sequelize";
import { Op } from "sequelize";
import type { Deps } from "../deps.ts";
import { newestFirst, pageSize, readCursor, rowsAfter, writeCursor, type ListScope } from "./page-cursor.ts";

export interface Page<Row> {
  readonly rows: Row[];
  readonly nextCursor: string | null;
  readonly limit: number;
}

type Listed = Model & { createdAt: Date; id: string };

/** One keyset page of an organisation's rows, newest first. Rows that come or go meanwhile move no other row. */
export async function readPage<Row extends Listed>(
  deps: Deps,
  model: ModelStatic<Row>,
  scope: ListScope,
  query: { readonly cursor?: string | undefined; readonly limit?: string | undefined },
  options: Pick<FindOptions<Attributes<Row>>, "include" | "attributes"> & { where?: WhereOptions } = {},
): Promise<Page<Row>> {
  const limit = pageSize(query.limit);
  const conditions: WhereOptions[] = [{ organisationId: scope.organisationId }];
  if (options.where) conditions.push(options.where);
  if (query.cursor !== undefined) conditions.push(rowsAfter(readCursor(deps.secrets, scope, query.cursor)));
  const found = await model.findAll({
    ...options,
    where: { [Op.and]: conditions } as WhereOptions<Attributes<Row>>,
    order: newestFirst,
    limit: limit + 1,
  });
  const rows = found.slice(0, limit);
  const last = rows.at(-1);
  return {
    rows,
    limit,
    nextCursor: found.length > limit && last ? writeCursor(deps.secrets, scope, last) : null,
  };
}
