import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { CreatedKey, Key } from "../../shared/schemas/keys.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";

describe("API keys", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const as = (token: string) => ({ Authorization: `Bearer ${token}` });
  const create = (body: object, token = works.tokens.admin) =>
    app.call().post("/v1/keys").set(as(token)).send(body);
  const listWith = (secret: string) => app.call().get("/v1/calculations").set(as(secret));
  const order = { name: "Planner", scopes: ["calculations:write", "calculations:read"] };

  it("shows the secret in the answer that makes the key, and nowhere else", async () => {
    const { status, body } = await create(order);
    expect(status).toBe(201);
    const made = body as CreatedKey;
    expect(made.secret).toMatch(/^bw_live_[0-9A-Za-z]{12}_[0-9A-Za-z]{38}$/);
    expect(made.secret.startsWith(`${made.prefix}_`)).toBe(true);
    const listed = await app.call().get("/v1/keys").set(as(works.tokens.admin));
    const read = await app.call().get(`/v1/keys/${made.id}`).set(as(works.tokens.admin));
    const hidden = made.secret.slice(made.prefix.length + 1, -6);
    expect(JSON.stringify([listed.body, read.body])).not.toContain(hidden);
    const rows = await app.deps.database.sequelize.query(
      "SELECT k.*, a.details FROM api_keys k, audit_events a",
      { type: QueryTypes.SELECT },
    );
    expect(JSON.stringify(rows)).not.toContain(hidden);
  });

  it("lets a key do what its scopes say and no more", async () => {
    const { secret } = await works.key("calculations:read");
    expect((await listWith(secret)).status).toBe(200);
    const refused = await app.call().post("/v1/bore-fits").set(as(secret)).send(smallBoreFit);
    expect(refused.status).toBe(403);
    expect(refused.body).toMatchObject({ code: "scope_missing", scope: "calculations:write" });
  });

  it("never makes a key wider than its maker", async () => {
    const wider = await create({ name: "Wide", scopes: ["members:write"] }, works.tokens.developer);
    expect(wider.body).toMatchObject({ status: 403, code: "scope_missing", scope: "members:write" });
    const narrow = await works.key("keys:write");
    expect((await create(order, narrow.secret)).status).toBe(403);
  });

  it("ends after 90 days unless told otherwise, and refuses an end in the past", async () => {
    const byDefault = (await create(order)).body as Key;
    const days = (Date.parse(byDefault.expiresAt ?? "") - Date.now()) / 86_400_000;
    expect(Math.abs(days - 90)).toBeLessThan(0.01); // days
    expect(((await create({ ...order, expiresAt: null })).body as Key).expiresAt).toBeNull();
    const past = await create({ ...order, expiresAt: "2020-01-01T00:00:00Z" });
    expect(past.body).toMatchObject({
      status: 422,
      errors: [{ pointer: "/expiresAt", code: "out_of_range" }],
    });
  });

  it("is refused within a second of being revoked, for good, and its row says so", async () => {
    const { id, secret } = await works.key("calculations:read");
    expect((await listWith(secret)).status).toBe(200);
    const revoked = await app.call().post(`/v1/keys/${id}/revoke`).set(as(works.tokens.admin));
    expect(revoked.body).toMatchObject({ status: "revoked", version: 2 });
    expect((await listWith(secret)).body).toMatchObject({ status: 401, code: "key_revoked" });
    const again = await app.call().post(`/v1/keys/${id}/revoke`).set(as(works.tokens.admin));
    expect(again.body).toEqual(revoked.body);
    const audited = await app.deps.database.models.auditEvents.findAll({ where: { subject: id } });
    expect(audited.map((event) => event.action)).toEqual(["key.created", "key.revoked"]);
  });

  it("is refused everywhere within a second when another process revoked it", async () => {
    const { id, secret } = await works.key("calculations:read");
    expect((await listWith(secret)).status).toBe(200);
    await app.deps.database.models.apiKeys.update({ revokedAt: new Date() }, { where: { id } });
    await new Promise((resolve) => setTimeout(resolve, 600));
    expect((await listWith(secret)).body).toMatchObject({ code: "key_revoked" });
  });

  it("tells an expired key from a wrong one only to who holds its secret", async () => {
    const made = (await create({ ...order, expiresAt: new Date(Date.now() + 60_000).toISOString() }))
      .body as CreatedKey;
    const clock = await openTestAppSharing(made.secret);
    expect(clock).toBe("key_expired");
    const altered =
      made.secret.slice(0, -8) + (made.secret.at(-8) === "A" ? "B" : "A") + made.secret.slice(-7);
    const other = await works.key("calculations:read");
    const swapped = `${made.prefix}_${other.secret.split("_")[3] ?? ""}`;
    for (const wrong of [
      altered,
      swapped,
      made.secret.slice(0, -1),
      `${made.secret}0`,
      "bw_live_x",
      "not-a-token",
    ]) {
      const { status, body, headers } = await listWith(wrong);
      expect(status).toBe(401);
      expect(body).toMatchObject({ code: "credential_invalid" });
      expect(headers["www-authenticate"]).toContain("Bearer");
    }
  });

  async function openTestAppSharing(secret: string): Promise<string> {
    app.advance(61_000);
    const { body } = await listWith(secret);
    app.advance(-61_000);
    return (body as { code: string }).code;
  }

  it("is never taken from the address, nor twice from the headers", async () => {
    const { secret } = await works.key("calculations:read");
    const inAddress = await app.call().get(`/v1/calculations?api_key=${secret}`);
    expect(inAddress.body).toMatchObject({ status: 400, code: "credential_in_url" });
    expect(JSON.stringify(inAddress.body)).not.toContain(secret);
  });

  it("tells when it was last used, and using it leaves its version alone", async () => {
    const { id, secret } = await works.key("calculations:read");
    await listWith(secret);
    const { body, headers } = await app.call().get(`/v1/keys/${id}`).set(as(works.tokens.admin));
    expect((body as Key).lastUsedAt).not.toBeNull();
    expect(headers.etag).toBe('"1"');
  });

  it("shows a secret once under one Idempotency-Key, and refuses another body under it", async () => {
    const once = (body: object) => create(body).set("Idempotency-Key", '"key-7"');
    const first = await once(order);
    const again = await once(order);
    expect(again.status).toBe(409);
    expect(again.body).toMatchObject({ code: "secret_already_shown", id: (first.body as Key).id });
    expect((await once({ ...order, name: "Other" })).body).toMatchObject({
      status: 422,
      code: "idempotency_key_reused",
    });
  });

  it("is listed newest first, a page at a time, each key once", async () => {
    const own = await makeOrganisation(app.deps);
    for (let made = 0; made < 5; made += 1) await own.key("calculations:read");
    const seen: string[] = [];
    let cursor: string | null = "";
    while (cursor !== null) {
      const { body } = await app
        .call()
        .get(`/v1/keys?limit=2${cursor && `&cursor=${cursor}`}`)
        .set(as(own.tokens.admin));
      const page = body as { data: Key[]; nextCursor: string | null; limit: number };
      expect(page.limit).toBe(2);
      seen.push(...page.data.map((key) => key.id));
      cursor = page.nextCursor;
    }
    expect(seen).toHaveLength(5);
    expect(new Set(seen).size).toBe(5);
    expect([...seen].sort().reverse()).toEqual(seen);
  });
});
