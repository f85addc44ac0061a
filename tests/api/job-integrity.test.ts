import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { asFoundReadings, fellgateChecks } from "../../server/demo/fellgate-job.ts";
import type { JobEntryRow } from "../../server/models/job-entry.ts";
import type { IndicationAnswer } from "../../shared/schemas/indications.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";
import { limits } from "../../shared/limits.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

describe("what a job's record rests on", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const started = async () => {
    const job = new JobDriver(app, works);
    await job.start();
    return job;
  };
  const codes = (flags: readonly { code: string }[] = []) => flags.map(({ code }) => code);
  /** What the same bore shows when it lies `right` of where it was, as this form of reading has it. */
  const shifted = (reading: Reading, right: number): Reading => {
    if (reading.form === "points")
      return { ...reading, points: reading.points.map((one) => ({ ...one, h: one.h + right })) };
    if (reading.form !== "turned_gauge") throw new Error(`Not written for ${reading.form}.`);
    const sine = (clockDeg: number) => Math.sin((clockDeg * Math.PI) / 180);
    const readings = reading.readings.map((one) => ({
      ...one,
      reading: one.reading + right * sine(one.clockDeg),
    }));
    return { ...reading, readings };
  };
  const later = (reading: Reading, takenAt: string): Reading => ({ ...reading, takenAt });

  it("tells a reading that was taken back from one that was read again", async () => {
    const job = await started();
    const survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    const [first] = asFoundReadings();
    if (!first) throw new Error("The demo has readings.");
    const add = (reading: Reading) => job.add(`/surveys/${survey}/readings`, { readings: [reading] });
    await add(first);
    await add(later(first, "2026-11-04T12:00:00Z"));
    const slip = await add(later(first, "2026-11-04T13:00:00Z"));
    await job.add(`/entries/${slip}/withdrawal`, { reason: "Read at the wrong bore." });
    const readings = (await job.read()).surveys[0]?.readings;
    expect(readings?.map(({ standing, counts }) => [standing, counts])).toEqual([
      ["superseded", false],
      ["in_use", true],
      ["withdrawn", false],
    ]);
  });

  it("shows a plan against the result that it was made from, and follows it against that", async () => {
    const job = await started();
    const survey = await job.survey("as_found", asFoundReadings());
    const plan = await job.add("/plans", { survey });
    const before = await job.read();
    const old = before.surveys[0]?.result;
    expect(before.plans[0]).toMatchObject({ surveyResult: old?.id, current: true });

    const [, , third] = asFoundReadings();
    if (!third) throw new Error("The demo has readings.");
    const again = shifted(later(third, "2026-11-05T08:00:00Z"), 0.3);
    await job.add(`/surveys/${survey}/readings`, { readings: [again] });
    expect((await job.read()).plans[0]?.current).toBe(false);
    await job.add(`/surveys/${survey}/results`);
    const after = await job.read();
    const newest = after.surveys[0]?.result;
    const deviationOf = (result: typeof old) =>
      result?.stations.find(({ id }) => id === third.station)?.deviation.h ?? NaN;
    // The bore was read 0.3 mm from where it was read first: the newest result says so, the plan does not.
    expect(Math.abs(Math.abs(deviationOf(newest) - deviationOf(old)) - 0.3)).toBeLessThan(0.02); // mm
    expect(after.plans[0]).toMatchObject({ surveyResult: old?.id, current: false });
    expect(after.plans[0]?.from).toEqual(before.plans[0]?.from);
    expect(after.plans[0]?.from.stations.find(({ id }) => id === third.station)?.deviation.h).toBe(
      deviationOf(old),
    );

    const component = after.machine.components?.find(({ stations = [] }) =>
      stations.includes(third.station),
    )?.id;
    const centre = old?.fits.find(({ id }) => id === third.station)?.centre;
    const { status, body } = await job.post(`/v1/jobs/${job.id}/indications`, {
      plan,
      component,
      at: "2026-11-06T08:00:00Z",
      sights: [{ station: third.station, centre }, ...sightsOf(after, component, third.station)],
    });
    expect(status).toBe(201);
    for (const { moved } of (body as unknown as IndicationAnswer).supports) {
      expect(Math.abs(moved.h ?? NaN)).toBeLessThan(1e-9); // mm: nothing has moved since the plan was made
    }
  });

  /** The component's other bores, where the plan's survey had them. */
  function sightsOf(
    { machine, surveys }: Awaited<ReturnType<JobDriver["read"]>>,
    component: string | undefined,
    but: string,
  ) {
    const own = machine.components?.find(({ id }) => id === component)?.stations ?? [];
    return (surveys[0]?.result?.fits ?? [])
      .filter(({ id }) => own.includes(id) && id !== but)
      .map(({ id, centre }) => ({ station: id, centre }));
  }

  it("judges how far the first station moved from opening to closing reading, and only tells", async () => {
    const drifted = async (right: number) => {
      const job = await started();
      for (const check of fellgateChecks) await job.add("/checks", check);
      const readings = asFoundReadings().map((one) => (one.closing ? shifted(one, right) : one));
      await job.survey("as_found", readings);
      return job.read();
    };
    const [steady, moved] = [await drifted(0), await drifted(0.1)];
    const [calm, drift] = [steady, moved].map(({ surveys }) => surveys[0]?.result?.drift);
    expect(calm).toMatchObject({ station: "brg-1", level: 0.95, exceeds: false });
    expect(drift).toMatchObject({ station: "brg-1", level: 0.95, exceeds: true });
    expect(Math.abs(Math.abs((drift?.h ?? NaN) - (calm?.h ?? NaN)) - 0.1)).toBeLessThan(0.01); // mm
    expect(codes(steady.flags)).toEqual([]);
    expect([codes(moved.flags), codes(moved.surveys[0]?.flags)]).toEqual([
      ["survey_drifted"],
      ["survey_drifted"],
    ]);
    // It is told and stands in the way of nothing.
    expect(codes(moved.signOff.obstacles)).toEqual(codes(steady.signOff.obstacles));
  });

  it("takes no axis of a survey that is not computed, and none of readings that came later", async () => {
    const job = await started();
    const survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    const accept = () =>
      job.post(`/v1/jobs/${job.id}/axis-acceptances`, { survey, name: "Ines Alder", reason: "New set-up." });
    expect((await accept()).body).toMatchObject({ status: 409, code: "survey_not_computed" });
    await job.add(`/surveys/${survey}/readings`, { readings: asFoundReadings() });
    await job.add(`/surveys/${survey}/results`);
    expect((await accept()).status).toBe(201);
  });

  it("takes so many attachments and files of readings, counting those that were taken back", async () => {
    const job = await started();
    const survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    const { jobEntries, jobs } = app.deps.database.models;
    const fill = async (kind: "attachment" | "reading", count: number, documentOf: () => object) => {
      const row = await jobs.findOne({ where: { id: job.id }, rejectOnEmpty: true });
      const last = (await jobEntries.max<number, JobEntryRow>("sequence", { where: { jobId: job.id } })) + 1;
      await jobEntries.bulkCreate(
        Array.from({ length: count }, (_, index) => ({
          jobId: job.id,
          revision: 1,
          sequence: last + index,
          id: app.deps.newId(),
          organisationId: works.id,
          kind,
          documentText: JSON.stringify(documentOf()),
          createdAt: new Date(),
          memberId: null,
          keyId: null,
          authorName: "",
          event: row.events + 1 + index,
        })),
      );
      await row.update({ events: row.events + count });
    };
    const send = (path: string, mediaType: string, content: string | Buffer) =>
      app
        .call()
        .post(`/v1/jobs/${job.id}${path}`)
        .set("Authorization", `Bearer ${job.token}`)
        .set("Content-Type", mediaType)
        .send(content);

    const png = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 1]);
    const attach = () => send("/attachments?name=deck.png", "image/png", png);
    const attachment = { name: "a", mediaType: "image/png", bytes: 1, sha256: "", caption: null };
    const newId = () => app.deps.newId();
    await fill("attachment", limits.attachmentsPerJob - 1, () => ({ file: newId(), ...attachment }));
    const last = await attach();
    expect(last.status).toBe(201);
    const [id] = (last.body as { ids: string[] }).ids;
    await job.add(`/entries/${id}/withdrawal`, { reason: "Blurred." });
    expect((await attach()).body).toMatchObject({ status: 422, code: "too_many_items" });

    const [reading] = asFoundReadings();
    await fill("reading", limits.readingFilesPerJob, () => ({
      survey,
      reading,
      sourceFile: { id: newId(), name: "f", sha256: "" },
    }));
    const csv = [
      "station,form,taken at,sense,zero,clock (deg),reading (mm)",
      ...[0, 90, 180, 270].map(
        (deg) => `brg-1,turned_gauge,2026-11-04T07:40:00Z,larger_is_farther,nominal,${deg},0.1`,
      ),
    ].join("\n");
    const file = await send(`/surveys/${survey}/reading-files?name=r.csv`, "text/csv", csv);
    expect(file.body).toMatchObject({ status: 422, code: "too_many_items" });
  }, 30_000);
});
