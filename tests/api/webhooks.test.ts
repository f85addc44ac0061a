import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { limits } from "../../shared/limits.ts";
import type { Delivery, Webhook, WebhookWithSecret } from "../../shared/schemas/webhooks.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { localWebhooks, WebhookDriver } from "../support/webhook-driver.ts";
import { WebhookReceiver } from "../support/webhook-receiver.ts";

describe("webhooks", () => {
  let app: TestApp;
  let receiver: WebhookReceiver;
  let hooks: WebhookDriver;
  beforeAll(async () => {
    app = await openTestApp(localWebhooks);
    receiver = await new WebhookReceiver().open();
  });
  beforeEach(async () => {
    receiver.reset();
    hooks = await WebhookDriver.open(app);
  });
  afterAll(async () => {
    receiver.close();
    await app.close();
  });

  it("show the signing secret in the answer that makes them, and nowhere else", async () => {
    const { status, body, headers } = await hooks.post("/v1/webhooks", {
      name: "Planner",
      url: receiver.url,
      events: ["job.signed", "job.signed"],
    });
    expect(status).toBe(201);
    const made = body as WebhookWithSecret;
    expect(headers["location"]).toBe(`/v1/webhooks/${made.id}`);
    expect(headers["etag"]).toBe('"1"');
    // 32 bytes in base64, by the form that Standard Webhooks states.
    expect(made.secret).toMatch(/^whsec_[0-9A-Za-z+/]{43}=$/);
    expect(made).toMatchObject({
      events: ["job.signed"],
      active: true,
      failingSince: null,
      stopReason: null,
    });
    const read = await hooks.get(`/v1/webhooks/${made.id}`);
    const { secret, ...shown } = made;
    expect(read.body).toEqual(shown);
    const listed = await hooks.get("/v1/webhooks");
    expect((listed.body as { data: Webhook[] }).data).toEqual([shown]);
    const rows = await app.deps.database.sequelize.query(
      "SELECT e.*, a.details FROM webhook_endpoints e JOIN audit_events a ON a.subject = e.id",
      { type: QueryTypes.SELECT },
    );
    expect(rows).toHaveLength(1);
    expect(JSON.stringify([rows, listed.body, read.body])).not.toContain(secret.slice(6));
  });

  it("are made once under one Idempotency-Key, and the secret is not shown again", async () => {
    const once = () =>
      hooks
        .post("/v1/webhooks", { name: "Planner", url: receiver.url, events: ["job.signed"] })
        .set("Idempotency-Key", "hook-1");
    expect((await once()).status).toBe(201);
    expect((await once()).body).toMatchObject({ status: 409, code: "secret_already_shown" });
    expect(((await hooks.get("/v1/webhooks")).body as { data: unknown[] }).data).toHaveLength(1);
  });

  it("are changed only by who read them as they are", async () => {
    const { id } = await hooks.add(receiver.url);
    const changed = await hooks.patch(id, 1, { name: "Outages", events: ["key.expiring"], active: false });
    expect(changed.body).toMatchObject({
      name: "Outages",
      events: ["key.expiring"],
      active: false,
      version: 2,
    });
    const stale = await hooks.patch(id, 1, { active: true });
    expect(stale.body).toMatchObject({ status: 412, code: "version_stale" });
    const unread = await app
      .call()
      .patch(`/v1/webhooks/${id}`)
      .set("Authorization", `Bearer ${hooks.token}`)
      .send({ active: true });
    expect(unread.body).toMatchObject({ status: 428, code: "precondition_required" });
    expect(await hooks.read(id)).toMatchObject({ active: false, version: 2 });
  });

  it("name every fault of what makes them", async () => {
    const { body } = await hooks.post("/v1/webhooks", {
      name: "",
      url: receiver.url,
      events: ["job.begun"],
      to: 1,
    });
    const { errors } = body as { errors: { pointer: string; code: string }[] };
    expect(errors.map(({ pointer, code }) => `${pointer} ${code}`).sort()).toEqual([
      "/events/0 choice_unknown",
      "/name text_invalid",
      "/to unknown_field",
    ]);
  });

  it(`are at most ${limits.webhooksPerOrganisation}, however many are made at once`, async () => {
    const answers = await Promise.all(
      Array.from({ length: limits.webhooksPerOrganisation + 4 }, () =>
        hooks.post("/v1/webhooks", { name: "Many", url: receiver.url, events: ["job.signed"] }),
      ),
    );
    const refused = answers.filter(({ status }) => status !== 201);
    expect(refused.map(({ body }) => (body as { code: string }).code)).toEqual(
      Array.from({ length: 4 }, () => "webhook_limit_reached"),
    );
    expect(refused[0]?.body).toMatchObject({ status: 409, limit: limits.webhooksPerOrganisation });
  });

  it("are removed with their log, and hear nothing from then on", async () => {
    const { id } = await hooks.add(receiver.url);
    await hooks.compute();
    expect(await hooks.deliveries(id)).toHaveLength(1);
    expect((await hooks.remove(id)).status).toBe(204);
    expect((await hooks.remove(id)).status).toBe(404);
    expect((await hooks.get(`/v1/webhooks/${id}/deliveries`)).status).toBe(404);
    await hooks.compute();
    await hooks.worker.runDue();
    expect(receiver.received).toEqual([]);
    const audited = await app.deps.database.models.auditEvents.findAll({ where: { subject: id } });
    expect(audited.map(({ action }) => action).sort()).toEqual(["webhook.created", "webhook.removed"]);
  });

  it("sign with both secrets until the replaced one's time is over", async () => {
    const made = await hooks.add(receiver.url);
    const rotated = await hooks.post(`/v1/webhooks/${made.id}/secret`, { overlapHours: 1 });
    expect(rotated.status).toBe(201);
    const { secret, previousSecretUntil } = rotated.body as WebhookWithSecret;
    expect(secret).not.toBe(made.secret);
    expect(Math.abs(Date.parse(previousSecretUntil ?? "") - Date.now() - 3_600_000)).toBeLessThan(60_000); // ms
    await hooks.compute();
    await hooks.worker.runDue();
    const [during] = receiver.received;
    expect([during?.signedWith(secret), during?.signedWith(made.secret)]).toEqual([true, true]);
    app.advance(3_600_001);
    try {
      receiver.reset();
      await hooks.compute();
      await hooks.worker.runDue();
      const [after] = receiver.received;
      expect([after?.signedWith(secret), after?.signedWith(made.secret)]).toEqual([true, false]);
      expect((await hooks.read(made.id)).previousSecretUntil).toBeNull();
    } finally {
      app.advance(-3_600_001);
    }
  });

  it("end a secret at once where no overlap is asked for", async () => {
    const made = await hooks.add(receiver.url);
    const { secret } = (await hooks.post(`/v1/webhooks/${made.id}/secret`, { overlapHours: 0 }))
      .body as WebhookWithSecret;
    await hooks.compute();
    await hooks.worker.runDue();
    const [sent] = receiver.received;
    expect([sent?.signedWith(secret), sent?.signedWith(made.secret)]).toEqual([true, false]);
  });

  it("answer a test with status and time, and never with what was replied", async () => {
    receiver.answer = (response) => response.writeHead(418).end("the innermost of the plant");
    const { id, secret } = await hooks.add(receiver.url);
    const { status, body, text } = await hooks.post(`/v1/webhooks/${id}/test`);
    expect(status).toBe(201);
    const delivery = body as Delivery;
    expect(delivery).toMatchObject({ type: "webhook.test", state: "failed", nextAttemptAt: null });
    expect(delivery.attempts).toHaveLength(1);
    expect(delivery.attempts[0]).toMatchObject({ status: 418, reply: null, error: null });
    expect(text).not.toContain("innermost");
    expect(JSON.stringify(await hooks.deliveries(id))).not.toContain("innermost");
    expect(receiver.received[0]?.payload).toMatchObject({ type: "webhook.test", data: { webhookId: id } });
    expect(receiver.received[0]?.signedWith(secret)).toBe(true);
    // A test says nothing of the webhook's health, and is never sent again by itself.
    expect((await hooks.read(id)).failingSince).toBeNull();
    app.advance(86_400_000);
    await hooks.worker.runDue();
    app.advance(-86_400_000);
    expect(receiver.received).toHaveLength(1);
  });
});
