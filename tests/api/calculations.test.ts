import { afterAll, beforeAll, describe, expect, it } from "vitest";
import canonicalize from "canonicalize";
import type { CalculationRecord, CalculationSummary, Replay } from "../../shared/schemas/calculations.ts";
import { sha256 } from "../../server/services/run-calculation.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";

describe("calculations as records", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const as = (token: string) => ({ Authorization: `Bearer ${token}` });
  const fit = (token: string, body: object = smallBoreFit) =>
    app.call().post("/v1/bore-fits").set(as(token)).send(body);
  const read = async (id: string, token = works.tokens.viewer) =>
    (await app.call().get(`/v1/calculations/${id}`).set(as(token))).body as CalculationRecord;
  const list = async (query = "", token = works.tokens.viewer) =>
    (await app.call().get(`/v1/calculations${query}`).set(as(token))).body as {
      data: CalculationSummary[];
      nextCursor: string | null;
    };
  const collinear = {
    ...smallBoreFit,
    bores: [{ id: "b", form: "points", points: [0, 1, 2, 3].map((at) => ({ h: at, v: at })) }],
  };

  it("keep the request as received, the answer as sent, who asked with which key, and hashes anyone can check", async () => {
    const { id: keyId, secret } = await works.key("calculations:write", "calculations:read");
    const text = JSON.stringify({ note: "as found", ...smallBoreFit }, null, 3).replace("180.05", "180.0500");
    const answer = await app
      .call()
      .post("/v1/bore-fits")
      .set(as(secret))
      .set("Content-Type", "application/json")
      .send(text);
    expect(answer.status).toBe(201);
    const body = answer.body as { id: string; inputHash: string };
    expect(answer.headers.location).toBe(`/v1/calculations/${body.id}`);
    const record = await read(body.id);
    expect(record).toMatchObject({
      kind: "bore-fit",
      status: "succeeded",
      key: { id: keyId },
      member: null,
      note: "as found",
      problem: null,
    });
    expect(record.request).toEqual(JSON.parse(text));
    expect(record.response).toEqual(answer.body);
    expect(record.inputHash).toBe(sha256(canonicalize(JSON.parse(text)) ?? ""));
    expect(body.inputHash).toBe(record.inputHash);
    expect(record.requestId).toBe(answer.headers["x-request-id"]);
    const row = await app.deps.database.models.calculations.findOne({ where: { id: body.id } });
    expect(row?.requestText).toBe(text);
  });

  it("keep what the engine refuses, with its problem, and nothing of what breaks the schema", async () => {
    const before = (await list()).data.length;
    const refused = await fit(works.tokens.engineer, collinear);
    expect(refused.status).toBe(422);
    expect(refused.body).toMatchObject({
      code: "points_collinear",
      errors: [{ pointer: expect.stringMatching(/^\/bores\/0/) as string }],
    });
    const record = await read((refused.body as { id: string }).id);
    expect(record).toMatchObject({
      status: "failed",
      response: null,
      resultHash: null,
      member: { name: "The engineer" },
    });
    expect(record.problem).toEqual(refused.body);
    expect((await fit(works.tokens.engineer, { ...smallBoreFit, bores: [] })).status).toBe(422);
    expect((await list()).data).toHaveLength(before + 1);
  });

  it("replay as the same, success and refusal alike, and store nothing by it", async () => {
    for (const body of [smallBoreFit, collinear]) {
      const { id } = (await fit(works.tokens.engineer, body)).body as { id: string };
      const before = (await list()).data.length;
      const replay = await app.call().post(`/v1/calculations/${id}/replay`).set(as(works.tokens.engineer));
      expect(replay.status).toBe(200);
      expect(replay.body).toMatchObject({ same: true, differences: [] });
      expect((await list()).data).toHaveLength(before);
    }
  });

  it("replay with the pointer of every place where the answer is not what it was", async () => {
    const { id } = (await fit(works.tokens.engineer)).body as { id: string };
    // No operation can change a record: only someone at the database itself.
    await app.deps.database.sequelize.query(
      `UPDATE calculations SET answerText = JSON_SET(answerText, '$.result.bores[0].diameter', 1) WHERE id = '${id}'`,
    );
    const replay = (await app.call().post(`/v1/calculations/${id}/replay`).set(as(works.tokens.engineer)))
      .body as Replay;
    expect(replay.same).toBe(false);
    expect(replay.differences).toEqual([
      { pointer: "/result/bores/0/diameter", then: 1, now: expect.any(Number) as number },
    ]);
  });

  it("have one result hash for one result", async () => {
    const hashes = await Promise.all([fit(works.tokens.engineer), fit(works.tokens.admin)]).then((answers) =>
      Promise.all(answers.map(async ({ body }) => (await read((body as { id: string }).id)).resultHash)),
    );
    expect(hashes[0]).toMatch(/^sha256:[0-9a-f]{64}$/);
    expect(hashes[1]).toBe(hashes[0]);
  });

  it("are found by kind, status, key, time, words of the note and the start of an id", async () => {
    const own = await makeOrganisation(app.deps);
    const { id: keyId, secret } = await own.key("calculations:write");
    const noted = (await fit(secret, { ...smallBoreFit, note: "Outage 12, 100% as found_left" })).body as {
      id: string;
    };
    const other = (await fit(own.tokens.engineer)).body as { id: string };
    await fit(own.tokens.engineer, collinear);
    const ids = async (query: string) => (await list(query, own.tokens.viewer)).data.map(({ id }) => id);
    expect(await ids(`?keyId=${keyId}`)).toEqual([noted.id]);
    expect(await ids("?status=succeeded")).toEqual([other.id, noted.id]);
    expect(await ids("?kind=shim-move")).toEqual([]);
    expect(await ids("?q=found%20OUTAGE")).toEqual([noted.id]);
    expect(await ids("?q=100%25")).toEqual([noted.id]);
    expect(await ids("?q=d_left")).toEqual([noted.id]);
    expect(await ids("?q=fo_nd")).toEqual([]);
    expect(await ids(`?q=${other.id}`)).toEqual([other.id]);
    expect(await ids("?to=2020-01-01T00:00:00Z")).toEqual([]);
    expect(await ids("?from=2020-01-01T00:00:00Z")).toHaveLength(3);
  });

  it("page through rows of one instant while others arrive, each row once", async () => {
    const own = await makeOrganisation(app.deps);
    await Promise.all(Array.from({ length: 25 }, () => fit(own.tokens.engineer)));
    const existing = new Set((await list("?limit=200", own.tokens.viewer)).data.map(({ id }) => id));
    await app.deps.database.sequelize.query(
      `UPDATE calculations SET createdAt = '2026-01-01 00:00:00.123' WHERE organisationId = '${own.id}'`,
    );
    const seen: string[] = [];
    let cursor: string | null = "";
    while (cursor !== null) {
      const page = await list(
        `?limit=4${cursor && `&cursor=${encodeURIComponent(cursor)}`}`,
        own.tokens.viewer,
      );
      seen.push(...page.data.map(({ id }) => id));
      cursor = page.nextCursor;
      await fit(own.tokens.engineer);
    }
    expect(seen.filter((id) => existing.has(id)).sort()).toEqual([...existing].sort());
    expect(new Set(seen).size).toBe(seen.length);
  });

  it("take a cursor only with the filters and the organisation it was given for", async () => {
    const own = await makeOrganisation(app.deps);
    await fit(own.tokens.engineer);
    await fit(own.tokens.engineer);
    const { nextCursor } = await list("?limit=1", own.tokens.viewer);
    const status = async (query: string, token: string) =>
      (await app.call().get(`/v1/calculations${query}`).set(as(token))).status;
    expect(await status(`?limit=1&cursor=${nextCursor}`, own.tokens.viewer)).toBe(200);
    expect(await status(`?limit=1&kind=bore-fit&cursor=${nextCursor}`, own.tokens.viewer)).toBe(400);
    expect(await status(`?cursor=${nextCursor}x`, own.tokens.viewer)).toBe(400);
    expect(await status(`?limit=1&cursor=${nextCursor}`, works.tokens.viewer)).toBe(400);
  });

  it("bring the page size into range and refuse what is no size", async () => {
    const limitOf = async (limit: string) =>
      (await app.call().get(`/v1/calculations?limit=${limit}`).set(as(works.tokens.viewer))).body as {
        limit?: number;
        status?: number;
      };
    expect((await limitOf("1000000000")).limit).toBe(200);
    expect((await limitOf("0")).status).toBe(400);
    expect((await limitOf("-1")).status).toBe(400);
  });

  it("answer 304 to a client that has the record already", async () => {
    const { id } = (await fit(works.tokens.engineer)).body as { id: string };
    const first = await app.call().get(`/v1/calculations/${id}`).set(as(works.tokens.viewer));
    const again = await app
      .call()
      .get(`/v1/calculations/${id}`)
      .set(as(works.tokens.viewer))
      .set("If-None-Match", first.headers.etag as string);
    expect(again.status).toBe(304);
  });

  it("count in usage in the very next call, by day, key and endpoint", async () => {
    const own = await makeOrganisation(app.deps);
    const { id: keyId, secret } = await own.key("calculations:write");
    const usage = async (groupBy: string) =>
      (await app.call().get(`/v1/usage?groupBy=${groupBy}`).set(as(own.tokens.admin))).body as {
        data: Record<string, unknown>[];
        total: object;
      };
    expect((await usage("day")).total).toMatchObject({ calls: 0 });
    await fit(secret);
    await fit(own.tokens.engineer, collinear);
    expect((await usage("day")).data).toMatchObject([
      { day: new Date().toISOString().slice(0, 10), calls: 2, succeeded: 1, failed: 1 },
    ]);
    expect((await usage("endpoint")).data).toMatchObject([{ endpoint: "/v1/bore-fits", calls: 2 }]);
    const byKey = (await usage("key")).data;
    expect(byKey).toContainEqual(
      expect.objectContaining({ key: expect.objectContaining({ id: keyId }) as object, calls: 1 }),
    );
    expect(byKey).toContainEqual(expect.objectContaining({ key: null, calls: 1 }));
  });
});
