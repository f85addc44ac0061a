import { spawn, type ChildProcess } from "node:child_process";
import { createInterface } from "node:readline";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Delivery, WebhookWithSecret } from "../../shared/schemas/webhooks.ts";
import { findFreePort } from "../../server/bootstrap/ports.mjs";
import { openTestApp, type TestApp } from "../support/app.ts";
import { localWebhooks, WebhookDriver } from "../support/webhook-driver.ts";

/** The example checks signatures with Python's standard library alone: a second reading of the specification. */
describe("examples/python/receive-webhooks.py", () => {
  let app: TestApp;
  let hooks: WebhookDriver;
  let child: ChildProcess | null = null;
  beforeAll(async () => {
    app = await openTestApp(localWebhooks);
    hooks = await WebhookDriver.open(app);
  });
  afterAll(async () => {
    child?.kill();
    await app.close();
  });

  it("takes what is signed with its secret, the replaced one too, and nothing else", async () => {
    const port = await findFreePort();
    const url = `http://127.0.0.1:${port}/`;
    const { id, secret } = await hooks.add(url);
    const other = await hooks.add(url);
    child = spawn("python3", ["-B", "examples/python/receive-webhooks.py", String(port)], {
      cwd: new URL("../../", import.meta.url),
      env: { PATH: process.env["PATH"], BOREWRIGHT_WEBHOOK_SECRET: secret },
      stdio: ["ignore", "pipe", "inherit"],
    });
    if (!child.stdout) throw new Error("It has no output.");
    const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
    const nextLine = async () => (await lines.next()).value as string;
    expect(await nextLine()).toBe(`listening on port ${port}`);

    const statusOf = async (webhook: string) => {
      const { body } = await hooks.post(`/v1/webhooks/${webhook}/test`);
      return (body as Delivery).attempts[0]?.status;
    };
    expect(await statusOf(id)).toBe(204);
    expect(await nextLine()).toBe(`webhook.test {"webhookId": "${id}"}`);
    expect(await statusOf(other.id)).toBe(401);

    const rotated = await hooks.post(`/v1/webhooks/${id}/secret`, { overlapHours: 1 });
    expect((rotated.body as WebhookWithSecret).secret).not.toBe(secret);
    expect(await statusOf(id)).toBe(204);
    expect(await nextLine()).toBe(`webhook.test {"webhookId": "${id}"}`);
    await hooks.post(`/v1/webhooks/${id}/secret`, { overlapHours: 0 });
    expect(await statusOf(id)).toBe(401);
  });
});
