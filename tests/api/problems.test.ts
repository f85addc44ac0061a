import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { problemCodes, problemKinds } from "../../shared/error-codes.ts";
import { openTestApp, type TestApp } from "../support/app.ts";

describe("GET /v1/problems", () => {
  let app: TestApp;
  beforeAll(async () => {
    app = await openTestApp();
  });
  afterAll(() => app.close());

  it("lists every code with what it means and what to do, to anybody", async () => {
    const { status, body } = await app.call().get("/v1/problems");
    expect(status).toBe(200);
    expect(body).toEqual({ data: problemCodes.map((code) => ({ code, ...problemKinds[code] })) });
  });

  it("says what one code means: a page to a browser, JSON to a program", async () => {
    const { title, fix } = problemKinds.too_few_points;
    const page = await app.call().get("/v1/problems/too_few_points").set("Accept", "text/html,*/*;q=0.8");
    expect([page.status, page.headers["content-type"]]).toEqual([200, "text/html; charset=utf-8"]);
    expect(page.text).toContain("<h1>too_few_points</h1>");
    expect(page.text).toContain(title);
    expect(page.text).toContain(fix);
    const data = await app.call().get("/v1/problems/too_few_points");
    expect(data.body).toEqual({ code: "too_few_points", ...problemKinds.too_few_points });
  });

  it("answers 404 for a code that is none", async () => {
    const { status, body } = await app.call().get("/v1/problems/nothing");
    expect([status, body]).toMatchObject([404, { code: "not_found" }]);
  });
});
