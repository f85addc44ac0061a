import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { z } from "zod";
import { fewestMovesResponse } from "../../shared/schemas/fewest-moves.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { fewestRequest } from "../support/fewest-requests.ts";

let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  const organisation = await makeOrganisation(app.deps);
  key = (await organisation.key("calculations:write", "calculations:read")).secret;
});
afterAll(() => app.close());

const post = (body: object, path = "/v1/fewest-moves") =>
  app.call().post(path).set("Authorization", `Bearer ${key}`).send(body);
const get = (path: string) => app.call().get(path).set("Authorization", `Bearer ${key}`);

describe("POST /v1/fewest-moves", () => {
  it("answers 201 with the parts to move, and keeps it as a record that replays the same", async () => {
    const { status, body } = await post({ ...fewestRequest, note: "before the covers come off" });
    expect(status).toBe(201);
    expect(fewestMovesResponse.safeParse(body).error).toBeUndefined();
    expect(body).toMatchObject({ kind: "fewest-moves", level: 0.95, units: fewestRequest.units });
    const { result } = body as z.infer<typeof fewestMovesResponse>;
    expect(result.components.filter(({ moved }) => moved).map(({ id }) => id)).toEqual(["casing"]);
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({
      status: "succeeded",
      note: "before the covers come off",
      response: body,
    });
    const replay = await post({}, `/v1/calculations/${body.id}/replay`);
    expect(replay.body).toMatchObject({ same: true, differences: [] });
    expect((await get("/v1/calculations?kind=fewest-moves")).body.data).toHaveLength(1);
  });

  it("hands over a body that shim-moves takes as it is, with shims added, and brings every station inside", async () => {
    const { body } = await post(fewestRequest);
    const shims = { cutToSize: { increment: 0.01 } };
    const moves = await post({ ...body.result.shimMoves, shims }, "/v1/shim-moves");
    expect(moves.status).toBe(201);
    const verdicts = (moves.body.result.predicted as { verdict: string }[]).map(({ verdict }) => verdict);
    expect(verdicts).toEqual(Array(6).fill("conforms"));
  });

  it("answers 201, not an error, where no choice brings every station inside", async () => {
    const fixed = fewestRequest.components.map((part) => ({ ...part, fixed: true }));
    const { status, body } = await post({ ...fewestRequest, components: fixed });
    expect([status, body.result.infeasible.cause]).toEqual([201, "contradiction"]);
    expect(body.result.infeasible.reason).toContain("casing is fixed");
  });

  it("answers 422 with faults of the schema and of the domain together, each at its place", async () => {
    const [casing, ...parts] = fewestRequest.components;
    const { status, body } = await post({
      ...fewestRequest,
      couplings: [],
      reference: [{ id: "brg-1" }, { id: "brg-9" }],
      components: [{ ...casing, cost: 0 }, ...parts],
    });
    expect(status).toBe(422);
    const places = (body as { errors: { pointer: string; code: string }[] }).errors
      .map(({ pointer, code }) => `${pointer} ${code}`)
      .sort();
    expect(places).toEqual([
      "/components/0/cost out_of_range",
      "/couplings unknown_field",
      "/reference/1/id unknown_reference",
    ]);
  });

  it("keeps a refusal of the domain as a failed record", async () => {
    const { status, body } = await post({ ...fewestRequest, reference: [{ id: "brg-1" }] });
    expect([status, body.code]).toEqual([422, "reference_count"]);
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({ status: "failed", kind: "fewest-moves", response: null });
  });
});
