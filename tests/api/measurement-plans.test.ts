import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { z } from "zod";
import { measurementPlanResponse } from "../../shared/schemas/measurement-plans.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { planRequest } from "../support/plan-requests.ts";

let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  const organisation = await makeOrganisation(app.deps);
  key = (await organisation.key("calculations:write", "calculations:read")).secret;
});
afterAll(() => app.close());

const post = (body: object, path = "/v1/measurement-plans") =>
  app.call().post(path).set("Authorization", `Bearer ${key}`).send(body);
const get = (path: string) => app.call().get(path).set("Authorization", `Bearer ${key}`);
const placesOf = (body: unknown) =>
  (body as { errors: { pointer: string; code: string }[] }).errors
    .map(({ pointer, code }) => `${pointer} ${code}`)
    .sort();

describe("POST /v1/measurement-plans", () => {
  it("answers 201 with a plan for each bore, and keeps it as a record that replays the same", async () => {
    const { status, body } = await post({ ...planRequest, note: "before the upper halves" });
    expect(status).toBe(201);
    expect(measurementPlanResponse.safeParse(body).success).toBe(true);
    expect(body).toMatchObject({ kind: "measurement-plan", level: 0.95, units: planRequest.units });
    const { bores } = (body as z.infer<typeof measurementPlanResponse>).result;
    expect(bores.map(({ id, status: found }) => `${id} ${found}`)).toEqual([
      "brg-1 suffices_when_added",
      "brg-2 suffices_when_added",
    ]);
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({
      status: "succeeded",
      note: "before the upper halves",
      response: body,
    });
    const replay = await post({}, `/v1/calculations/${body.id}/replay`);
    expect(replay.body).toMatchObject({ same: true, differences: [] });
    expect((await get("/v1/calculations?kind=measurement-plan")).body.data).toHaveLength(1);
  });

  it("fits what it planned with the covariance that it predicted", async () => {
    const [bore] = planRequest.bores;
    const plan = await post({ ...planRequest, bores: [bore] });
    const { add, after } = plan.body.result.bores[0];
    const angles = [...bore!.read!, ...(add as { clockDeg: number }[])].map(({ clockDeg }) => clockDeg);
    const { units, readingUncertainty } = planRequest;
    const fit = await post(
      {
        units,
        seen: "downstream",
        bores: [
          {
            id: "brg-1",
            form: "turned_gauge",
            nominalDiameter: 400,
            sense: "larger_is_farther",
            zero: "nominal",
            readingUncertainty,
            readings: angles.map((clockDeg) => ({ clockDeg, reading: 0.001 })),
          },
        ],
      },
      "/v1/bore-fits",
    );
    expect(fit.status).toBe(201);
    const { covariance, expandedUncertainty } = fit.body.result.bores[0];
    for (const row of [0, 1]) {
      for (const column of [0, 1]) {
        expect(Math.abs(covariance[row][column] - after.covariance[row][column])).toBeLessThan(1e-14); // mm²
      }
    }
    expect(Math.abs(expandedUncertainty.v / after.expandedUncertainty.v - 1)).toBeLessThan(1e-9);
  });

  it("answers 422 with faults of the schema and of the domain together, each at its place", async () => {
    const { readingUncertainty: _, ...rest } = planRequest;
    const { status, body } = await post({
      ...rest,
      bores: [
        { ...planRequest.bores[0], form: "wire" },
        { id: "b", form: "points", reachable: { clockDegs: [0, 90] } },
        {
          id: "b",
          form: "points",
          readingUncertainty: 0.01,
          reachable: { clockDegs: [0, 90], readingsPerPlace: 0 },
        },
        { id: "c", form: "points", readingUncertainty: 0.01, reachable: { clockDegs: [0, 180] } },
      ],
    });
    expect(status).toBe(422);
    expect(placesOf(body)).toEqual([
      "/bores/0/form choice_unknown",
      "/bores/1/readingUncertainty required",
      "/bores/2/id duplicate_id",
      "/bores/2/reachable/readingsPerPlace out_of_range",
      "/bores/3/reachable angles_insufficient",
    ]);
  });

  it("keeps a refusal of the domain as a failed record", async () => {
    const open = { id: "c", form: "points", reachable: { clockDegs: [0, 180] } };
    const { status, body } = await post({ ...planRequest, bores: [open] });
    expect([status, body.code]).toEqual([422, "angles_insufficient"]);
    const record = await get(`/v1/calculations/${body.id}`);
    expect(record.body).toMatchObject({ status: "failed", kind: "measurement-plan", response: null });
  });
});
