import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { scopes } from "../../shared/access.ts";
import { operations } from "../../server/routes/index.ts";
import type { Operation } from "../../server/http/operation.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";
import { localWebhooks } from "../support/webhook-driver.ts";
import { sendMail } from "../../server/mail/send-mail.ts";
import { JobDriver } from "../support/fellgate-job.ts";

/** Every operation that takes an id, called with another organisation's credential on an id that exists. */
describe("another organisation", () => {
  let app: TestApp;
  let owner: TestOrganisation;
  let stranger: TestOrganisation;
  let strangerKey: string;
  const ids: Record<string, string> = {};

  beforeAll(async () => {
    app = await openTestApp(localWebhooks);
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
    const job = new JobDriver(app, owner);
    await job.start();
    ids.jobs = job.id;
    ids.machines = job.machineId;
    ids.survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    ids.entry = ids.survey;
    const hook = await app
      .call()
      .post("/v1/webhooks")
      .set("Authorization", `Bearer ${owner.tokens.developer}`)
      .send({ name: "Planner", url: "http://127.0.0.1:9/", events: ["calculation.stored"] });
    ids.webhooks = (hook.body as { id: string }).id;
    await app
      .call()
      .post("/v1/bore-fits")
      .set("Authorization", `Bearer ${owner.tokens.engineer}`)
      .send(smallBoreFit);
    ids.delivery = (await app.deps.database.models.webhookDeliveries.findOne())?.id ?? "";
    const mail = { to: ["owner@example.com"], subject: "Report", text: "As left." };
    await sendMail(app.deps, { organisationId: owner.id, ...mail });
    ids.outbox = (await app.deps.mailer.outbox.ids(owner.id))[0] ?? "";
  });
  afterAll(() => app.close());

  const withId = operations.filter(({ path }) => path.includes("{id}"));
  const queries: Partial<Record<string, string>> = {
    compareMachineRevisions: "?from=1&to=1",
    addAttachment: "?name=a.png",
    previewReadingFile: "?name=a.csv",
    addReadingFile: "?name=a.csv",
  };
  /** What each operation takes: its own first example. */
  const bodyOf = ({ requestExamples }: Operation) => Object.values(requestExamples?.() ?? {})[0]?.value;
  const send = (operation: Operation, id: string, credential: string) => {
    const agent = app.call();
    const path = operation.path
      .replace("{id}", id)
      .replace("{revision}", "1")
      .replace("{format}", "json")
      .replace("{figure}", "end-view")
      .replaceAll(/\{(\w+)\}/g, (_, name: string) => ids[name] ?? id);
    const query = queries[operation.operationId] ?? "";
    const sent = agent[operation.method](`${path}${query}`).set("Authorization", `Bearer ${credential}`);
    const conditional = operation.conditional ? sent.set("If-Match", '"1"') : sent;
    if (operation.file) {
      return conditional.set("Content-Type", operation.file.mediaTypes[0] ?? "").send(Buffer.from("\x89PNG"));
    }
    const body = bodyOf(operation);
    if (operation.lines) {
      return conditional.set("Content-Type", "application/x-ndjson").send(`${JSON.stringify(body)}\n`);
    }
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
    expect(withId.length).toBeGreaterThanOrEqual(30);
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
    const lists = [
      "/v1/calculations",
      "/v1/keys",
      "/v1/members",
      "/v1/machines",
      "/v1/jobs",
      "/v1/webhooks",
      "/v1/outbox",
      "/v1/usage?groupBy=key",
    ];
    for (const path of lists) {
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
