import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { cautions } from "../../shared/cautions.ts";
import { confirmationResponse } from "../../shared/schemas/confirmations.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { confirmed } from "../support/confirmation-requests.ts";
import { makeOrganisation } from "../support/factories.ts";

let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  const organisation = await makeOrganisation(app.deps);
  key = (await organisation.key("calculations:write", "calculations:read")).secret;
});
afterAll(() => app.close());

const post = (body: object) =>
  app.call().post("/v1/confirmations").set("Authorization", `Bearer ${key}`).send(body);
const get = (path: string) => app.call().get(path).set("Authorization", `Bearer ${key}`);

describe("POST /v1/confirmations", () => {
  it("answers 201 with what repeats, what moved and the cautions, and keeps it as a record that replays the same", async () => {
    const { status, body, headers } = await post({ ...confirmed, note: "after the casing" });
    expect(status).toBe(201);
    expect(confirmationResponse.safeParse(body).success).toBe(true);
    expect(body).toMatchObject({
      kind: "confirmation",
      cautions,
      result: { reference: { repeats: true }, unexpected: [], outstanding: [] },
    });
    expect(headers["location"]).toBe(`/v1/calculations/${body.id}`);
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({ status: "succeeded", note: "after the casing", response: body });
    const replay = await app
      .call()
      .post(`/v1/calculations/${body.id}/replay`)
      .set("Authorization", `Bearer ${key}`);
    expect(replay.body).toMatchObject({ same: true, differences: [] });
    expect((await get("/v1/calculations?kind=confirmation")).body.data).toHaveLength(1);
  });

  it("answers 422 with faults of the schema and of the domain together, each at its place", async () => {
    const { sameSetUp: _sameSetUp, ...rest } = confirmed;
    const { status, body } = await post({ ...rest, reference: ["nobody"], moves: [{ h: 0, v: "up" }] });
    expect(status).toBe(422);
    const { errors } = body as { errors: { pointer: string; code: string }[] };
    expect(errors.map(({ pointer, code }) => `${pointer} ${code}`).sort()).toEqual([
      "/moves/0/v wrong_type",
      "/reference/0 unknown_reference",
      "/sameSetUp required",
    ]);
  });

  it("keeps a refusal of the domain as a failed record", async () => {
    const { status, body } = await post({ ...confirmed, sameSetUp: false, reference: ["brg-1"] });
    expect(status).toBe(422);
    expect(body).toMatchObject({
      code: "reference_count",
      errors: [{ pointer: "/reference", allowed: { min: 2 } }],
    });
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({ status: "failed", kind: "confirmation", response: null });
  });
});
