import { spawn, type ChildProcess } from "node:child_process";
import { once } from "node:events";
import { fileURLToPath } from "node:url";
import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";

/**
 * A process dies after it has computed and before the commit is through. A lock on the calculations table, held by the
 * test, keeps the commit from happening; then the process is killed outright.
 */
describe("kill -9 between compute and commit", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  it("keeps nothing of the call, frees its Idempotency-Key in less than a minute, and stores the retry once", async () => {
    const { secret } = await works.key("calculations:write");
    const { child, url } = await startServer(app.deps.config.databaseUrl);
    const { sequelize, models } = app.deps.database;
    const post = (address: string) =>
      fetch(`${address}/v1/bore-fits`, {
        method: "POST",
        headers: {
          Authorization: `Bearer ${secret}`,
          "Content-Type": "application/json",
          "Idempotency-Key": "outage-1",
        },
        body: JSON.stringify(smallBoreFit),
      });

    const lock = await sequelize.connectionManager.getConnection({ type: "write" });
    const raw = lock as unknown as { query(sql: string): Promise<unknown> };
    await raw.query("LOCK TABLES calculations WRITE");
    const cut = post(url).then(
      () => "answered",
      () => "cut",
    );
    await waitUntil(async () => (await waitingStatements(app)) > 0);
    child.kill("SIGKILL");
    await once(child, "exit");
    expect(await cut).toBe("cut");
    // The statement that waits has lost its client; it must not be let through by the lock's end.
    await waitUntil(async () => (await waitingStatements(app)) === 0);
    await raw.query("UNLOCK TABLES");
    sequelize.connectionManager.releaseConnection(lock);

    expect(await models.calculations.count({ where: { organisationId: works.id } })).toBe(0);
    const retry = () =>
      app
        .call()
        .post("/v1/bore-fits")
        .set("Authorization", `Bearer ${secret}`)
        .set("Idempotency-Key", "outage-1")
        .send(smallBoreFit);
    expect((await retry()).body).toMatchObject({ status: 409, code: "idempotency_in_progress" });
    app.advance(59_000);
    expect((await retry()).status).toBe(201);
    expect((await retry()).headers["idempotent-replayed"]).toBe("true");
    expect(await models.calculations.count({ where: { organisationId: works.id } })).toBe(1);
    const usage = await sequelize.query(
      `SELECT COUNT(*) AS n FROM usage_events WHERE organisationId = '${works.id}'`,
      { type: QueryTypes.SELECT },
    );
    expect(usage).toEqual([{ n: "1" }]);
  }, 60_000);
});

async function startServer(databaseUrl: string): Promise<{ child: ChildProcess; url: string }> {
  const script = fileURLToPath(new URL("../support/serve-process.ts", import.meta.url));
  const child = spawn(process.execPath, ["--import", "tsx", script], {
    env: {
      ...process.env,
      DATABASE_URL: databaseUrl,
      APP_SECRET: "test-only-secret-0123456789abcdefghij",
      PORT: "0",
      LOG_LEVEL: "silent",
    },
    stdio: ["ignore", "pipe", "inherit"],
  });
  const [line] = (await once(child.stdout, "data")) as [Buffer];
  return { child, url: line.toString().trim() };
}

async function waitingStatements({ deps }: TestApp): Promise<number> {
  const [row] = await deps.database.sequelize.query<{ n: string }>(
    "SELECT COUNT(*) AS n FROM information_schema.PROCESSLIST WHERE DB = DATABASE() AND INFO LIKE 'INSERT INTO calculations%'",
    { type: QueryTypes.SELECT },
  );
  return Number(row?.n);
}

async function waitUntil(holds: () => Promise<boolean>): Promise<void> {
  for (let tries = 0; tries < 400; tries += 1) {
    if (await holds()) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error("It never came true.");
}
