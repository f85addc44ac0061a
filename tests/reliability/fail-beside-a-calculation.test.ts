import request from "supertest";
import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { createApp } from "../../server/app.ts";
import { asFoundReadings } from "../../server/demo/fellgate-job.ts";
import { Listeners } from "../../server/webhooks/events.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

/**
 * A service that fails once the calculations of a job are written, and before what names them is through: where it
 * would tell of the entry.
 */
describe("a failure between a job's calculations and the entry that names them", () => {
  let app: TestApp;
  let job: JobDriver;
  let survey: string;
  beforeAll(async () => {
    app = await openTestApp();
    job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.start();
    survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false, instrument: "gauge-1" });
    await job.add(`/surveys/${survey}/readings`, { readings: asFoundReadings() });
  });
  afterAll(() => app.close());

  class Failing extends Listeners {
    override of(...asked: Parameters<Listeners["of"]>): ReturnType<Listeners["of"]> {
      if (asked[1] === "survey.computed") return Promise.reject(new Error("The database has gone."));
      return super.of(...asked);
    }
  }
  const compute = (listeners: Listeners) =>
    request(createApp({ ...app.deps, listeners }))
      .post(`/v1/jobs/${job.id}/surveys/${survey}/results`)
      .set("Authorization", `Bearer ${job.token}`)
      .set("Idempotency-Key", "survey-1");
  const stored = async () => {
    const { sequelize, models } = app.deps.database;
    const [usage] = await sequelize.query<{ n: string }>(
      `SELECT COUNT(*) AS n FROM usage_events WHERE organisationId = '${job.works.id}'`,
      { type: QueryTypes.SELECT },
    );
    return [await models.calculations.count({ where: { jobId: job.id } }), Number(usage?.n)];
  };

  it("keeps neither, counts nothing, and takes the call again under its key", async () => {
    const before = await job.read();
    const counted = await stored();
    expect((await compute(new Failing(app.deps.database))).status).toBe(500);
    expect(await stored()).toEqual(counted);
    expect(await job.read()).toEqual(before);

    const done = await compute(app.deps.listeners);
    expect(done.status).toBe(201);
    expect((await compute(app.deps.listeners)).headers["idempotent-replayed"]).toBe("true");
    expect(await stored()).toEqual(counted.map((count) => count + 2));
    const result = (await job.read()).surveys[0]?.result;
    expect((done.body as { ids: string[] }).ids).toEqual([result?.id]);
  });

  it("keeps a refusal, which no entry names, and nothing of what led to it", async () => {
    const [first] = asFoundReadings();
    const alone = await job.add("/surveys", { stage: "as_left", sameSetUp: false });
    await job.add(`/surveys/${alone}/readings`, { readings: [first] });
    const { calculations } = app.deps.database.models;
    const before = await calculations.count({ where: { jobId: job.id } });
    const { status, body } = await job.post(`/v1/jobs/${job.id}/surveys/${alone}/results`);
    expect(status).toBe(422);
    expect(body["detail"]).toContain("The axis of the survey: ");
    const kept = await calculations.findOne({ where: { id: body["id"] as string } });
    expect([kept?.kind, kept?.status]).toEqual(["axis-deviation", "failed"]);
    expect(await calculations.count({ where: { jobId: job.id } })).toBe(before + 1);
  });
});
