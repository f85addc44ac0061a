import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { scopes } from "../../shared/access.ts";
import { operations } from "../../server/routes/index.ts";
import type { Operation } from "../../server/http/operation.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";

/** Every operation that takes an id, called with another organisation's credential on an id that exists. */
describe("another organisation", () => {
  let app: TestApp;
  let owner: TestOrganisation;
  let stranger: TestOrganisation;
  let strangerKey: string;
  const ids: Record<string, string> = {};

  beforeAll(async () => {
    app = await openTestApp();
    owner = await makeOrganisation(app.deps);
    stranger = await makeOrganisation(app.deps);
    strangerKey = (await stranger.key(...scopes)).secret;
    const fit = await app
      .call()
      .post("/v1/bore-fits")
      .set("Authorization", `Bearer ${owner.tokens.engineer}`)
      .send(smallBoreFit);
    ids.calculations = (fit.body as { id: string }).id;
    ids.keys = (await owner.key("calculations:read")).id;
    ids.members = owner.members.viewer.id;
  });
  afterAll(() => app.close());

  const withId = operations.filter(({ path }) => path.includes("{id}"));
  const bodies: Record<string, object> = { updateMember: { name: "Mine now" } };
  const send = (operation: Operation, id: string, credential: string) => {
    const agent = app.call();
    const sent = agent[operation.method](operation.path.replace("{id}", id)).set(
      "Authorization",
      `Bearer ${credential}`,
    );
    const conditional = operation.conditional ? sent.set("If-Match", '"1"') : sent;
    const body = bodies[operation.operationId];
    return body ? conditional.send(body) : conditional;
  };
  const bare = (body: unknown) => {
    const { requestId: _, instance: __, ...rest } = body as Record<string, unknown>;
    return rest;
  };
  const counts = async () =>
    Promise.all(
      Object.values(app.deps.database.models).map((model) => (model as { count(): Promise<number> }).count()),
    );

  it("is tried on every operation that takes an id", () => {
    expect(
      withId
        .map(({ path }) => path.split("/")[2])
        .every((resource) => resource !== undefined && resource in ids),
    ).toBe(true);
    expect(withId.length).toBeGreaterThanOrEqual(7);
  });

  it.each(withId.map((operation) => [operation.operationId, operation] as const))(
    "gets from %s what an id that never was would get, and changes nothing",
    async (_id, operation) => {
      const id = ids[operation.path.split("/")[2] ?? ""] ?? "";
      const before = await counts();
      for (const credential of [strangerKey, stranger.tokens.admin]) {
        const theirs = await send(operation, id, credential);
        const nobodys = await send(operation, app.deps.newId(), credential);
        expect(theirs.status).toBe(404);
        expect(bare(theirs.body)).toEqual(bare(nobodys.body));
      }
      expect(await counts()).toEqual(before);
    },
  );

  it("sees nothing of it in any list or count", async () => {
    for (const path of ["/v1/calculations", "/v1/keys", "/v1/members", "/v1/usage?groupBy=key"]) {
      const { status, text } = await app.call().get(path).set("Authorization", `Bearer ${strangerKey}`);
      expect(status).toBe(200);
      for (const id of Object.values(ids)) expect(text).not.toContain(id);
    }
  });

  it("cannot reach records through a filter on its key", async () => {
    const { body } = await app
      .call()
      .get(`/v1/calculations?keyId=${ids.keys}`)
      .set("Authorization", `Bearer ${strangerKey}`);
    expect((body as { data: unknown[] }).data).toEqual([]);
  });
});
