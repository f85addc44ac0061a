import { spawn, type ChildProcess } from "node:child_process";
import { once } from "node:events";
import type { ServerResponse } from "node:http";
import { fileURLToPath } from "node:url";
import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { smallBoreFit } from "../support/factories.ts";
import { localWebhooks, WebhookDriver } from "../support/webhook-driver.ts";
import { WebhookReceiver } from "../support/webhook-receiver.ts";

/**
 * A real service of its own, killed outright: while it stores what is to be told, and while it tells it. What was stored
 * is told, and under one id; what was not stored is not.
 */
describe("kill -9 with webhooks", () => {
  let app: TestApp;
  let hooks: WebhookDriver;
  let receiver: WebhookReceiver;
  const children: ChildProcess[] = [];
  beforeAll(async () => {
    app = await openTestApp(localWebhooks);
    receiver = await new WebhookReceiver().open();
  });
  beforeEach(async () => {
    receiver.reset();
    hooks = await WebhookDriver.open(app);
  });
  afterAll(async () => {
    for (const child of children) child.kill("SIGKILL");
    receiver.close();
    await app.close();
  });

  const start = async (): Promise<{ url: string; kill(): Promise<void> }> => {
    const script = fileURLToPath(new URL("../support/serve-process.ts", import.meta.url));
    const child = spawn(process.execPath, ["--import", "tsx", script], {
      env: {
        ...process.env,
        ...localWebhooks,
        DATABASE_URL: app.deps.config.databaseUrl,
        DATA_DIR: app.deps.config.dataDir,
        APP_SECRET: "test-only-secret-0123456789abcdefghij",
        PORT: "0",
        LOG_LEVEL: "silent",
      },
      stdio: ["ignore", "pipe", "inherit"],
    });
    children.push(child);
    const [line] = (await once(child.stdout, "data")) as [Buffer];
    return {
      url: line.toString().trim(),
      kill: async () => {
        child.kill("SIGKILL");
        await once(child, "exit");
      },
    };
  };
  const post = (url: string) =>
    fetch(`${url}/v1/bore-fits`, {
      method: "POST",
      headers: { Authorization: `Bearer ${hooks.token}`, "Content-Type": "application/json" },
      body: JSON.stringify(smallBoreFit),
    });

  it("tells once more what was being told, under its old id, as soon as the lease is over", async () => {
    const { id } = await hooks.add(receiver.url);
    const held: ServerResponse[] = [];
    receiver.answer = (response) => held.push(response);
    const service = await start();
    expect((await post(service.url)).status).toBe(201);
    await waitUntil(() => receiver.received.length === 1);
    await service.kill();
    for (const response of held) response.destroy();
    receiver.answer = (response) => response.writeHead(204).end();

    // Leased still: nobody sends it meanwhile.
    expect(await hooks.worker.runDue()).toBe(0);
    app.advance(60_000);
    expect(await hooks.worker.runDue()).toBe(1);
    const [first, second] = receiver.received;
    expect(second?.id).toBe(first?.id);
    expect(second?.payload).toEqual(first?.payload);
    expect(await hooks.deliveries(id)).toMatchObject([{ id: first?.id, state: "delivered" }]);
    app.advance(-60_000);
  }, 60_000);

  it("tells of exactly what was stored, wherever in a storm of calls it died", async () => {
    const { id } = await hooks.add(receiver.url);
    const service = await start();
    let answered = 0;
    const calls = Array.from({ length: 60 }, () =>
      post(service.url).then(
        () => (answered += 1),
        () => undefined,
      ),
    );
    await waitUntil(() => answered >= 10);
    await service.kill();
    await Promise.all(calls);
    // Whatever the database had not committed by then is undone once it sees that its client is gone.
    await waitUntil(async () => (await openTransactions()) === 0);
    const stored = await app.deps.database.models.calculations.findAll({
      where: { organisationId: hooks.works.id },
      attributes: ["id"],
    });
    expect(stored.length).toBeGreaterThanOrEqual(10);
    app.advance(60_000);
    await hooks.worker.runDue();
    app.advance(-60_000);
    const told = new Set(receiver.received.map(({ payload }) => payload.data["id"]));
    expect([...told].sort()).toEqual(stored.map((row) => row.id).sort());
    const ids = new Map(receiver.received.map((sent) => [sent.payload.data["id"], sent.id]));
    expect(receiver.received.every((sent) => ids.get(sent.payload.data["id"]) === sent.id)).toBe(true);
    const log = await hooks.deliveries(id, "?limit=200");
    expect(log.every(({ state }) => state === "delivered")).toBe(true);
  }, 60_000);

  async function openTransactions(): Promise<number> {
    const rows = await app.deps.database.sequelize.query(
      "SELECT ID FROM information_schema.PROCESSLIST WHERE DB = DATABASE() AND ID <> CONNECTION_ID() AND COMMAND <> 'Sleep'",
      { type: QueryTypes.SELECT },
    );
    return rows.length;
  }
});

async function waitUntil(holds: () => boolean | Promise<boolean>): Promise<void> {
  for (let tries = 0; tries < 400; tries += 1) {
    if (await holds()) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error("It never came true.");
}
