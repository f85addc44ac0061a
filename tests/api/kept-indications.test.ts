import { request as httpRequest, type IncomingMessage } from "node:http";
import { once } from "node:events";
import { setTimeout as sleep } from "node:timers/promises";
import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { limits } from "../../shared/limits.ts";
import type { Caller } from "../../server/services/caller.ts";
import { JobFollower } from "../../server/services/follow-job.ts";
import { inTransaction } from "../../server/services/in-transaction.ts";
import { appendEntries, loadJob } from "../../server/services/job-store.ts";
import { eventsAfter } from "../../server/services/watch-job.ts";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";
import { PlannedMove } from "../support/planned-move.ts";
import { waitUntil } from "../support/server-process.ts";

describe("what is kept of a followed move", () => {
  let app: ListeningApp;
  let move: PlannedMove;
  beforeAll(async () => {
    app = await openListeningApp();
    move = await PlannedMove.make(app);
  }, 60_000);
  afterAll(() => app.close());

  const caller = (): Caller => {
    const { id, name, email } = move.job.works.members.engineer;
    const organisation = { id: move.job.works.id, name: "" };
    return { by: "member", organisation, member: { id, name, email, role: "engineer" }, sessionId: "" };
  };

  it("gives a reader what was kept after an event that he has, whichever was begun first", async () => {
    const { sequelize, models } = app.deps.database;
    const row = await models.jobs.findOne({ where: { id: move.job.id }, rejectOnEmpty: true });
    const begun = row.events;
    let late: Promise<unknown> = Promise.resolve();
    // The indication is sent while another holds the job's row, and waits; the comment is made after it, and kept before.
    const comment = await inTransaction(sequelize, async (transaction) => {
      const loaded = await loadJob(app.deps, move.job.works.id, move.job.id, { transaction });
      late = move.indicate({ sights: move.sights(0.2) });
      await waitUntil(async () => {
        const [waiting] = await sequelize.query<{ n: string }>(
          `SELECT COUNT(*) AS n FROM information_schema.PROCESSLIST WHERE DB = DATABASE() AND ID <> CONNECTION_ID() AND INFO LIKE '%FOR UPDATE%'`,
          { type: QueryTypes.SELECT },
        );
        return Number(waiting?.n) > 0;
      });
      const entry = { kind: "comment" as const, document: { text: "Later made, sooner kept." } };
      return appendEntries(app.deps, transaction, loaded, [entry], { caller: caller() });
    });
    await late;
    const events = await eventsAfter(app.deps, row, begun);
    expect(events.map(({ number, type }) => [number, type])).toEqual([
      [begun + 1, "entry"],
      [begun + 2, "indication"],
    ]);
    expect(events[0]?.data).toContain(comment.ids[0]);
    expect(await eventsAfter(app.deps, row, begun + 1)).toEqual(events.slice(1));
  });

  it("keeps no indication once the job is signed, of a follower that began before", async () => {
    const { models, sequelize } = app.deps.database;
    const by = { caller: caller(), claim: null, requestId: "test" };
    const follower = new JobFollower(app.deps, move.job.id, by);
    const judged = await follower.judge(move.indication({ sights: move.sights(0.5) }));
    const keep = () => inTransaction(sequelize, (transaction) => follower.keep(transaction, judged));
    const count = () => models.jobIndications.count({ where: { jobId: move.job.id } });
    const before = await count();
    await models.jobs.update({ state: "signed" }, { where: { id: move.job.id } });
    await expect(keep()).rejects.toMatchObject({ code: "job_signed" });
    await models.jobs.update({ state: "open" }, { where: { id: move.job.id } });
    expect(await count()).toBe(before);
    await keep();
    expect(await count()).toBe(before + 1);
  });

  it("keeps an indication once under an Idempotency-Key", async () => {
    const count = () => app.deps.database.models.jobIndications.count({ where: { jobId: move.job.id } });
    const before = await count();
    const send = () =>
      app
        .call()
        .post(`/v1/jobs/${move.job.id}/indications`)
        .set("Authorization", `Bearer ${move.job.token}`)
        .set("Idempotency-Key", "moment-1")
        .send(move.indication({ sights: move.sights(0.5) }));
    const [first, again] = [await send(), await send()];
    expect([first.status, again.headers["idempotent-replayed"]]).toEqual([201, "true"]);
    expect(again.text).toBe(first.text);
    expect(await count()).toBe(before + 1);
  });

  it("keeps no more indications than a job may hold, and tells the rest so", async () => {
    const { jobs } = app.deps.database.models;
    const { events } = await jobs.findOne({ where: { id: move.job.id }, rejectOnEmpty: true });
    await jobs.update({ events: limits.eventsPerJob - 1 }, { where: { id: move.job.id } });
    const [last, more] = [
      await move.indicate({ sights: move.sights(0.4) }),
      await move.indicate({ sights: move.sights(0.4) }),
    ];
    expect([last.status, more.status, more.answer]).toEqual([
      201,
      413,
      expect.objectContaining({ code: "call_too_large", limit: limits.eventsPerJob }),
    ]);
    await app.deps.database.models.jobIndications.destroy({
      where: { jobId: move.job.id, event: limits.eventsPerJob },
    });
    await jobs.update({ events }, { where: { id: move.job.id } });
  });

  it("ends a stream of indications whose key is revoked, and keeps nothing more of it", async () => {
    const key = await move.job.works.key("jobs:write");
    const sender = httpRequest(`${app.url}/v1/jobs/${move.job.id}/indication-stream`, {
      method: "POST",
      headers: { Authorization: `Bearer ${key.secret}`, "Content-Type": "application/x-ndjson" },
    });
    const line = `${JSON.stringify(move.indication({ sights: move.sights(0.25) }))}\n`;
    const [answered] = await Promise.all([
      once(sender, "response") as Promise<[IncomingMessage]>,
      Promise.resolve(sender.write(line)),
    ]);
    const heard = { text: "" };
    answered[0].setEncoding("utf8").on("data", (text: string) => (heard.text += text));
    await waitUntil(() => Promise.resolve(heard.text.includes("\n")));
    const { jobIndications } = app.deps.database.models;
    const before = await jobIndications.count({ where: { jobId: move.job.id } });
    await app
      .call()
      .post(`/v1/keys/${key.id}/revoke`)
      .set("Authorization", `Bearer ${move.job.works.tokens.admin}`);
    await sleep(3_100);
    sender.write(line);
    await once(answered[0], "end");
    sender.destroy();
    const last = JSON.parse(heard.text.trimEnd().split("\n").at(-1) ?? "") as object;
    expect(last).toMatchObject({ status: 401, code: "key_revoked" });
    expect(await jobIndications.count({ where: { jobId: move.job.id } })).toBe(before);
  }, 15_000);
});
