import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { operationAccess, roles, scopes, type Access, type OperationId } from "../../shared/access.ts";
import { operations } from "../../server/routes/index.ts";
import type { Operation } from "../../server/http/operation.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";

/** Access is decided before a body is read, so an empty call tells: refused for want of rights, or for something else. */
describe("the access table", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());

  const call = (operation: Operation, token?: string) => {
    const path = operation.path
      .replace("{code}", "not_found")
      .replace("{revision}", "1")
      .replaceAll(/\{\w+\}/g, "0193a5e0-7c00-7000-8000-000000000001");
    const sent = app.call()[operation.method](path);
    return token === undefined ? sent : sent.set("Authorization", `Bearer ${token}`);
  };

  it("has one row for each operation, and no other", () => {
    expect(operations.map(({ operationId }) => operationId).sort()).toEqual(
      Object.keys(operationAccess).sort(),
    );
  });

  describe.each(
    operations.map((operation) => [operation.operationId, operation] as [OperationId, Operation]),
  )("%s", (id, operation) => {
    const access: Access = operationAccess[id];

    it("asks for a credential unless anyone may", async () => {
      const { status, body } = await call(operation);
      if (access.by === "anyone") expect((body as { code?: string }).code).not.toBe("credential_missing");
      else expect([status, (body as { code: string }).code]).toEqual([401, "credential_missing"]);
    });

    if (access.by !== "scope") return;

    it.each(roles)("lets the role %s through exactly when its row says so", async (role) => {
      // endSession and the like would end the member's own session: those are not ruled by scope.
      const { status } = await call(operation, works.tokens[role]);
      expect(status === 403).toBe(!access.roles.includes(role));
    });

    it("lets a key through with its scope alone", async () => {
      const { secret } = await works.key(access.scope);
      expect((await call(operation, secret)).status).not.toBe(403);
    });

    it("refuses a key with every other scope, naming the one it lacks", async () => {
      const { secret } = await works.key(...scopes.filter((scope) => scope !== access.scope));
      const { status, body } = await call(operation, secret);
      expect(status).toBe(403);
      expect(body).toMatchObject({ code: "scope_missing", scope: access.scope });
    });
  });
});
