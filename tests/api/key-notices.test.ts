import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { sendQueuedMails } from "../../server/mail/send-queued.ts";
import { tellOfExpiringKeys } from "../../server/services/key-expiry.ts";
import type { OutboxMail } from "../../shared/schemas/outbox.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { localWebhooks, WebhookDriver } from "../support/webhook-driver.ts";
import { WebhookReceiver } from "../support/webhook-receiver.ts";

const DAY_MS = 86_400_000;

describe("a key that ends", () => {
  let app: TestApp;
  let receiver: WebhookReceiver;
  beforeAll(async () => {
    app = await openTestApp(localWebhooks);
    receiver = await new WebhookReceiver().open();
  });
  afterAll(async () => {
    receiver.close();
    await app.close();
  });

  it("is told of 14, 7 and 1 days before, each once, by webhook and by mail to the administrators", async () => {
    const hooks = await WebhookDriver.open(app);
    const { works } = hooks;
    await app.deps.database.models.apiKeys.update(
      { expiresAt: null },
      { where: { organisationId: works.id } },
    );
    await hooks.add(receiver.url, ["key.expiring"]);
    const { id } = await works.key("calculations:read");
    const { id: short } = await works.key("calculations:read");
    const startMs = app.deps.now().getTime();
    await app.deps.database.models.apiKeys.update(
      { expiresAt: new Date(startMs + 90 * DAY_MS) },
      { where: { id } },
    );
    await app.deps.database.models.apiKeys.update(
      { expiresAt: new Date(startMs + DAY_MS / 2) },
      { where: { id: short } },
    );
    const told: [day: number, count: number][] = [];
    for (const day of [0, 75.9, 0.2, 1, 6.9, 4.9, 0.2, 0.5]) {
      app.advance(day * DAY_MS);
      // Two processes ask at once.
      const counts = await Promise.all([tellOfExpiringKeys(app.deps), tellOfExpiringKeys(app.deps)]);
      told.push([day, counts[0] + counts[1]]);
    }
    expect(told.map(([, count]) => count)).toEqual([0, 0, 1, 0, 1, 0, 1, 0]);

    await hooks.worker.runDue();
    // Those that are due together are sent together, and arrive in any order.
    const arrived = receiver.received.map(({ payload }) => [payload.type, payload.data]);
    expect(arrived).toHaveLength(3);
    expect(arrived).toEqual(
      expect.arrayContaining(
        [14, 7, 1].map((days) => [
          "key.expiring",
          { keyId: id, days, expiresAt: new Date(startMs + 90 * DAY_MS).toISOString() },
        ]),
      ),
    );

    expect(await sendQueuedMails(app.deps)).toBe(3);
    expect(await sendQueuedMails(app.deps)).toBe(0);
    const admin = await works.session("admin");
    const { body } = await app.call().get("/v1/outbox").set("Authorization", `Bearer ${admin}`);
    const mails = (body as { data: OutboxMail[] }).data;
    expect(mails.map(({ to }) => to)).toEqual(Array.from({ length: 3 }, () => [works.members.admin.email]));
    expect(mails.map(({ subject }) => subject).sort()).toEqual([
      "API key ends within 14 days: Test",
      "API key ends within 7 days: Test",
      "API key ends within a day: Test",
    ]);
  });
});
