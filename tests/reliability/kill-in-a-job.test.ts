import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver, signingPassword } from "../support/fellgate-job.ts";
import { killAtWrite, nextEntryOf, startServerProcess, wholeTable } from "../support/server-process.ts";

describe("kill -9 in the middle of a job", () => {
  let app: TestApp;
  let job: JobDriver;
  beforeAll(async () => {
    app = await openTestApp();
    job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.runToSignature();
    await job.givePassword();
  }, 60_000);
  afterAll(() => app.close());

  const send = (path: string, contentType: string, body: string | Uint8Array<ArrayBuffer>) => (url: string) =>
    fetch(`${url}/v1/jobs/${job.id}${path}`, {
      method: "POST",
      headers: { Authorization: `Bearer ${job.token}`, "Content-Type": contentType, "Idempotency-Key": path },
      body,
    });

  it("leaves nothing of an upload that was cut, and takes it when it is sent again", async () => {
    const png = new Uint8Array(2_500_000).fill(7);
    png.set([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);
    const before = await job.read();
    const server = await startServerProcess(app.deps.config.databaseUrl);
    const upload = send("/attachments?name=deck.png", "image/png", png);
    expect(await killAtWrite(app, server, nextEntryOf(job.id), upload)).toBe("cut");
    expect(await job.read()).toEqual(before);
    expect(await app.deps.database.models.storedFiles.count()).toBe(0);

    const retry = () =>
      app
        .call()
        .post(`/v1/jobs/${job.id}/attachments?name=deck.png`)
        .set("Authorization", `Bearer ${job.token}`)
        .set("Content-Type", "image/png")
        .set("Idempotency-Key", "/attachments?name=deck.png")
        .send(Buffer.from(png));
    expect((await retry()).body).toMatchObject({ code: "idempotency_in_progress" });
    app.advance(59_000);
    expect((await retry()).status).toBe(201);
    expect((await retry()).headers["idempotent-replayed"]).toBe("true");
    expect((await job.read()).attachments).toHaveLength(1);
  }, 60_000);

  it("leaves no calculation of a survey whose entry was cut, and computes it once when asked again", async () => {
    const { calculations } = app.deps.database.models;
    const count = () => calculations.count({ where: { jobId: job.id } });
    const before = await job.read();
    const calculated = await count();
    const path = `/surveys/${before.surveys[1]?.id}/results`;
    const server = await startServerProcess(app.deps.config.databaseUrl);
    const compute = send(path, "application/json", "");
    expect(await killAtWrite(app, server, nextEntryOf(job.id), compute)).toBe("cut");
    expect(await count()).toBe(calculated);
    expect(await job.read()).toEqual(before);

    const { status, body } = await job.post(`/v1/jobs/${job.id}${path}`);
    expect([status, (body["ids"] as string[]).length]).toEqual([201, 1]);
    expect(await count()).toBe(calculated + 2);
    // The survey was computed again: what was compared with its earlier result is to be compared anew.
    expect((await job.read()).signOff.obstacles.map(({ code }) => code)).toEqual(["not_confirmed"]);
    const [found, left] = before.surveys;
    await job.add("/confirmations", { before: found?.id, after: left?.id });
  }, 60_000);

  it("leaves a job open where the signature was cut, with no trace of it, and signs it when asked again", async () => {
    const before = await job.read();
    const server = await startServerProcess(app.deps.config.databaseUrl);
    const body = JSON.stringify({ password: signingPassword, meaning: "As left, reviewed." });
    const outcome = await killAtWrite(
      app,
      server,
      wholeTable("audit_events"),
      send("/signature", "application/json", body),
    );
    expect(outcome).toBe("cut");
    expect(await job.read()).toEqual(before);
    expect(before.state).toBe("open");
    expect((await job.sign()).body).toMatchObject({ state: "signed" });
  }, 60_000);
});
