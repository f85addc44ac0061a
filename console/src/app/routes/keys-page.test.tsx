import { fireEvent, screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { createdKeySchema, keyPage, keySchema, type Key } from "../../../../shared/schemas/keys.ts";
import { answer, heldAnswer, noNetwork, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import {
  everyRole,
  rolesThatIssueKeys,
  sampleCreatedKey,
  sampleId,
  sampleKey,
} from "../../testing/samples.ts";

const pageOf = (data: Key[], nextCursor: string | null = null) =>
  answer(keyPage, { data, nextCursor, limit: 50 });
const secret = sampleCreatedKey().secret;

describe("the keys page", () => {
  it("shows the shape of the list while it is read", async () => {
    const held = heldAnswer(pageOf([]));
    serviceFor("admin").on("GET /v1/keys", held.answerer);
    renderConsole("/keys");
    expect(await screen.findByText("Reading the keys")).toBeTruthy();
    held.release();
    expect(await screen.findByText("No keys yet")).toBeTruthy();
  });

  it("says what to do when there are none", async () => {
    serviceFor("admin").on("GET /v1/keys", pageOf([]));
    renderConsole("/keys");
    const empty = (await screen.findByText("No keys yet")).parentElement;
    expect(empty?.textContent).toContain("Issue a key, then send calls with it as Authorization: Bearer.");
  });

  it("says what failed, with the request's id, and reads again when asked", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", refusal("internal_error"));
    const { user } = renderConsole("/keys");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The keys could not be read.");
    expect(within(alert).getByText("request req-1")).toBeTruthy();
    service.on("GET /v1/keys", pageOf([sampleKey()]));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("Outage planning")).toBeTruthy();
  });

  it("says so when the service cannot be reached", async () => {
    serviceFor("admin").on("GET /v1/keys", noNetwork);
    renderConsole("/keys");
    expect((await screen.findByRole("alert")).textContent).toContain("The service cannot be reached.");
  });

  it("lists name, prefix, scopes, status, last use and expiry, and offers to revoke what is good", async () => {
    const revoked = sampleKey({
      id: sampleId(101),
      name: "Old",
      status: "revoked",
      revokedAt: "2026-12-02T06:00:00.000Z",
    });
    serviceFor("admin").on("GET /v1/keys", pageOf([sampleKey(), revoked]));
    renderConsole("/keys");
    const rows = await screen.findAllByRole("row");
    expect(rows).toHaveLength(3);
    const [, active, old] = rows;
    for (const words of [
      "Outage planning",
      "bw_live_outage…",
      "calculations:write",
      "active",
      "not yet",
      "never",
    ]) {
      expect(active?.textContent).toContain(words);
    }
    expect(old?.textContent).toContain("revoked");
    expect(screen.getAllByRole("button", { name: /^Revoke key/ })).toHaveLength(1);
    expect(screen.getByRole("button", { name: "Copy prefix of Outage planning" })).toBeTruthy();
  });

  it("leads to older keys and back to the newest by addresses", async () => {
    const service = serviceFor("admin").on("GET /v1/keys", ({ query }) =>
      query.get("cursor") === "next"
        ? pageOf([sampleKey({ name: "Oldest" })])
        : pageOf([sampleKey({ name: "Newest" })], "next"),
    );
    const { user, router } = renderConsole("/keys");
    await user.click(await screen.findByRole("link", { name: "Older" }));
    expect(await screen.findByText("Oldest")).toBeTruthy();
    expect(router.state.location.search).toBe("?cursor=next");
    expect(screen.queryByRole("link", { name: "Older" })).toBeNull();
    await user.click(screen.getByRole("link", { name: "Newest" }));
    expect(await screen.findByText("Newest", { selector: "td *" })).toBeTruthy();
    expect(service.callsTo("GET /v1/keys").length).toBeGreaterThan(1);
  });

  it.each(everyRole)("offers the %s what that role may do", async (role) => {
    const service = serviceFor(role);
    if (role !== "viewer") service.on("GET /v1/keys", pageOf([sampleKey()]));
    renderConsole("/keys");
    await screen.findByText(role === "viewer" ? "Your role reads records" : "Outage planning");
    const mayIssue = rolesThatIssueKeys.includes(role);
    expect(screen.queryByRole("button", { name: "Issue key" }) !== null).toBe(mayIssue);
    expect(screen.queryByRole("button", { name: /^Revoke key/ }) !== null).toBe(mayIssue);
  });
});

