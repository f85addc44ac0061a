import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Machine } from "../../shared/schemas/machines.ts";
import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";

describe("machines", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const as = (token = works.tokens.engineer) => ({ Authorization: `Bearer ${token}` });
  const post = (path: string, body: object, headers: Record<string, string> = {}) =>
    app.call().post(path).set(as()).set(headers).send(body);
  const get = (path: string) => app.call().get(path).set(as());
  const create = async (document: object = fellgateDocument) =>
    (await post("/v1/machines", document)).body as Machine;

  it("keeps a machine as it was described, with its hash", async () => {
    const made = await create();
    const { body, headers } = await get(`/v1/machines/${made.id}`);
    expect((body as Machine).document).toEqual(fellgateDocument);
    expect(body).toMatchObject({ revision: 1, archived: false, version: 1, name: fellgateDocument.name });
    expect(headers.etag).toBe('"1"');
  });

  it("names every fault of a machine at its place, schema and domain together", async () => {
    const { reference: _, ...rest } = fellgateDocument;
    const { status, body } = await post("/v1/machines", {
      ...rest,
      colour: "blue",
      reference: ["brg-9"],
      stations: [...rest.stations, { ...rest.stations[0], tolerance: { radial: 0.1 } }],
    });
    expect(status).toBe(422);
    const errors = (body as { errors: { pointer: string; code: string }[] }).errors;
    expect(errors.map(({ pointer, code }) => [pointer, code])).toEqual(
      expect.arrayContaining([
        ["/colour", "unknown_field"],
        ["/reference/0", "unknown_reference"],
        [`/stations/${rest.stations.length}/id`, "duplicate_id"],
      ]),
    );
    const revised = await create();
    const nested = await post(
      `/v1/machines/${revised.id}/revisions`,
      { document: { ...fellgateDocument, reference: ["brg-9"] }, reason: "Wrong." },
      { "If-Match": '"1"' },
    );
    expect((nested.body as { errors: { pointer: string }[] }).errors[0]?.pointer).toBe(
      "/document/reference/0",
    );
  });

  it("adds a revision for each change, and compares any two", async () => {
    const { id } = await create();
    const changed = structuredClone(fellgateDocument);
    const [first] = changed.stations;
    if (first) first.z = 5;
    const { status, body } = await post(
      `/v1/machines/${id}/revisions`,
      { document: changed, reason: "brg-1 measured anew." },
      { "If-Match": '"1"' },
    );
    expect([status, (body as Machine).revision]).toEqual([201, 2]);
    const { body: compared } = await get(`/v1/machines/${id}/comparison?from=1&to=2`);
    expect(compared).toEqual({
      from: 1,
      to: 2,
      same: false,
      differences: [{ pointer: "/stations/brg-1/z", from: 0, to: 5 }],
    });
    const { body: old } = await get(`/v1/machines/${id}/revisions/1`);
    expect((old as { document: object }).document).toEqual(fellgateDocument);
    const { body: page } = await get(`/v1/machines/${id}/revisions`);
    const revisions = (page as { data: { revision: number; by: { member: { name: string } } }[] }).data;
    expect(revisions.map(({ revision, by }) => [revision, by.member.name])).toEqual([
      [2, "The engineer"],
      [1, "The engineer"],
    ]);
  });

  it("loses no edit: of two made at once one is taken, the other told what stands", async () => {
    const { id } = await create();
    const edit = (name: string) =>
      post(
        `/v1/machines/${id}/revisions`,
        { document: { ...fellgateDocument, name }, reason: "At once." },
        { "If-Match": '"1"' },
      );
    const answers = await Promise.all(["one", "two", "three", "four"].map(edit));
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 412, 412, 412]);
    const stale = answers.find(({ status }) => status === 412);
    expect(stale?.headers.etag).toBe('"2"');
    const without = await post(`/v1/machines/${id}/revisions`, {
      document: fellgateDocument,
      reason: "No tag.",
    });
    expect((without.body as { code: string }).code).toBe("precondition_required");
  });

  it("copies a machine under another name, as a machine of its own", async () => {
    const { id } = await create();
    const { status, body } = await post(`/v1/machines/${id}/copies`, { name: "Fellgate Unit 3" });
    const copy = body as Machine;
    expect([status, copy.revision, copy.document.name, copy.document.plantTag]).toEqual([
      201,
      1,
      "Fellgate Unit 3",
      null,
    ]);
    expect(copy.id).not.toBe(id);
  });

  it("puts a machine away: it can be read, and no new job starts on it", async () => {
    const { id } = await create();
    const archive = (archived: boolean, version: number) =>
      app.call().patch(`/v1/machines/${id}`).set(as()).set("If-Match", `"${version}"`).send({ archived });
    expect((await archive(true, 1)).body).toMatchObject({ archived: true, version: 2 });
    const listed = async (query: string) =>
      ((await get(`/v1/machines${query}`)).body as { data: { id: string }[] }).data.some(
        (one) => one.id === id,
      );
    expect([await listed(""), await listed("?archived=true")]).toEqual([false, true]);
    const job = { machineId: id, details: { title: "Too late", seen: "downstream" } };
    expect((await post("/v1/jobs", job)).body).toMatchObject({ status: 409, code: "machine_archived" });
    expect((await archive(false, 2)).body).toMatchObject({ archived: false });
    expect((await post("/v1/jobs", job)).status).toBe(201);
  });

  it("gives the first answer again under one Idempotency-Key, and makes one machine", async () => {
    const key = { "Idempotency-Key": app.deps.newId() };
    const [one, two] = [
      await post("/v1/machines", fellgateDocument, key),
      await post("/v1/machines", fellgateDocument, key),
    ];
    expect(two.body).toEqual(one.body);
    expect(two.headers["idempotent-replayed"]).toBe("true");
  });
});
