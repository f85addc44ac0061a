import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";

const password = "a long and private sentence";

describe("members", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const as = (token: string) => ({ Authorization: `Bearer ${token}` });
  const invite = async (email: string, host = "bores.test") => {
    const answer = await app
      .call()
      .post("/v1/members")
      .set(as(works.tokens.admin))
      .set("Host", host)
      .send({ email, name: "Nell", role: "engineer" });
    const { id, invitation } = answer.body as { id: string; invitation: { link: string } };
    return { answer, id, token: invitation.link.split("#token=")[1] ?? "" };
  };
  const accept = (token: string, chosen = password) =>
    app.call().post("/v1/invitations/accept").send({ token, password: chosen });
  const change = (id: string, body: object, tag?: string) => {
    const call = app.call().patch(`/v1/members/${id}`).set(as(works.tokens.admin));
    return (tag === undefined ? call : call.set("If-Match", tag)).send(body);
  };

  it("are invited by a link that is good once, and sign in with the password they chose", async () => {
    const { answer, token } = await invite("nell@example.com");
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({ status: "invited", role: "engineer" });
    expect((await app.call().post("/v1/sessions").send({ email: "nell@example.com", password })).status).toBe(
      401,
    );
    expect((await accept(token)).body).toMatchObject({ status: "active" });
    expect((await accept(token)).body).toMatchObject({ status: 422, code: "invitation_invalid" });
    expect((await app.call().post("/v1/sessions").send({ email: "nell@example.com", password })).status).toBe(
      201,
    );
  });

  it("cannot use a link after seven days, nor one that a newer link has replaced", async () => {
    const late = await invite("late@example.com");
    app.advance(8 * 86_400_000);
    const refused = await accept(late.token);
    app.advance(-8 * 86_400_000);
    expect(refused.body).toMatchObject({ code: "invitation_invalid" });
    const renewed = await app.call().post(`/v1/members/${late.id}/invitation`).set(as(works.tokens.admin));
    expect(renewed.status).toBe(201);
    expect((await accept(late.token)).status).toBe(422);
    const { invitation } = renewed.body as { invitation: { link: string } };
    expect((await accept(invitation.link.split("#token=")[1] ?? "")).status).toBe(200);
  });

  it("choose passwords that are long and not their own name", async () => {
    const { token } = await invite("weak@example.com");
    for (const weak of ["short", "aaaaaaaaaaaaaaaa", "weak@example.com"]) {
      expect((await accept(token, weak)).body).toMatchObject({ status: 422, code: "password_weak" });
    }
    expect((await accept(token)).status).toBe(200);
  });

  it("use a link once even when two calls race for it", async () => {
    const { token } = await invite("race@example.com");
    const statuses = (await Promise.all([accept(token), accept(token), accept(token)])).map(
      ({ status }) => status,
    );
    expect(statuses.filter((status) => status === 200)).toHaveLength(1);
  });

  it("keep their e-mail to themselves across organisations", async () => {
    await invite("taken@example.com");
    const again = await app
      .call()
      .post("/v1/members")
      .set(as(works.tokens.admin))
      .send({ email: "Taken@example.com", name: "N", role: "viewer" });
    expect(again.body).toMatchObject({ status: 409, code: "email_taken", errors: [{ pointer: "/email" }] });
  });

  it("change only under the version that was read", async () => {
    const { id } = works.members.viewer;
    const read = await app.call().get(`/v1/members/${id}`).set(as(works.tokens.admin));
    const tag = read.headers.etag as string;
    expect((await change(id, { name: "V" })).body).toMatchObject({
      status: 428,
      code: "precondition_required",
    });
    const parallel = await Promise.all([
      change(id, { name: "V1" }, tag),
      change(id, { name: "V2" }, `W/${tag}`),
    ]);
    expect(parallel.map(({ status }) => status).sort()).toEqual([200, 412]);
    const stale = await change(id, { name: "V3" }, tag);
    expect(stale.body).toMatchObject({ code: "version_stale" });
    expect(stale.headers.etag).not.toBe(tag);
  });

  it("have a new role, and lose a disabled sign-in, by their next request", async () => {
    const own = await makeOrganisation(app.deps);
    const { id } = own.members.developer;
    const list = () => app.call().get("/v1/keys").set(as(own.tokens.developer));
    expect((await list()).status).toBe(200);
    const patch = (body: object, tag: string) =>
      app.call().patch(`/v1/members/${id}`).set(as(own.tokens.admin)).set("If-Match", tag).send(body);
    expect((await patch({ role: "viewer" }, '"1"')).status).toBe(200);
    expect((await list()).status).toBe(403);
    expect((await patch({ active: false }, '"2"')).body).toMatchObject({ status: "disabled" });
    expect((await list()).body).toMatchObject({ status: 401, code: "session_expired" });
  });

  it("never lose the last active administrator", async () => {
    const own = await makeOrganisation(app.deps);
    const { id } = own.members.admin;
    for (const body of [{ role: "viewer" }, { active: false }]) {
      const refused = await app
        .call()
        .patch(`/v1/members/${id}`)
        .set(as(own.tokens.admin))
        .set("If-Match", '"1"')
        .send(body);
      expect(refused.body).toMatchObject({ status: 409, code: "last_admin" });
    }
  });

  it("are led by the configured address, whatever Host a request claims", async () => {
    const configured = await openTestApp({ PUBLIC_URL: "https://bores.example.com" });
    try {
      const own = await makeOrganisation(configured.deps);
      const { body } = await configured
        .call()
        .post("/v1/members")
        .set(as(own.tokens.admin))
        .set("Host", "evil.example")
        .send({ email: "x@example.com", name: "X", role: "viewer" });
      expect((body as { invitation: { link: string } }).invitation.link).toMatch(
        /^https:\/\/bores\.example\.com\/invitation#token=/,
      );
    } finally {
      await configured.close();
    }
  });
});
