import { listOutboxQuery, outboxPage, type OutboxMail } from "../../shared/schemas/outbox.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { readMailHead } from "../mail/read-head.ts";
import { timeOfId } from "../services/ids.ts";
import { pageSize, readCursor, writeCursor } from "../services/page-cursor.ts";

const tag = "Outbox";
/** As much of a mail as its head may fill. */
const HEAD_BYTES = 16 * 1024;

const listOutbox = defineOperation({
  operationId: "listOutbox",
  method: "get",
  path: "/v1/outbox",
  tag,
  summary: "List mail that was kept here",
  description:
    "Where the service was given no mail server, its mail is kept on its own disk: the organisation's, newest first, the newest 500.",
  query: listOutboxQuery,
  response: { status: 200, description: "One page.", schema: outboxPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { deps, query } = call;
    const organisationId = callerOf(call).organisation.id;
    const scope = { list: "outbox", organisationId, filters: {} };
    const limit = pageSize(query.limit);
    const after = query.cursor === undefined ? null : readCursor(deps.secrets, scope, query.cursor).id;
    const { outbox } = deps.mailer;
    const ids = (await outbox.ids(organisationId)).filter((id) => after === null || id < after);
    const data: OutboxMail[] = [];
    for (const id of ids.slice(0, limit)) {
      const mail = await outbox.read(organisationId, id, HEAD_BYTES);
      if (mail) data.push({ id, ...shown(mail.head), bytes: mail.size });
    }
    const last = ids[limit - 1];
    const nextCursor =
      last !== undefined && ids.length > limit
        ? writeCursor(deps.secrets, scope, { createdAt: timeOfId(last) ?? new Date(0), id: last })
        : null;
    return reply(200, { data, nextCursor, limit });
  },
});

function shown(head: Buffer): Pick<OutboxMail, "to" | "subject" | "date"> {
  const { to, subject, date } = readMailHead(head.toString());
  return { to: [...to], subject, date };
}

const readOutboxMail = defineOperation({
  operationId: "readOutboxMail",
  method: "get",
  path: "/v1/outbox/{id}",
  tag,
  summary: "Download a mail that was kept here",
  description: "As it would have been sent, attachments and all: a file that mail programs open.",
  response: { status: 200, description: "The mail.", files: ["message/rfc822"] },
  errors: [],
  handle: async (call) => {
    const id = call.params.id ?? "";
    const mail = await call.deps.mailer.outbox.read(callerOf(call).organisation.id, id);
    if (!mail) throw new HttpProblem("not_found", "There is no mail with this id.");
    return reply(200, mail.head, {
      "Content-Type": "message/rfc822",
      "Content-Disposition": `attachment; filename="${id}.eml"`,
    });
  },
});

export const outboxOperations = [listOutbox, readOutboxMail];
