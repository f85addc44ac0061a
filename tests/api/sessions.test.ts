import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { createMembers } from "../../server/services/first-admin.ts";
import { openTestApp, type TestApp } from "../support/app.ts";

const password = "a long and private sentence";

describe("sessions", () => {
  let app: TestApp;
  let memberId: string;
  let organisationId: string;
  beforeAll(async () => {
    app = await openTestApp();
    const made = await createMembers(app.deps, { name: "Works" }, [
      { email: "Ines@Example.com", name: "Ines", role: "engineer", password },
    ]);
    organisationId = made.organisationId;
    memberId = made.members[0]?.id ?? "";
  });
  afterAll(() => app.close());

  const signIn = (body: object = { email: "ines@example.com", password }) =>
    app.call().post("/v1/sessions").send(body);
  const cookieOf = (headers: Record<string, unknown>): string =>
    String((headers["set-cookie"] as string[] | undefined)?.[0] ?? "").split(";")[0] ?? "";
  const refresh = (cookie: string) => app.call().post("/v1/sessions/refresh").set("Cookie", cookie);
  const me = (token: string) => app.call().get("/v1/me").set("Authorization", `Bearer ${token}`);

  it("signs in with e-mail in any case and answers token, end and member", async () => {
    const { status, body, headers } = await signIn({ email: "INES@example.com", password });
    expect(status).toBe(201);
    expect(body).toMatchObject({ member: { id: memberId, role: "engineer" } });
    expect(Date.parse((body as { expiresAt: string }).expiresAt)).toBeGreaterThan(Date.now());
    expect(String(headers["set-cookie"])).toMatch(/^borewright-refresh=.+HttpOnly; SameSite=Strict/);
    expect(headers["cache-control"]).toBe("no-store");
    expect((await me((body as { accessToken: string }).accessToken)).status).toBe(200);
  });

  it("answers alike for a wrong password and for an unknown member", async () => {
    const wrong = await signIn({ email: "ines@example.com", password: "another sentence" });
    const unknown = await signIn({ email: "nobody@example.com", password });
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    const bare = ({ requestId: _, ...rest }: Record<string, unknown>) => rest;
    expect(bare(wrong.body as Record<string, unknown>)).toEqual(
      bare(unknown.body as Record<string, unknown>),
    );
  });

  it("writes sign-ins and refusals to the audit", async () => {
    await signIn({ email: "ines@example.com", password: "another sentence" });
    const actions = await app.deps.database.models.auditEvents.findAll({ where: { organisationId } });
    expect(actions.map((event) => event.action)).toEqual(
      expect.arrayContaining(["session.started", "session.refused"]),
    );
  });

  it("rotates the refresh secret, and lets a second tab use the one before within the grace", async () => {
    const first = cookieOf((await signIn()).headers);
    const rotated = await refresh(first);
    expect(rotated.status).toBe(200);
    const second = cookieOf(rotated.headers);
    expect(second).not.toBe(first);
    const otherTab = await refresh(first);
    expect(otherTab.status).toBe(200);
    expect(otherTab.headers["set-cookie"]).toBeUndefined();
    expect((await refresh(second)).status).toBe(200);
  });

  it("ends the session for everyone when a refresh secret comes back after the grace", async () => {
    const first = cookieOf((await signIn()).headers);
    const second = cookieOf((await refresh(first)).headers);
    app.advance(31_000);
    expect((await refresh(first)).body).toMatchObject({ code: "session_expired" });
    expect((await refresh(second)).status).toBe(401);
    const events = await app.deps.database.models.auditEvents.findAll({
      where: { action: "session.reuse_detected" },
    });
    expect(events).toHaveLength(1);
  });

  it("refuses to renew for a page of another origin", async () => {
    const cookie = cookieOf((await signIn()).headers);
    const { status, body } = await refresh(cookie).set("Origin", "https://elsewhere.example");
    expect(status).toBe(403);
    expect(body).toMatchObject({ code: "origin_refused" });
  });

  it("refuses an access token as soon as its session has ended", async () => {
    const { body } = await signIn();
    const token = (body as { accessToken: string }).accessToken;
    expect((await me(token)).status).toBe(200);
    const out = await app.call().delete("/v1/sessions/current").set("Authorization", `Bearer ${token}`);
    expect(out.status).toBe(204);
    expect((await me(token)).body).toMatchObject({ code: "session_expired" });
  });

  it("refuses an access token past its minutes", async () => {
    const { body } = await signIn();
    app.advance(11 * 60_000);
    expect((await me((body as { accessToken: string }).accessToken)).status).toBe(401);
  });

  it("shows a session's secret once under one Idempotency-Key", async () => {
    const once = () => signIn().set("Idempotency-Key", "sign-in-1");
    expect((await once()).status).toBe(201);
    const again = await once();
    expect(again.status).toBe(409);
    expect(again.body).toMatchObject({ code: "secret_already_shown", id: expect.any(String) as string });
  });

  it("names the cookie __Host- and Secure where the public address is https", async () => {
    const secure = await openTestApp({ PUBLIC_URL: "https://bores.example.com" });
    try {
      await createMembers(secure.deps, { name: "Works" }, [
        { email: "a@example.com", name: "A", role: "admin", password },
      ]);
      const { headers } = await secure.call().post("/v1/sessions").send({ email: "a@example.com", password });
      expect(String(headers["set-cookie"])).toMatch(
        /^__Host-borewright-refresh=[^;]+; Max-Age=\d+; Path=\/; HttpOnly; Secure; SameSite=Strict$/,
      );
      expect(headers["strict-transport-security"]).toBeDefined();
    } finally {
      await secure.close();
    }
  });
});

describe("the limit of sign-ins", () => {
  it("refuses who guesses, and lets everyone behind the same network renew their sessions", async () => {
    const app = await openTestApp({ SIGN_IN_LIMIT_PER_MINUTE: "2" });
    const guess = () =>
      app.call().post("/v1/sessions").send({ email: "ines@example.com", password: "a guess" });
    expect((await guess()).status).toBe(401);
    expect((await guess()).status).toBe(401);
    expect((await guess()).body).toMatchObject({ status: 429, code: "rate_limited", limit: 2 });
    // Each page that is opened asks for the session of its cookie; a secret of 43 characters cannot be guessed.
    expect((await app.call().post("/v1/sessions/refresh")).body).toMatchObject({ code: "session_expired" });
    await app.close();
  });
});
