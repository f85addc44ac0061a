import canonicalize from "canonicalize";
import { createHash } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { eventsAfter } from "../../server/services/watch-job.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver, signingPassword } from "../support/fellgate-job.ts";

describe("a whole job", () => {
  let app: TestApp;
  let job: JobDriver;
  let surveys: { found: string; left: string };
  beforeAll(async () => {
    app = await openTestApp();
    job = new JobDriver(app, await makeOrganisation(app.deps));
    surveys = await job.runToSignature();
    await job.givePassword();
  }, 60_000);
  afterAll(() => app.close());

  it("computes each survey as stored calculations of the job", async () => {
    const record = await job.read();
    expect(record.surveys.map(({ id }) => id)).toEqual([surveys.found, surveys.left]);
    const { body } = await app
      .call()
      .get(`/v1/calculations?jobId=${job.id}`)
      .set("Authorization", `Bearer ${job.token}`);
    const kinds = (body as { data: { kind: string; status: string }[] }).data.map(({ kind, status }) => [
      kind,
      status,
    ]);
    expect(kinds.map(([kind]) => kind).sort()).toEqual(
      ["axis-deviation", "axis-deviation", "bore-fit", "bore-fit", "confirmation", "shim-move"].sort(),
    );
    expect(kinds.every(([, status]) => status === "succeeded")).toBe(true);
  });

  it("shows the drift, the plan, the moves in order and their proof, and nothing in the way", async () => {
    const record = await job.read();
    expect(record.surveys[0]?.result?.drift?.station).toBe("brg-1");
    expect(record.plans).toHaveLength(1);
    expect(record.moves.length).toBeGreaterThan(3);
    expect(record.flags).toEqual([]);
    expect(record.confirmations[0]?.result.reference.repeats).toBe(true);
    expect(record.signOff).toEqual({ ready: true, obstacles: [] });
  });

  it("is signed with the password alone, then frozen, and hashed so that anyone can prove it", async () => {
    expect((await job.sign("not the password at all")).body).toMatchObject({
      status: 422,
      code: "password_wrong",
      errors: [{ pointer: "/password" }],
    });
    const refused = await app.deps.database.models.auditEvents.findAll({
      where: { subject: job.id, action: "job.signature_refused" },
    });
    expect(refused.map(({ memberId, organisationId }) => [memberId, organisationId])).toEqual([
      [job.works.members.engineer.id, job.works.id],
    ]);
    expect(Math.abs((refused[0]?.createdAt.getTime() ?? 0) - Date.now())).toBeLessThan(60_000); // ms
    expect(JSON.parse(refused[0]?.details ?? "")).toEqual({ revision: 1 });
    const signed = await job.sign();
    expect(signed.status).toBe(201);
    const record = signed.body as unknown as JobRecord;
    expect(record).toMatchObject({ state: "signed", signature: { meaning: "As left, reviewed." } });
    expect(JSON.stringify(record)).not.toContain(signingPassword);
    const { body: log } = await app
      .call()
      .get(`/v1/jobs/${job.id}/log`)
      .set("Authorization", `Bearer ${job.token}`);
    const { hashed, recordHash } = log as { hashed: object; recordHash: string };
    const digest = createHash("sha256")
      .update(canonicalize(hashed) ?? "")
      .digest("hex");
    expect(`sha256:${digest}`).toBe(record.signature?.recordHash);
    expect(recordHash).toBe(record.signature?.recordHash);
    const late = await job.post(`/v1/jobs/${job.id}/comments`, { text: "One more thing." });
    expect(late.body).toMatchObject({ status: 409, code: "job_signed" });
    // Before all else that is wrong with it: a reason would not help.
    const move = { component: "compressor-casing", at: "2026-11-20T08:00:00Z", finished: true };
    const moved = await job.post(`/v1/jobs/${job.id}/moves`, move);
    expect(moved.body).toMatchObject({ status: 409, code: "job_signed" });
  });

  it("is corrected as a new revision with a reason, while the old stays readable", async () => {
    const before = await job.read();
    const { status, body } = await job.post(`/v1/jobs/${job.id}/revisions`, {
      reason: "Wrong order number.",
    });
    expect(status).toBe(201);
    expect(body).toMatchObject({
      revision: 2,
      state: "open",
      signature: null,
      revisions: [
        { revision: 1, reason: null },
        { revision: 2, reason: "Wrong order number.", signedAt: null },
      ],
    });
    const { body: old } = await app
      .call()
      .get(`/v1/jobs/${job.id}/revisions/1`)
      .set("Authorization", `Bearer ${job.token}`);
    const first = old as JobRecord;
    expect(first.signature).toEqual(before.signature);
    expect(first.surveys).toEqual(before.surveys);
    expect(first.state).toBe("signed");
    await job.add("/comments", { text: "Corrected." });
    // What a revision copies is told to nobody a second time.
    const row = await app.deps.database.models.jobs.findOne({ where: { id: job.id }, rejectOnEmpty: true });
    const events = await eventsAfter(app.deps, row, 0);
    const told = events.map(({ data }) => (JSON.parse(data) as { id: string }).id);
    expect(new Set(told).size).toBe(told.length);
    expect(events.map(({ number }) => number)).toEqual(
      Array.from({ length: row.events }, (_, index) => index + 1),
    );
    expect((await job.sign()).status).toBe(201);
  });
});
