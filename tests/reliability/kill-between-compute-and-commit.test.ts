import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";
import { killAtWrite, startServerProcess, wholeTable } from "../support/server-process.ts";

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
    const server = await startServerProcess(app.deps.config.databaseUrl);
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

    expect(await killAtWrite(app, server, wholeTable("calculations"), post)).toBe("cut");

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