describe("issuing a key", () => {
  const openForm = async () => {
    const service = serviceFor("admin").on("GET /v1/keys", pageOf([]));
    const page = renderConsole("/keys");
    await page.user.click(await screen.findByRole("button", { name: "Issue key" }));
    const dialog = await screen.findByRole("dialog", { name: "Issue key" });
    const send = () => page.user.click(within(dialog).getByRole("button", { name: "Issue key" }));
    return { ...page, service, dialog, send };
  };

  it("asks for a name and a scope, and sends nothing without them", async () => {
    const { user, dialog, service, send } = await openForm();
    for (const box of within(dialog).getAllByRole("checkbox", { checked: true })) await user.click(box);
    await send();
    expect(within(dialog).getByText("A name of 1 to 120 characters is needed.")).toBeTruthy();
    expect(within(dialog).getByText("Choose at least one.")).toBeTruthy();
    expect(service.callsTo("POST /v1/keys")).toEqual([]);
  });

  it("sends name, scopes and expiry, then shows the secret this once", async () => {
    const { user, dialog, service, send } = await openForm();
    service.on("POST /v1/keys", answer(createdKeySchema, sampleCreatedKey(), 201));
    await user.type(within(dialog).getByLabelText("Name"), "Outage planning");
    await user.click(within(dialog).getByRole("checkbox", { name: /Read usage/ }));
    await user.selectOptions(within(dialog).getByLabelText("Expires after"), "30 days");
    const before = Date.now();
    await send();
    const issued = await screen.findByRole("dialog", { name: "Key issued" });
    expect(within(issued).getByText(secret)).toBeTruthy();

    const order = JSON.parse(service.callsTo("POST /v1/keys")[0]?.bodyText ?? "") as Record<string, unknown>;
    expect(order["name"]).toBe("Outage planning");
    expect(order["scopes"]).toEqual(["calculations:write", "calculations:read", "usage:read"]);
    const endsInDays = (Date.parse(String(order["expiresAt"])) - before) / 86_400_000;
    expect(Math.abs(endsInDays - 30)).toBeLessThan(0.001);

    await user.click(within(issued).getByRole("button", { name: /Copy key/ }));
    expect(await within(issued).findByText("copied")).toBeTruthy();
    expect(await navigator.clipboard.readText()).toBe(secret);

    // Escape must not lose what cannot be shown again.
    fireEvent(issued, new Event("cancel", { cancelable: true }));
    expect(screen.getByText(secret)).toBeTruthy();

    service.on("GET /v1/keys", pageOf([sampleKey()]));
    await user.click(within(issued).getByRole("button", { name: "I have copied it" }));
    expect(screen.queryByText(secret)).toBeNull();
    await user.click(screen.getByRole("button", { name: "Issue key" }));
    expect(document.body.innerHTML).not.toContain(secret);
  });

  it("repeats a lost answer's order under the same Idempotency-Key", async () => {
    const { user, dialog, service, send } = await openForm();
    service.on("POST /v1/keys", noNetwork);
    await user.type(within(dialog).getByLabelText("Name"), "Outage planning");
    await send();
    expect((await within(dialog).findByRole("alert")).textContent).toContain("The key was not issued.");
    service.on("POST /v1/keys", answer(createdKeySchema, sampleCreatedKey(), 201));
    await send();
    await screen.findByRole("dialog", { name: "Key issued" });
    const [first, second] = service
      .callsTo("POST /v1/keys")
      .map(({ headers }) => headers.get("idempotency-key"));
    expect(first).toMatch(/^[0-9a-f]{32}$/);
    expect(second).toBe(first);
  });

  it("shows the service's fault at its field", async () => {
    const { user, dialog, service, send } = await openForm();
    const detail = "expiresAt lies in the past.";
    service.on(
      "POST /v1/keys",
      refusal("out_of_range", { errors: [{ pointer: "/expiresAt", code: "out_of_range", detail }] }),
    );
    await user.type(within(dialog).getByLabelText("Name"), "Outage planning");
    await send();
    await waitFor(() => {
      const field = within(dialog).getByLabelText("Expires after");
      expect(document.getElementById(field.getAttribute("aria-describedby") ?? "")?.textContent).toBe(detail);
    });
  });

  it("is left with Escape", async () => {
    const { dialog } = await openForm();
    fireEvent(dialog, new Event("cancel", { cancelable: true }));
    expect(screen.queryByRole("dialog")).toBeNull();
  });
});

describe("revoking a key", () => {
  const ask = async () => {
    const service = serviceFor("admin").on("GET /v1/keys", pageOf([sampleKey()]));
    const page = renderConsole("/keys");
    const opener = await screen.findByRole("button", { name: "Revoke key Outage planning" });
    await page.user.click(opener);
    const dialog = screen.getByRole("dialog", { name: "Revoke key “Outage planning”?" });
    return { ...page, service, opener, dialog };
  };

  it("asks first, with the safe answer in focus, and does nothing when the key is kept", async () => {
    const { user, dialog, service, opener } = await ask();
    const keep = within(dialog).getByRole("button", { name: "Keep key" });
    expect(document.activeElement).toBe(keep);
    await user.click(keep);
    expect(screen.queryByRole("dialog")).toBeNull();
    expect(document.activeElement).toBe(opener);
    expect(service.calls.filter(({ path }) => path.endsWith("/revoke"))).toEqual([]);
  });

  it("revokes when told to, and shows it in the list", async () => {
    const { user, dialog, service } = await ask();
    const revoked = sampleKey({ status: "revoked", revokedAt: "2026-12-02T06:00:00.000Z" });
    service
      .on(`POST /v1/keys/${sampleId(100)}/revoke`, answer(keySchema, revoked))
      .on("GET /v1/keys", pageOf([revoked]));
    await user.click(within(dialog).getByRole("button", { name: "Revoke key" }));
    await waitFor(() => expect(screen.queryByRole("dialog")).toBeNull());
    expect(await screen.findByText("revoked")).toBeTruthy();
    expect(screen.queryByRole("button", { name: /^Revoke key/ })).toBeNull();
  });

  it("says that the key is not revoked when the service fails, and stays", async () => {
    const { user, dialog, service } = await ask();
    service.on(`POST /v1/keys/${sampleId(100)}/revoke`, refusal("internal_error"));
    await user.click(within(dialog).getByRole("button", { name: "Revoke key" }));
    expect((await within(dialog).findByRole("alert")).textContent).toContain("The key is not revoked.");
  });
});
