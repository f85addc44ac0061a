import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { sightLineSetupResponse } from "../../shared/schemas/sight-line-setups.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { sightRequest } from "../support/sight-line-requests.ts";

let app: TestApp;
let key: string;
let reader: string;
beforeAll(async () => {
  app = await openTestApp();
  const organisation = await makeOrganisation(app.deps);
  key = (await organisation.key("calculations:write", "calculations:read")).secret;
  reader = (await organisation.key("calculations:read")).secret;
});
afterAll(() => app.close());

const post = (body: object, path = "/v1/sight-line-setups", secret = key) =>
  app.call().post(path).set("Authorization", `Bearer ${secret}`).send(body);
const get = (path: string) => app.call().get(path).set("Authorization", `Bearer ${key}`);
const placesOf = (body: unknown) =>
  (body as { errors: { pointer: string; code: string }[] }).errors
    .map(({ pointer, code }) => `${pointer} ${code}`)
    .sort();

describe("POST /v1/sight-line-setups", () => {
  it("answers 201 with the move of the source and its cautions, and keeps a record that replays the same", async () => {
    const { status, body } = await post({ ...sightRequest, note: "before the first survey" });
    expect(status).toBe(201);
    expect(sightLineSetupResponse.safeParse(body).success).toBe(true);
    expect(body).toMatchObject({
      kind: "sight-line-setup",
      seen: "downstream",
      level: 0.95,
      units: sightRequest.units,
    });
    expect((body.cautions as { code: string }[]).map(({ code }) => code)).toContain("laser_light");
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({ status: "succeeded", response: body });
    const replay = await post({}, `/v1/calculations/${body.id}/replay`);
    expect(replay.body).toMatchObject({ same: true, differences: [] });
    expect((await get("/v1/calculations?kind=sight-line-setup")).body.data).toHaveLength(1);
  });

  it("comes to go_on when its own move is read as made", async () => {
    const { drift: _drift, ...steady } = sightRequest;
    const { body } = await post(steady);
    const stations = sightRequest.stations.map((station, index) => ({
      ...station,
      spot: body.result.stations[index].after.beam,
    }));
    const again = await post({ ...steady, stations });
    expect(again.body.result).toMatchObject({ repeat: false, next: "go_on" });
  });

  it("answers 422 with faults of the schema and of the domain together, each at its place", async () => {
    const { temperature: _temperature, ...units } = sightRequest.units;
    const { sourceZ: _sourceZ, ...rest } = sightRequest;
    const [first] = sightRequest.stations;
    const { status, body } = await post({ ...rest, units, stations: [first, first], loose: true });
    expect(status).toBe(422);
    expect(placesOf(body)).toEqual([
      "/loose unknown_field",
      "/sourceZ required",
      "/stations/1/id duplicate_id",
      "/stations/1/z stations_coincident",
      "/units/temperature units_missing",
    ]);
    const three = await post({ ...sightRequest, stations: [first, first, first] });
    expect(placesOf(three.body)).toContain("/stations too_many_items");
  });

  it("keeps a refusal of the domain as a failed record, and asks for the scope", async () => {
    const [first, second] = sightRequest.stations;
    const { status, body } = await post({ ...sightRequest, stations: [first, { ...second, z: first!.z }] });
    expect([status, body.code]).toEqual([422, "stations_coincident"]);
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({ status: "failed", kind: "sight-line-setup", response: null });
    const refused = await post(sightRequest, "/v1/sight-line-setups", reader);
    expect([refused.status, refused.body.code]).toEqual([403, "scope_missing"]);
  });
});

describe("POST /v1/bore-fits, with temperatures", () => {
  it("answers the diameter at 20 °C beside the diameter read, and replays the same", async () => {
    const units = { axial: "mm", bore: "mm", offset: "mm", temperature: "C" };
    // A square of points exactly round, 1200.36 mm across: a 1200 mm steel bore at 45 °C.
    const points = [0, 1, 2, 3].map((i) => ({
      h: [0, 1, 0, -1][i]! * 600.18,
      v: [1, 0, -1, 0][i]! * 600.18,
    }));
    const bore = { id: "cas-3", form: "points", points, partTemperature: 45, partCoefficient: 1.2e-5 };
    const { status, body } = await post({ units, seen: "downstream", bores: [bore] }, "/v1/bore-fits");
    expect(status).toBe(201);
    expect(body.units).toEqual(units);
    expect(Math.abs(body.result.bores[0].diameterAt20C - 1200)).toBeLessThan(1e-9); // mm
    const replay = await post({}, `/v1/calculations/${body.id}/replay`);
    expect(replay.body).toMatchObject({ same: true });
    const { temperature: _temperature, ...lengths } = units;
    const unstated = await post({ units: lengths, seen: "downstream", bores: [bore] }, "/v1/bore-fits");
    expect([unstated.status, placesOf(unstated.body)]).toEqual([422, ["/units/temperature units_missing"]]);
  });
});
