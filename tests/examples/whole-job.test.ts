import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { hashPassword } from "../../server/services/passwords.ts";
import { makeOrganisation } from "../support/factories.ts";
import { jobExampleFiles } from "../support/job-example.ts";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";
import { runProgram } from "../support/run-program.ts";

describe("the example of a whole job", () => {
  const folder = mkdtempSync(join(tmpdir(), "borewright-job-"));
  const password = "a long and private sentence";
  let app: ListeningApp;
  beforeAll(async () => {
    app = await openListeningApp();
  });
  afterAll(async () => {
    rmSync(folder, { recursive: true });
    await app.close();
  });

  it("sends the files of examples/jobs, which are those of the demo's job", () => {
    const examples = new URL("../../examples/jobs/", import.meta.url);
    const files = jobExampleFiles();
    expect(readdirSync(examples).sort()).toEqual(Object.keys(files).sort());
    for (const [name, content] of Object.entries(files)) {
      const kept: unknown = JSON.parse(readFileSync(new URL(name, examples), "utf8"));
      expect(kept, name).toEqual(JSON.parse(JSON.stringify(content)));
    }
  });

  it("goes from the machine to four signed reports", async () => {
    const works = await makeOrganisation(app.deps);
    const { engineer } = works.members;
    await engineer.update({ passwordHash: await hashPassword(password) });
    const { code, stdout, stderr } = await runProgram(
      [process.execPath, "--import", "tsx", "examples/typescript/whole-job.ts", folder],
      { BOREWRIGHT_URL: app.url, BOREWRIGHT_EMAIL: engineer.email, BOREWRIGHT_PASSWORD: password },
    );
    expect([code, stderr]).toEqual([0, ""]);
    expect(stdout).toMatch(/^Signed sha256:[0-9a-f]{64}$/m);
    expect(stdout).not.toMatch(/^In the way/m);
    for (const format of ["pdf", "xlsx", "dxf", "json"]) {
      expect(statSync(join(folder, `report.${format}`)).size, format).toBeGreaterThan(1000);
    }
    const report = JSON.parse(readFileSync(join(folder, "report.json"), "utf8")) as {
      record: { state: string };
    };
    expect(report.record.state).toBe("signed");
  }, 60_000);
});
