import { createHash } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

describe("files of a job", () => {
  let app: TestApp;
  let works: TestOrganisation;
  let job: JobDriver;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
    job = new JobDriver(app, works);
    await job.start();
  });
  afterAll(() => app.close());

  const png = Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    Buffer.alloc(3_000_000, 7),
  ]);
  const attach = (content: Buffer, mediaType = "image/png", query = "name=deck.png&caption=The%20deck") =>
    app
      .call()
      .post(`/v1/jobs/${job.id}/attachments?${query}`)
      .set("Authorization", `Bearer ${job.token}`)
      .set("Content-Type", mediaType)
      .send(content);

  it("keeps a file of several megabytes and gives the same bytes back", async () => {
    expect((await attach(png)).status).toBe(201);
    const [attachment] = (await job.read()).attachments;
    const sha256 = createHash("sha256").update(png).digest("hex");
    expect(attachment).toMatchObject({ name: "deck.png", caption: "The deck", bytes: png.length, sha256 });
    const { body, headers } = await app
      .call()
      .get(`/v1/jobs/${job.id}/files/${attachment?.file}`)
      .set("Authorization", `Bearer ${job.token}`);
    expect((body as Buffer).equals(png)).toBe(true);
    expect(headers["content-type"]).toBe("image/png");
    expect(headers["content-disposition"]).toContain("attachment");
    expect(headers["x-content-type-options"]).toBe("nosniff");
  });

  it("refuses what is not what it says, too large, of another kind or without a name, and stores nothing", async () => {
    const before = await app.deps.database.models.storedFiles.count();
    const html = Buffer.from("<script>alert(1)</script>");
    expect((await attach(html)).body).toMatchObject({ status: 422, code: "file_not_as_stated" });
    expect((await attach(png, "application/pdf")).body).toMatchObject({ code: "file_not_as_stated" });
    expect((await attach(html, "text/html")).body).toMatchObject({ status: 415 });
    expect((await attach(png, "image/png", "")).body).toMatchObject({ status: 400 });
    expect((await attach(png, "image/png", "name=..%2Fetc%2Fpasswd")).body).toMatchObject({ status: 400 });
    const large = Buffer.concat([png.subarray(0, 8), Buffer.alloc(10 * 1024 * 1024)]);
    expect((await attach(large)).body).toMatchObject({ status: 413, limit: 10 * 1024 * 1024 });
    expect((await attach(Buffer.alloc(0))).body).toMatchObject({ status: 422, code: "required" });
    expect(await app.deps.database.models.storedFiles.count()).toBe(before);
  });

  it("shows a file of one job to nobody through another, nor to another organisation", async () => {
    const [attachment] = (await job.read()).attachments;
    const other = new JobDriver(app, works);
    await other.start();
    const stranger = await makeOrganisation(app.deps);
    for (const [id, token] of [
      [other.id, other.token],
      [job.id, stranger.tokens.admin],
    ]) {
      const { status } = await app
        .call()
        .get(`/v1/jobs/${id}/files/${attachment?.file}`)
        .set("Authorization", `Bearer ${token}`);
      expect(status).toBe(404);
    }
  });

  it("lets a withdrawn attachment be read no more from the record, while the log keeps it", async () => {
    const [attachment] = (await job.read()).attachments;
    await job.add(`/entries/${attachment?.id}/withdrawal`, { reason: "Wrong photograph." });
    expect((await job.read()).attachments).toEqual([]);
    const twice = await job.post(`/v1/jobs/${job.id}/entries/${attachment?.id}/withdrawal`, {
      reason: "Again.",
    });
    expect(twice.body).toMatchObject({ status: 409, code: "entry_not_withdrawable" });
  });
});
