import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { keyPage } from "../../../../shared/schemas/keys.ts";
import { sessionSchema } from "../../../../shared/schemas/sessions.ts";
import { callAsMember } from "../../lib/call-api.ts";
import { readDraft, writeDraft } from "../../lib/drafts.ts";
import { readSession, renewSession } from "../../lib/session-store.ts";
import { answer, refusal, type FakeService } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { sampleId, sampleKey, sampleSession } from "../../testing/samples.ts";

const oneKey = answer(keyPage, { data: [sampleKey()], nextCursor: null, limit: 50 });

/** Takes the token `good` and refuses every other. */
const keysWith =
  (good: string): Parameters<FakeService["on"]>[1] =>
  (call) =>
    call.headers.get("authorization") === `Bearer ${good}` ? oneKey : refusal("credential_invalid");

describe("a session", () => {
  it("is opened by the cookie of an earlier visit without asking anything", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", oneKey);
    renderConsole("/keys");
    expect(await screen.findByText("Outage planning")).toBeTruthy();
    expect(service.callsTo("POST /v1/sessions/refresh")).toHaveLength(1);
  });

  it("is renewed when the service no longer takes the token, and the call is made again", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", keysWith("second"));
    const tokens = ["first", "second"];
    service.on("POST /v1/sessions/refresh", () =>
      answer(sessionSchema, sampleSession("admin", { accessToken: tokens.shift() ?? "none" })),
    );
    renderConsole("/keys");
    expect(await screen.findByText("Outage planning")).toBeTruthy();
    const sent = service.callsTo("GET /v1/keys").map(({ headers }) => headers.get("authorization"));
    expect(sent).toEqual(["Bearer first", "Bearer second"]);
  });

  it("is renewed before a call when the token is about to end", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", keysWith("fresh"));
    const endsInMs = { stale: 5_000, fresh: 600_000 };
    const tokens: (keyof typeof endsInMs)[] = ["stale", "fresh"];
    service.on("POST /v1/sessions/refresh", () => {
      const accessToken = tokens.shift() ?? "fresh";
      const expiresAt = new Date(Date.now() + endsInMs[accessToken]).toISOString();
      return answer(sessionSchema, sampleSession("admin", { accessToken, expiresAt }));
    });
    await renewSession();
    await callAsMember({ method: "GET", path: "/v1/keys" });
    const sent = service.callsTo("GET /v1/keys").map(({ headers }) => headers.get("authorization"));
    expect(sent).toEqual(["Bearer fresh"]);
  });

  it("is asked for once by callers at the same moment", async () => {
    const service = serviceFor("admin");
    expect(await Promise.all([renewSession(), renewSession(), renewSession()])).toEqual([true, true, true]);
    expect(service.callsTo("POST /v1/sessions/refresh")).toHaveLength(1);
  });

  it("that ended asks for the password over the page, which stays, and goes on where it was", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", oneKey);
    const { user } = renderConsole("/keys");
    await user.click(await screen.findByRole("button", { name: "Issue key" }));
    await user.type(screen.getByLabelText("Name"), "Half written");
    service
      .on("POST /v1/sessions/refresh", refusal("session_expired"))
      .on("POST /v1/keys", refusal("credential_invalid"))
      .on("POST /v1/sessions", answer(sessionSchema, sampleSession("admin", { accessToken: "new" }), 201));
    await user.click(within(screen.getByRole("dialog")).getByRole("button", { name: "Issue key" }));
    const dialog = await screen.findByRole("dialog", { name: "Your session has ended" });
    expect(within(dialog).getByLabelText<HTMLInputElement>("E-mail").value).toBe("admin@example.com");
    expect(screen.getByLabelText<HTMLInputElement>("Name").value).toBe("Half written");
    await user.type(within(dialog).getByLabelText("Password"), "a long sentence");
    await user.click(within(dialog).getByRole("button", { name: "Sign in" }));
    await waitFor(() => expect(screen.queryByRole("dialog", { name: "Your session has ended" })).toBeNull());
    expect(screen.getByLabelText<HTMLInputElement>("Name").value).toBe("Half written");
  });

  it("ends at the service first, forgets drafts and leads to the sign-in", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", oneKey);
    const { user, router } = renderConsole("/keys");
    await screen.findByText("Outage planning");
    writeDraft("bore-fits.a", "{}");
    service.on("DELETE /v1/sessions/current", { status: 204, body: null });
    await user.click(screen.getByRole("button", { name: "Sign out" }));
    expect(await screen.findByRole("heading", { name: "Sign in" })).toBeTruthy();
    expect(router.state.location.pathname).toBe("/sign-in");
    expect(readDraft("bore-fits.a")).toBeNull();
  });

  it("stays open, and says so, when the service cannot end it", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", oneKey);
    const { user } = renderConsole("/keys");
    await screen.findByText("Outage planning");
    service.on("DELETE /v1/sessions/current", refusal("internal_error"));
    await user.click(screen.getByRole("button", { name: "Sign out" }));
    expect((await screen.findByRole("alert")).textContent).toContain("You are still signed in.");
    expect(readSession().status).toBe("open");
  });
});

describe("the tabs of one browser", () => {
  const otherTab = () => new BroadcastChannel("borewright.session");

  it("close together", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", oneKey);
    renderConsole("/keys");
    await screen.findByText("Outage planning");
    service.on("POST /v1/sessions/refresh", refusal("session_expired"));
    const other = otherTab();
    other.postMessage({ type: "closed" });
    expect(await screen.findByRole("heading", { name: "Sign in" })).toBeTruthy();
    expect(screen.queryByText("Outage planning")).toBeNull();
    other.close();
  });

  it("follow to another member, and show nothing that was read for the one before", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", oneKey);
    renderConsole("/keys");
    await screen.findByText("Outage planning");
    writeDraft("bore-fits.a", "{}");
    const member = { ...sampleSession("developer").member, id: sampleId(11), name: "Tomas Reed" };
    service
      .on("POST /v1/sessions/refresh", answer(sessionSchema, sampleSession("developer", { member })))
      .on(
        "GET /v1/keys",
        answer(keyPage, { data: [sampleKey({ name: "Other" })], nextCursor: null, limit: 50 }),
      );
    const other = otherTab();
    other.postMessage({ type: "opened", memberId: member.id });
    expect(await screen.findByText("Tomas Reed, developer")).toBeTruthy();
    expect(await screen.findByText("Other")).toBeTruthy();
    expect(screen.queryByText("Outage planning")).toBeNull();
    expect(readDraft("bore-fits.a")).toBeNull();
    other.close();
  });
});
