import { Webhook as Verifier } from "standardwebhooks";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { DeliveryWorker } from "../../server/webhooks/delivery-worker.ts";
import { retryDelaysMs } from "../../server/webhooks/retry-schedule.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { JobDriver } from "../support/fellgate-job.ts";
import { localWebhooks, WebhookDriver } from "../support/webhook-driver.ts";
import { WebhookReceiver } from "../support/webhook-receiver.ts";

const HOUR_MS = 3_600_000;

describe("webhook deliveries", () => {
  let app: TestApp;
  let receiver: WebhookReceiver;
  let hooks: WebhookDriver;
  let movedMs = 0;
  /** Moves the clock, until the end of the test. */
  const advance = (ms: number): void => {
    app.advance(ms);
    movedMs += ms;
  };
  beforeAll(async () => {
    app = await openTestApp(localWebhooks, { random: () => 0.5 });
    receiver = await new WebhookReceiver().open();
  });
  beforeEach(async () => {
    app.advance(-movedMs);
    movedMs = 0;
    receiver.reset();
    await app.deps.database.models.webhookDeliveries.destroy({ where: {} });
    hooks = await WebhookDriver.open(app);
  });
  afterAll(async () => {
    receiver.close();
    await app.close();
  });

  it("tell of a stored calculation by its ids, signed as the public library verifies it", async () => {
    const { id, secret } = await hooks.add(receiver.url);
    const calculation = await hooks.compute();
    expect(await hooks.worker.runDue()).toBe(1);
    const [sent] = receiver.received;
    if (!sent) throw new Error("Nothing came.");
    const verified = new Verifier(secret).verify(sent.text, sent.headers as Record<string, string>);
    expect(verified).toEqual(sent.payload);
    expect(sent.payload).toMatchObject({
      type: "calculation.stored",
      data: { id: calculation, kind: "bore-fit", status: "succeeded", jobId: null },
    });
    expect(Object.keys(sent.payload.data).sort()).toEqual(["id", "jobId", "kind", "status"]);
    expect(Buffer.byteLength(sent.text)).toBeLessThan(20_000); // bytes, as Standard Webhooks advises
    expect(sent.headers["content-type"]).toBe("application/json");
    const [delivery] = await hooks.deliveries(id);
    expect(delivery).toMatchObject({
      id: sent.id,
      state: "delivered",
      nextAttemptAt: null,
      payload: sent.payload,
    });
    expect(delivery?.attempts).toMatchObject([{ attempt: 1, status: 204, error: null, reply: "" }]);
  });

  it("tell of a refused calculation as well, and of nothing to who did not ask for it", async () => {
    const asked = await hooks.add(receiver.url);
    const other = await hooks.add(receiver.url, ["job.signed"]);
    const { status, body } = await hooks.post("/v1/bore-fits", {
      units: { axial: "mm", bore: "mm", offset: "mm" },
      seen: "downstream",
      bores: [
        {
          id: "brg-1",
          form: "points",
          points: [0, 1, 2, 3].map((h) => ({ h, v: 0 })),
        },
      ],
    });
    expect(status).toBe(422);
    const [delivery] = await hooks.deliveries(asked.id);
    expect(delivery?.payload).toMatchObject({ data: { id: (body as { id: string }).id, status: "failed" } });
    expect(await hooks.deliveries(other.id)).toEqual([]);
  });

  it("tell of a computed survey and of a signed job, with the ids to read them by", async () => {
    const { id } = await hooks.add(receiver.url, ["survey.computed", "job.signed"]);
    const job = new JobDriver(app, hooks.works);
    await job.givePassword();
    const { found, left } = await job.runToSignature();
    const signed = await job.sign();
    expect(signed.status).toBe(201);
    await hooks.worker.runDue();
    const told = receiver.received.map(({ payload }) => payload);
    expect(told.map(({ type }) => type).sort()).toEqual(["job.signed", "survey.computed", "survey.computed"]);
    const surveys = told.filter(({ type }) => type === "survey.computed").map(({ data }) => data["surveyId"]);
    expect(surveys.sort()).toEqual([found, left].sort());
    const record = await job.read();
    const signature = told.find(({ type }) => type === "job.signed");
    expect(signature?.data).toMatchObject({
      jobId: job.id,
      machineId: job.machineId,
      revision: 1,
      recordHash: record.signature?.recordHash,
    });
    expect(await hooks.deliveries(id, "?state=delivered")).toHaveLength(3);
  });

  it("are tried again by the schedule of Standard Webhooks under one id, each with a signature of its own", async () => {
    receiver.answer = (response) => response.writeHead(500).end("no");
    const { id, secret } = await hooks.add(receiver.url);
    await hooks.compute();
    for (const [tries, delayMs] of retryDelaysMs.entries()) {
      const before = app.deps.now().getTime();
      expect(await hooks.worker.runDue()).toBe(1);
      const [delivery] = await hooks.deliveries(id);
      expect(delivery?.attempts).toHaveLength(tries + 1);
      // Half of the greatest jitter, a fifth, since chance is held still.
      const waitMs = Date.parse(delivery?.nextAttemptAt ?? "") - before;
      expect(Math.abs(waitMs - delayMs * 1.1)).toBeLessThan(2_000); // ms, what the attempt took
      expect(await hooks.worker.runDue()).toBe(0);
      advance(delayMs * 1.1 + 2_000);
    }
    expect(await hooks.worker.runDue()).toBe(1);
    const [last] = await hooks.deliveries(id);
    expect(last).toMatchObject({ state: "failed", nextAttemptAt: null });
    expect(last?.attempts.map(({ attempt, status, reply }) => [attempt, status, reply])).toEqual(
      Array.from({ length: 10 }, (_, index) => [index + 1, 500, "no"]),
    );
    expect(new Set(receiver.received.map((sent) => sent.id))).toEqual(new Set([last?.id]));
    expect(receiver.received.every((sent) => sent.signedWith(secret))).toBe(true);
    expect(new Set(receiver.received.map(({ headers }) => headers["webhook-timestamp"])).size).toBe(10);
  });

  it("wait as long as Retry-After says, in seconds and as a date", async () => {
    const { id } = await hooks.add(receiver.url);
    const asked = [() => "600", () => new Date(app.deps.now().getTime() + 600_000).toUTCString()];
    for (const header of asked) {
      receiver.answer = (response) => response.writeHead(503, { "Retry-After": header() }).end();
      await hooks.compute();
      await hooks.worker.runDue();
      const [delivery] = await hooks.deliveries(id);
      const waitMs = Date.parse(delivery?.nextAttemptAt ?? "") - app.deps.now().getTime();
      expect(Math.abs(waitMs - 600_000 * 1.1)).toBeLessThan(5_000); // ms; a date has whole seconds
    }
  });

  it("keep a kilobyte of what is replied, and no character that a list could not show", async () => {
    receiver.answer = (response) => response.writeHead(400).end(`\u0000\u202e${"ø".repeat(5_000)}`);
    const { id } = await hooks.add(receiver.url);
    await hooks.compute();
    await hooks.worker.runDue();
    const [delivery] = await hooks.deliveries(id);
    const reply = delivery?.attempts[0]?.reply ?? "";
    expect(reply.startsWith("\u{FFFD}\u{FFFD}øø")).toBe(true);
    expect(reply.length).toBeLessThanOrEqual(1_024);
  });

  it("switch the webhook off when it says 410, tell its administrators by mail, and wait for it to be on again", async () => {
    receiver.answer = (response) => response.writeHead(410).end();
    const { id } = await hooks.add(receiver.url);
    await hooks.compute();
    await hooks.compute();
    await hooks.worker.runDue();
    expect(await hooks.read(id)).toMatchObject({ active: false, stopReason: "gone", version: 2 });
    const mails = await app.deps.database.models.queuedMails.findAll({
      where: { organisationId: hooks.works.id },
    });
    expect(mails.map(({ recipients, subject }) => [recipients, subject])).toEqual([
      [hooks.works.members.admin.email, "Webhook switched off: Planner"],
    ]);
    await hooks.compute();
    advance(HOUR_MS);
    await hooks.worker.runDue();
    const waiting = await hooks.deliveries(id);
    expect(waiting.map(({ state }) => state)).toEqual(["paused", "paused"]);
    const [first] = waiting;
    const refused = await hooks.post(`/v1/webhooks/${id}/deliveries/${first?.id}/redelivery`);
    expect(refused.body).toMatchObject({ status: 409, code: "webhook_inactive" });

    receiver.reset();
    expect((await hooks.patch(id, 2, { active: true })).body).toMatchObject({
      active: true,
      stopReason: null,
      failingSince: null,
    });
    advance(60_000);
    await hooks.worker.runDue();
    expect(receiver.received.map((sent) => sent.id).sort()).toEqual(waiting.map((row) => row.id).sort());
  });

  it("switch the webhook off after five days without one that arrived, and not while some arrive", async () => {
    receiver.answer = (response) => response.writeHead(500).end();
    const { id } = await hooks.add(receiver.url);
    const fail = async (): Promise<void> => {
      await hooks.compute();
      await hooks.worker.runDue();
    };
    await fail();
    expect((await hooks.read(id)).failingSince).not.toBeNull();
    advance(4 * 24 * HOUR_MS);
    receiver.reset();
    await fail();
    expect(await hooks.read(id)).toMatchObject({ active: true, failingSince: null, version: 1 });
    receiver.answer = (response) => response.writeHead(500).end();
    await fail();
    advance(5 * 24 * HOUR_MS - 60_000);
    await fail();
    expect((await hooks.read(id)).active).toBe(true);
    advance(60_000);
    await fail();
    expect(await hooks.read(id)).toMatchObject({ active: false, stopReason: "failing" });
  });

  it("are delivered again when asked, under the id that they had", async () => {
    const { id } = await hooks.add(receiver.url);
    await hooks.compute();
    await hooks.worker.runDue();
    const [delivery] = await hooks.deliveries(id);
    const again = await hooks
      .post(`/v1/webhooks/${id}/deliveries/${delivery?.id}/redelivery`)
      .set("Idempotency-Key", "again-1");
    expect(again.status).toBe(200);
    expect(again.body).toMatchObject({ id: delivery?.id, state: "pending" });
    await hooks.worker.runDue();
    expect(receiver.received.map((sent) => sent.id)).toEqual([delivery?.id, delivery?.id]);
    const read = await hooks.get(`/v1/webhooks/${id}/deliveries/${delivery?.id}`);
    expect(read.body).toMatchObject({ state: "delivered", attempts: [{ attempt: 1 }, { attempt: 2 }] });
    const unknown = await hooks.post(`/v1/webhooks/${id}/deliveries/${app.deps.newId()}/redelivery`);
    expect(unknown.body).toMatchObject({ status: 404, code: "not_found" });
  });

  it("are let go when the service stops while the other side says nothing, and go out elsewhere at once", async () => {
    receiver.answer = () => undefined;
    const { id } = await hooks.add(receiver.url);
    await hooks.compute();
    const stopping = new DeliveryWorker(app.deps);
    const run = stopping.runDue();
    while (receiver.received.length === 0) await new Promise((resolve) => setTimeout(resolve, 20));
    const started = performance.now();
    await stopping.stop();
    await run;
    expect(performance.now() - started).toBeLessThan(7_000); // ms, well within what a stop may take
    receiver.answer = (response) => response.writeHead(204).end();
    expect(await hooks.worker.runDue()).toBe(1);
    const [delivery] = await hooks.deliveries(id);
    expect(delivery).toMatchObject({ state: "delivered", attempts: [{ attempt: 1, status: 204 }] });
  }, 15_000);

  it("go out once, however many processes look for them", async () => {
    const { id } = await hooks.add(receiver.url);
    for (let made = 0; made < 30; made += 1) await hooks.compute();
    const workers = Array.from({ length: 4 }, () => new DeliveryWorker(app.deps));
    await Promise.all(workers.map((worker) => worker.runDue()));
    await hooks.worker.runDue();
    const ids = receiver.received.map((sent) => sent.id);
    expect(ids).toHaveLength(30);
    expect(new Set(ids).size).toBe(30);
    expect((await hooks.deliveries(id)).every(({ attempts }) => attempts.length === 1)).toBe(true);
  });
});
