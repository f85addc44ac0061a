import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openClaim } from "../../server/services/idempotency.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";

describe("Idempotency-Key", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const fit = (key: string, body: object = smallBoreFit, token = works.tokens.engineer) =>
    app
      .call()
      .post("/v1/bore-fits")
      .set("Authorization", `Bearer ${token}`)
      .set("Idempotency-Key", key)
      .send(body);
  const count = () => app.deps.database.models.calculations.count({ where: { organisationId: works.id } });

  it("gives the first answer again, and stores and counts it once", async () => {
    const before = await count();
    const first = await fit("one");
    const again = await fit('"one"');
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(again.text).toBe(first.text);
    expect(again.headers["idempotent-replayed"]).toBe("true");
    expect(first.headers["idempotent-replayed"]).toBeUndefined();
    expect(await count()).toBe(before + 1);
  });

  it("gives a refusal of the engine again too, byte for byte", async () => {
    const collinear = {
      ...smallBoreFit,
      bores: [{ id: "b", form: "points", points: [0, 1, 2].map((at) => ({ h: at, v: 0 })) }],
    };
    const first = await fit("refused", collinear);
    const again = await fit("refused", collinear);
    expect([first.status, again.status]).toEqual([422, 422]);
    expect(again.text).toBe(first.text);
    expect(again.headers["content-type"]).toContain("application/problem+json");
  });

  it("sees the same body in another order of members, and refuses another body", async () => {
    const first = await fit("order");
    const { units, ...rest } = smallBoreFit;
    expect((await fit("order", { ...rest, units })).text).toBe(first.text);
    expect((await fit("order", { ...smallBoreFit, note: "other" })).body).toMatchObject({
      status: 422,
      code: "idempotency_key_reused",
    });
  });

  it("keeps nothing of a call that broke the schema", async () => {
    expect((await fit("schema", { ...smallBoreFit, bores: [] })).status).toBe(422);
    expect((await fit("schema")).status).toBe(201);
  });

  it("belongs to one credential", async () => {
    const { secret } = await works.key("calculations:write");
    const first = await fit("mine");
    const other = await fit("mine", smallBoreFit, secret);
    expect(other.status).toBe(201);
    expect(other.text).not.toBe(first.text);
  });

  it("lets one of fifty parallel calls compute; the others get its answer or are told to wait", async () => {
    const before = await count();
    const answers = await Promise.all(Array.from({ length: 50 }, () => fit("parallel")));
    const made = answers.filter(({ status }) => status === 201);
    expect(new Set(made.map(({ text }) => text)).size).toBe(1);
    for (const { status, body, headers } of answers.filter(({ status }) => status !== 201)) {
      expect(status).toBe(409);
      expect(body).toMatchObject({ code: "idempotency_in_progress" });
      expect(headers["retry-after"]).toBe("1");
    }
    expect(await count()).toBe(before + 1);
    expect((await fit("parallel")).text).toBe(made[0]?.text);
  });

  it("is held by a call that runs, and free again once its lease has run out", async () => {
    const held = {
      organisationId: works.id,
      credentialId: works.members.engineer.id,
      key: "held",
      call: "whatever",
    };
    await openClaim(app.deps, held);
    await expect(openClaim(app.deps, held)).rejects.toMatchObject({ code: "idempotency_in_progress" });
    app.advance(31_000);
    const late = await openClaim(app.deps, held);
    app.advance(-31_000);
    expect(late).toHaveProperty("row");
  });

  it("never lets a call settle a key that another has taken over", async () => {
    const request = {
      organisationId: works.id,
      credentialId: works.members.engineer.id,
      key: "overtaken",
      call: "whatever",
    };
    const first = await openClaim(app.deps, request);
    app.advance(31_000);
    const second = await openClaim(app.deps, request);
    app.advance(-31_000);
    if (!("settle" in first) || !("settle" in second)) throw new Error("Both calls hold a claim.");
    await expect(first.settle({ status: 201, answerText: "{}" })).rejects.toMatchObject({
      code: "idempotency_in_progress",
    });
    await second.settle({ status: 201, answerText: '{"by":"second"}' });
    expect(await openClaim(app.deps, request)).toMatchObject({ status: 201, body: { by: "second" } });
  });

  it("refuses a key that is empty, too long or not printable", async () => {
    for (const key of ['""', "a".repeat(256), "with space"]) {
      expect((await fit(key)).body).toMatchObject({
        status: 400,
        code: "invalid_header",
        errors: [{ header: "Idempotency-Key" }],
      });
    }
  });
});
