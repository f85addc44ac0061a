import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { asFoundReadings, fellgateChecks, fellgateJobDetails } from "../../server/demo/fellgate-job.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";
import { JobDriver, signingPassword } from "../support/fellgate-job.ts";

describe("jobs", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const started = async (details: object = fellgateJobDetails) => {
    const job = new JobDriver(app, works);
    await job.start(details);
    return job;
  };
  const codes = (flags: readonly { code: string }[]) => flags.map(({ code }) => code);

  it("keeps the revision of the machine that it started with", async () => {
    const job = await started();
    const changed = await app
      .call()
      .post(`/v1/machines/${job.machineId}/revisions`)
      .set("Authorization", `Bearer ${job.token}`)
      .set("If-Match", '"1"')
      .send({ document: { ...(await job.read()).machine, name: "Renamed" }, reason: "A better name." });
    expect(changed.status).toBe(201);
    expect(await job.read()).toMatchObject({ machineRevision: 1, machineName: "Fellgate Unit 2" });
  });

  it("names what is wrong with its details at their places", async () => {
    const job = await started();
    const details = {
      ...fellgateJobDetails,
      axis: { method: "two_station", through: ["brg-1", "brg-77", "shr-3"] },
    };
    const { status, body } = await job.post("/v1/jobs", { machineId: job.machineId, details });
    expect(status).toBe(422);
    expect(
      (body["errors"] as { pointer: string; code: string }[]).map(({ pointer, code }) => [pointer, code]),
    ).toEqual([
      ["/details/axis/through/1", "unknown_reference"],
      ["/details/axis", "reference_count"],
    ]);
    const nowhere = await job.post("/v1/jobs", { machineId: app.deps.newId(), details: fellgateJobDetails });
    expect(nowhere.status).toBe(404);
  });

  it("lists jobs by machine, state and words of the title", async () => {
    const job = await started({ ...fellgateJobDetails, title: "Bearing inspection, spring" });
    const list = async (query: string) => {
      const { body } = await app.call().get(`/v1/jobs?${query}`).set("Authorization", `Bearer ${job.token}`);
      return (body as { data: { id: string }[] }).data.map(({ id }) => id);
    };
    expect(await list(`machineId=${job.machineId}`)).toEqual([job.id]);
    expect(await list("q=spring%20bearing")).toEqual([job.id]);
    expect(await list(`machineId=${job.machineId}&state=signed`)).toEqual([]);
  });

  it("loses no edit of its details: of several made at once one is taken", async () => {
    const job = await started();
    const { version } = await job.read();
    const edit = (title: string) =>
      app
        .call()
        .patch(`/v1/jobs/${job.id}`)
        .set("Authorization", `Bearer ${job.token}`)
        .set("If-Match", `"${version}"`)
        .send({ details: { ...fellgateJobDetails, title } });
    const answers = await Promise.all(["one", "two", "three"].map(edit));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412, 412]);
    const winner = answers.find(({ status }) => status === 200)?.body as { title: string };
    expect((await job.read()).title).toBe(winner.title);
  });

  it("takes readings that arrive at the same time from several people, all of them", async () => {
    const job = await started();
    const survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    const readings = asFoundReadings();
    await Promise.all(
      readings.map((reading) => job.add(`/surveys/${survey}/readings`, { readings: [reading] })),
    );
    const [stored] = (await job.read()).surveys;
    expect(stored?.readings.map(({ reading }) => reading.station).sort()).toEqual(
      readings.map(({ station }) => station).sort(),
    );
  });

  it("marks a survey taken before the set-up checks were answered, on the survey and on the record", async () => {
    const job = await started();
    await job.survey("as_found", asFoundReadings());
    const record = await job.read();
    expect(codes(record.surveys[0]?.flags ?? [])).toEqual(["set_up_unchecked"]);
    expect(codes(record.flags)).toEqual(["set_up_unchecked"]);
    for (const check of fellgateChecks) await job.add("/checks", { ...check, at: null });
    expect(codes((await job.read()).flags)).toEqual(["set_up_unchecked"]);
  });

  it("refuses a reading that cannot be fitted at its place, and stores none of the call", async () => {
    const job = await started();
    const survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    const [first, second] = asFoundReadings();
    const cut = first?.form === "turned_gauge" ? { ...first, readings: first.readings.slice(0, 2) } : first;
    const { status, body } = await job.post(`/v1/jobs/${job.id}/surveys/${survey}/readings`, {
      readings: [second, cut, { ...second, station: "brg-77" }],
    });
    expect(status).toBe(422);
    expect(body["errors"]).toMatchObject([{ pointer: "/readings/2/station", code: "unknown_reference" }]);
    const engine = await job.post(`/v1/jobs/${job.id}/surveys/${survey}/readings`, {
      readings: [second, cut],
    });
    expect(engine.body["errors"]).toMatchObject([
      { pointer: "/readings/1/readings", code: "too_few_points" },
    ]);
    expect((await job.read()).surveys[0]?.readings).toEqual([]);
  });

  it("keeps with each reading the end it was seen from, whatever the job's details say later", async () => {
    const job = await started();
    const survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    const { seen: _unsaid, ...reading } = asFoundReadings()[0] ?? {};
    await job.add(`/surveys/${survey}/readings`, { readings: [reading] });
    const turned = await app
      .call()
      .patch(`/v1/jobs/${job.id}`)
      .set("Authorization", `Bearer ${job.token}`)
      .set("If-Match", `"${(await job.read()).version}"`)
      .send({ details: { ...fellgateJobDetails, seen: "upstream" } });
    expect(turned.status).toBe(200);
    expect((await job.read()).surveys[0]?.readings[0]?.reading.seen).toBe("downstream");
  });

  it("says that a result is outdated once readings have changed, and computes it anew", async () => {
    const job = await started();
    const found = await job.survey("as_found", asFoundReadings());
    const [reading] = asFoundReadings();
    await job.add(`/surveys/${found}/readings`, {
      readings: [{ ...reading, takenAt: "2026-11-05T08:00:00Z" }],
    });
    const outdated = await job.read();
    expect(outdated.surveys[0]?.result?.current).toBe(false);
    expect(codes(outdated.surveys[0]?.flags ?? [])).toContain("result_outdated");
    expect((await job.post(`/v1/jobs/${job.id}/plans`, { survey: found })).body).toMatchObject({
      status: 409,
      code: "survey_not_computed",
    });
    await job.add(`/surveys/${found}/results`);
    expect((await job.read()).surveys[0]?.result?.current).toBe(true);
  });

  it("asks for a reason where a bearing moves before the casings planned, and keeps the flag with it", async () => {
    const job = await started();
    const found = await job.survey("as_found", asFoundReadings());
    await job.add("/plans", { survey: found });
    const bearing = (await job.read()).machine.components?.find(({ kind }) => kind === "bearing")?.id;
    const move = { component: bearing, at: "2026-11-06T08:00:00Z", finished: true };
    expect((await job.post(`/v1/jobs/${job.id}/moves`, move)).body).toMatchObject({
      status: 422,
      code: "reason_required",
      errors: [{ pointer: "/reason" }],
    });
    const told = await job.post(`/v1/jobs/${job.id}/moves`, {
      ...move,
      reason: "The casing waits for a crane.",
    });
    expect(codes(told.body["flags"] as { code: string }[])).toContain("bearing_before_casing");
    expect(codes((await job.read()).flags)).toContain("bearing_before_casing");
    expect((await job.post(`/v1/jobs/${job.id}/moves`, { ...move, component: "lid" })).status).toBe(422);
  });

  it("refuses a signature while anything stands in the way, naming all of it, and never by a key", async () => {
    const job = await started();
    await job.givePassword();
    await job.survey("as_found", asFoundReadings());
    const { status, body } = await job.sign();
    expect([status, body["code"]]).toEqual([409, "sign_off_blocked"]);
    expect(body["obstacles"]).toEqual((await job.read()).signOff.obstacles);
    const { secret } = await works.key("jobs:write");
    const byKey = await app
      .call()
      .post(`/v1/jobs/${job.id}/signature`)
      .set("Authorization", `Bearer ${secret}`)
      .send({ password: signingPassword, meaning: "By a key." });
    expect(byKey.body).toMatchObject({ status: 403, code: "member_required" });
  });

  it("takes a concession by name for a station that does not conform", async () => {
    const job = await started();
    await job.survey("as_found", asFoundReadings());
    const open = () => job.read().then(({ signOff }) => signOff.obstacles.map(({ station }) => station));
    const [station] = await open();
    await job.add("/concessions", { station, name: "Maren Oake", reason: "Clearances checked by lead." });
    expect(await open()).not.toContain(station);
    const nowhere = await job.post(`/v1/jobs/${job.id}/concessions`, {
      station: "brg-77",
      name: "N",
      reason: "R",
    });
    expect(nowhere.body).toMatchObject({ errors: [{ pointer: "/station", code: "unknown_reference" }] });
  });
});
