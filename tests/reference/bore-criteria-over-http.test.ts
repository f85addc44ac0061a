import { afterAll, beforeAll, expect } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { figuresOfCriteria } from "./criterion-figures.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** The published cases of the criteria other than least squares, through the whole service. */
let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  key = (await (await makeOrganisation(app.deps)).key("calculations:write")).secret;
});
afterAll(() => app.close());

interface Answered {
  readonly method: string;
  readonly centre: { readonly h: number; readonly v: number };
  readonly diameter: number;
  readonly roundness: number;
  readonly residuals: number[];
  readonly contacts: number[] | null;
}

interface Circle {
  readonly points: readonly [number, number][];
}

function send({ points }: Circle, methods: readonly string[]) {
  const sent = points.map(([h, v]) => ({ h, v }));
  const bores = methods.map((method) => ({ id: method, form: "points", method, points: sent }));
  return app
    .call()
    .post("/v1/bore-fits")
    .set("Authorization", `Bearer ${key}`)
    .send({ units: { axial: "mm", bore: "mm", offset: "mm" }, seen: "downstream", bores });
}

/** One bore a method, in one call. */
async function fit(circle: Circle, methods: readonly string[]): Promise<Answered[]> {
  const answer = await send(circle, methods);
  expect(answer.status, answer.text).toBe(201);
  return answer.body.result.bores as Answered[];
}

describeCases<Circle, object>(
  "POST /v1/bore-fits by minimum_circumscribed",
  ["circle-circumscribed"],
  async (reference) => {
    const [bore] = await fit(reference.input, ["minimum_circumscribed"]);
    const got = { center: [bore!.centre.h, bore!.centre.v], radius: bore!.diameter / 2 };
    expect(mismatches(reference, got)).toEqual([]);
    expect(bore!.contacts!.length).toBeGreaterThanOrEqual(2);
  },
);

describeCases<Circle, object>(
  "POST /v1/bore-fits by the three limiting criteria",
  ["circle-extremal"],
  async (reference) => {
    const bores = await fit(reference.input, [
      "minimum_zone",
      "minimum_circumscribed",
      "maximum_inscribed",
      "least_squares",
    ]);
    const got = figuresOfCriteria((method) => {
      const { centre, diameter, roundness } = bores.find((bore) => bore.method === method)!;
      return { ...centre, diameter, roundness };
    });
    expect(mismatches(reference, got)).toEqual([]);
  },
);

describeCases<Circle, object>("POST /v1/bore-fits by ellipse", ["ellipse-geometric"], async (reference) => {
  // Its readings lie within 147° of the ellipse: the fit itself is held to the case directly.
  const answer = await send(reference.input, ["ellipse"]);
  expect(answer.status, answer.text).toBe(422);
  expect(answer.body.errors).toMatchObject([{ pointer: "/bores/0/points", code: "coverage_insufficient" }]);
});
