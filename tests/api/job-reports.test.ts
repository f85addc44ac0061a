import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { reportFormats } from "../../server/reports/index.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

describe("GET /v1/jobs/{id}/report", () => {
  let app: TestApp;
  let job: JobDriver;
  beforeAll(async () => {
    app = await openTestApp();
    job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.runToSignature();
    await job.givePassword();
  }, 60_000);
  afterAll(() => app.close());

  const get = (path: string, accept = "*/*") =>
    app
      .call()
      .get(`/v1/jobs/${job.id}/${path}`)
      .set("Authorization", `Bearer ${job.token}`)
      .set("Accept", accept)
      .buffer(true)
      .parse((response, done) => {
        const parts: Buffer[] = [];
        response.on("data", (part: Buffer) => parts.push(part));
        response.on("end", () => done(null, Buffer.concat(parts)));
      });

  describe.each(reportFormats.map(({ extension, mediaType }) => [extension, mediaType]))(
    "as %s",
    (extension, mediaType) => {
      it("is the same by Accept and by suffix, to the last byte, again and again", async () => {
        const byAccept = await get("report", mediaType);
        const bySuffix = await get(`report.${extension}`);
        expect(byAccept.status).toBe(200);
        expect(byAccept.headers["content-type"]?.split(";")[0]).toBe(mediaType.split(";")[0]);
        expect((bySuffix.body as Buffer).equals(byAccept.body as Buffer)).toBe(true);
        expect(bySuffix.headers.etag).toBe(byAccept.headers.etag);
        expect((byAccept.body as Buffer).length).toBeGreaterThan(500);
        expect(byAccept.headers["content-disposition"]).toBe(
          `attachment; filename="Unit-2-major-outage-r1-draft.${extension}"`,
        );
      });
    },
  );

  it("refuses what it cannot be sent as", async () => {
    expect((await get("report", "text/html")).status).toBe(406);
    expect((await get("report.exe")).status).toBe(404);
    expect((await get("report.json?revision=2")).status).toBe(404);
  });

  it("says that it is a draft until it is signed, and then shows the hash that was signed", async () => {
    const draft = JSON.parse(String((await get("report.json")).body)) as { record: { signature: unknown } };
    expect(draft.record.signature).toBeNull();
    await job.sign();
    const signed = await get("report.json");
    const { recordHash, record } = JSON.parse(String(signed.body)) as {
      recordHash: string;
      record: { signature: { recordHash: string } };
    };
    expect(record.signature.recordHash).toBe(recordHash);
    expect(signed.headers["content-disposition"]).toContain("Unit-2-major-outage-r1.json");
  });

  it("stays the same to the last byte, in every form, once the job goes on and its people are renamed", async () => {
    const signed = await Promise.all(reportFormats.map(({ extension }) => get(`report.${extension}`)));
    expect((await job.post(`/v1/jobs/${job.id}/revisions`, { reason: "A late reading." })).status).toBe(201);
    await job.add("/comments", { text: "Of the second revision." });
    const { members, tokens } = job.works;
    const { version } = await app.deps.database.models.members.findOne({
      where: { id: members.engineer.id },
      rejectOnEmpty: true,
    });
    const renamed = await app
      .call()
      .patch(`/v1/members/${members.engineer.id}`)
      .set("Authorization", `Bearer ${tokens.admin}`)
      .set("If-Match", `"${version}"`)
      .send({ name: "Renamed Since" });
    expect(renamed.status).toBe(200);
    await job.add("/comments", { text: "By the new name." });
    for (const [index, { extension }] of reportFormats.entries()) {
      const again = await get(`report.${extension}?revision=1`);
      expect([extension, again.headers.etag]).toEqual([extension, signed[index]?.headers.etag]);
    }
    const second = JSON.parse(String((await get("report.json")).body)) as {
      record: { revisions: { revision: number }[]; comments: { author: { member: { name: string } } }[] };
    };
    const names = second.record.comments.map(({ author }) => author.member.name);
    expect(names.at(-1)).toBe("Renamed Since");
    expect(names.slice(0, -1)).not.toContain("Renamed Since");
    expect(second.record.revisions.map(({ revision }) => revision)).toEqual([1, 2]);
  });
});
