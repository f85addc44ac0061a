import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { SelfTest } from "../../shared/schemas/engine.ts";
import { engineVersion } from "../../server/compute/version.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";

describe("GET /v1/engine/self-test", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  it("computes every published figure now, with source and tolerance, and all of them hold", async () => {
    const answer = await app
      .call()
      .get("/v1/engine/self-test")
      .set("Authorization", `Bearer ${works.tokens.viewer}`);
    expect(answer.status).toBe(200);
    const { figures, passed, failed, engineVersion: version } = answer.body as SelfTest;
    expect(version).toBe(engineVersion);
    expect(figures.length).toBe(passed + failed);
    expect(figures.length).toBeGreaterThan(150);
    expect(figures.filter((figure) => !figure.passed)).toEqual([]);
    expect(new Set(figures.map(({ area }) => area)).size).toBe(7);
  });

  it("tells how the last run ended, and what changed in the engine, to anyone", async () => {
    await app.call().get("/v1/engine/self-test").set("Authorization", `Bearer ${works.tokens.viewer}`);
    const { body } = await app.call().get("/v1/meta");
    expect(body.selfTest).toMatchObject({ engineVersion, failed: 0 });
    expect(body.selfTest.passed).toBeGreaterThan(50);
    expect(body.engineChangelog).toContain(engineVersion);
  });

  it("asks for a credential", async () => {
    expect((await app.call().get("/v1/engine/self-test")).status).toBe(401);
  });
});
