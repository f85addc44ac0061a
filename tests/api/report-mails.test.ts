import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

describe("POST /v1/jobs/{id}/report-mails", () => {
  const folder = mkdtempSync(join(tmpdir(), "borewright-report-mail-"));
  let app: TestApp;
  let job: JobDriver;
  beforeAll(async () => {
    app = await openTestApp({ DATA_DIR: folder });
    job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.start();
  });
  afterAll(async () => {
    await app.close();
    rmSync(folder, { recursive: true });
  });

  const mail = (body: object) => job.post(`/v1/jobs/${job.id}/report-mails`, body);
  const outbox = async () => {
    const { body } = await app
      .call()
      .get("/v1/outbox")
      .set("Authorization", `Bearer ${job.works.tokens.admin}`);
    return (body as { data: { id: string; to: string[]; subject: string }[] }).data;
  };

  it("sends the report to named recipients; without a mail server the administrator reads it here", async () => {
    const { status, body } = await mail({
      to: ["owner@fellgate.example"],
      formats: ["json"],
      message: "As agreed.",
    });
    expect(status).toBe(201);
    expect(body).toMatchObject({ to: ["owner@fellgate.example"], notTaken: [] });
    const [kept] = await outbox();
    expect(kept?.to).toEqual(["owner@fellgate.example"]);
    expect(kept?.subject).toBe("Fellgate Unit 2: Unit 2, major outage, revision 1 (draft, not signed)");
    const message = await app
      .call()
      .get(`/v1/outbox/${kept?.id}`)
      .set("Authorization", `Bearer ${job.works.tokens.admin}`)
      .buffer(true)
      .parse((response, done) => {
        let text = "";
        response.on("data", (part: Buffer) => (text += String(part)));
        response.on("end", () => done(null, text));
      });
    const [file] = (body as { files: { name: string; sha256: string }[] }).files;
    // RFC 2045, 6.7: an equals sign at the end of a line joins it to the next.
    const words = String(message.body).replaceAll(/=\r?\n/g, "");
    expect(words).toContain(`${file?.name}, sha256 ${file?.sha256}`);
  });

  it("refuses recipients and forms that are none, and sends nothing", async () => {
    const before = (await outbox()).length;
    expect((await mail({ to: ["nobody"], formats: ["json"] })).status).toBe(422);
    expect((await mail({ to: ["a@b.example\r\nBcc: c@d.example"], formats: ["json"] })).status).toBe(422);
    expect((await mail({ to: ["a@b.example"], formats: ["exe"] })).body).toMatchObject({
      errors: [{ pointer: "/formats/0", code: "choice_unknown" }],
    });
    expect(await outbox()).toHaveLength(before);
  });
});
