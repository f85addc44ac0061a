import { fireEvent, screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import {
  deliveryPage,
  deliverySchema,
  webhookPage,
  webhookSchema,
  webhookWithSecret,
  type Delivery,
  type Webhook,
} from "../../../../shared/schemas/webhooks.ts";
import { outboxPage } from "../../../../shared/schemas/outbox.ts";
import { answer, heldAnswer, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { everyRole, rolesThatIssueKeys, sampleId } from "../../testing/samples.ts";

const id = sampleId(300);
const secret = "whsec_THE-ONE-SECRET";
const webhook = (overrides: Partial<Webhook> = {}): Webhook => ({
  id,
  name: "Outage planner",
  url: "https://hooks.example.com/borewright",
  events: ["survey.computed", "job.signed"],
  active: true,
  stopReason: null,
  stoppedAt: null,
  failingSince: null,
  previousSecretUntil: null,
  createdAt: "2026-12-01T06:00:00.000Z",
  version: 3,
  ...overrides,
});
const delivery = (overrides: Partial<Delivery> = {}): Delivery => ({
  id: sampleId(301),
  webhook: id,
  type: "job.signed",
  state: "failed",
  payload: { type: "job.signed" },
  createdAt: "2026-12-01T06:00:00.000Z",
  nextAttemptAt: null,
  attempts: [
    {
      attempt: 1,
      at: "2026-12-01T06:00:01.000Z",
      status: 500,
      durationMs: 12.4,
      error: null,
      detail: null,
      reply: "out of order",
    },
  ],
  ...overrides,
});
const pageOf = (data: Webhook[]) => answer(webhookPage, { data, nextCursor: null, limit: 50 });
const deliveriesOf = (data: Delivery[]) => answer(deliveryPage, { data, nextCursor: null, limit: 50 });

describe("the webhooks page", () => {
  it("shows the shape of the list while it is read, and what to do when there are none", async () => {
    const held = heldAnswer(pageOf([]));
    serviceFor("developer").on("GET /v1/webhooks", held.answerer);
    renderConsole("/webhooks");
    expect(await screen.findByText("Reading the webhooks")).toBeTruthy();
    held.release();
    const empty = (await screen.findByText("No webhooks yet")).parentElement;
    expect(empty?.textContent).toContain("Add the address at which your software listens.");
  });

  it("says what failed, and reads again when asked", async () => {
    const service = serviceFor("admin").on("GET /v1/webhooks", refusal("internal_error"));
    const { user } = renderConsole("/webhooks");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The webhooks could not be read.");
    service.on("GET /v1/webhooks", pageOf([webhook()]));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("Outage planner")).toBeTruthy();
  });

  it("lists address, events and whether it fails or why it is off", async () => {
    serviceFor("engineer").on(
      "GET /v1/webhooks",
      pageOf([
        webhook(),
        webhook({ id: sampleId(302), name: "Failing", failingSince: "2026-12-01T06:00:00.000Z" }),
        webhook({
          id: sampleId(303),
          name: "Gone",
          active: false,
          stopReason: "gone",
          stoppedAt: "2026-12-01T06:00:00.000Z",
        }),
      ]),
    );
    renderConsole("/webhooks");
    const [, on, failing, gone] = await screen.findAllByRole("row");
    for (const words of ["https://hooks.example.com/borewright", "survey.computed", "on"])
      expect(on?.textContent).toContain(words);
    expect(failing?.textContent).toContain("failingsince");
    expect(gone?.textContent).toContain("it answered that it is gone");
  });

  it.each(everyRole)("offers the %s what that role may do", async (role) => {
    const service = serviceFor(role);
    if (role !== "viewer") service.on("GET /v1/webhooks", pageOf([webhook()]));
    renderConsole("/webhooks");
    await screen.findByText(role === "viewer" ? "Your role reads records" : "Outage planner");
    const mayAdd = rolesThatIssueKeys.includes(role);
    expect(screen.queryByRole("button", { name: "Add webhook" }) !== null).toBe(mayAdd);
  });
});

describe("adding a webhook", () => {
  const openForm = async () => {
    const service = serviceFor("developer").on("GET /v1/webhooks", pageOf([]));
    const page = renderConsole("/webhooks");
    await page.user.click(await screen.findByRole("button", { name: "Add webhook" }));
    const dialog = await screen.findByRole("dialog", { name: "Add webhook" });
    const send = () => page.user.click(within(dialog).getByRole("button", { name: "Add webhook" }));
    return { ...page, service, dialog, send };
  };

  it("asks for name, address and an event, and sends nothing without them", async () => {
    const { dialog, service, send } = await openForm();
    await send();
    expect(within(dialog).getByText("A name of 1 to 120 characters is needed.")).toBeTruthy();
    expect(within(dialog).getByText(/^An address such as/)).toBeTruthy();
    expect(within(dialog).getByText("Choose at least one.")).toBeTruthy();
    expect(service.callsTo("POST /v1/webhooks")).toEqual([]);
  });

  it("shows the service's reason at the address, then the secret this once", async () => {
    const { user, dialog, service, send } = await openForm();
    const detail = "The host has the address 10.0.0.1, which is not on the public network.";
    service.on(
      "POST /v1/webhooks",
      refusal("webhook_target_refused", {
        errors: [{ pointer: "/url", code: "webhook_target_refused", detail }],
      }),
    );
    await user.type(within(dialog).getByLabelText("Name"), "Outage planner");
    await user.type(within(dialog).getByLabelText("Address"), "https://inside.example.com/");
    await user.click(within(dialog).getByRole("checkbox", { name: /A job was signed/ }));
    await send();
    await waitFor(() => {
      const field = within(dialog).getByLabelText("Address");
      expect(
        document.getElementById(field.getAttribute("aria-describedby")?.split(" ").at(-1) ?? "")?.textContent,
      ).toBe(detail);
    });

    service.on("POST /v1/webhooks", answer(webhookWithSecret, { ...webhook(), secret }, 201));
    await send();
    const shown = await screen.findByRole("dialog", { name: "Webhook added" });
    expect(within(shown).getByText(secret)).toBeTruthy();
    expect(JSON.parse(service.callsTo("POST /v1/webhooks").at(-1)?.bodyText ?? "")).toEqual({
      name: "Outage planner",
      url: "https://inside.example.com/",
      events: ["job.signed"],
    });
    // Escape must not lose what cannot be shown again.
    fireEvent(shown, new Event("cancel", { cancelable: true }));
    expect(screen.getByText(secret)).toBeTruthy();
    await user.click(within(shown).getByRole("button", { name: "I have copied it" }));
    expect(document.body.innerHTML).not.toContain(secret);
  });
});

describe("the page of one webhook", () => {
  const open = async (shown = webhook(), deliveries = [delivery()]) => {
    const service = serviceFor("developer")
      .on(`GET /v1/webhooks/${id}`, answer(webhookSchema, shown))
      .on(`GET /v1/webhooks/${id}/deliveries`, deliveriesOf(deliveries));
    const page = renderConsole(`/webhooks/${id}`);
    await screen.findByRole("heading", { name: "Outage planner" });
    await screen.findByText(deliveries.length > 0 ? "job.signed" : "Nothing was sent yet");
    return { ...page, service };
  };

  it("lists what was sent with every attempt, and delivers it again when asked", async () => {
    const { user, service } = await open();
    const [, row] = screen.getAllByRole("row");
    for (const words of ["job.signed", "failed", "answered 500, 12 ms", "out of order"])
      expect(row?.textContent).toContain(words);
    const path = `/v1/webhooks/${id}/deliveries/${sampleId(301)}/redelivery`;
    service.on(`POST ${path}`, answer(deliverySchema, delivery({ state: "pending" })));
    service.on(`GET /v1/webhooks/${id}/deliveries`, deliveriesOf([delivery({ state: "pending" })]));
    await user.click(screen.getByRole("button", { name: "Deliver job.signed again" }));
    expect(await screen.findByText("waits")).toBeTruthy();
    expect(service.callsTo(`POST ${path}`)[0]?.headers.get("idempotency-key")).toMatch(/^[0-9a-f]{32}$/);
  });

  it("sends a test and says how it went", async () => {
    const { user, service } = await open(webhook(), []);
    const [attempt] = delivery().attempts;
    const test = delivery({ type: "webhook.test", attempts: attempt ? [{ ...attempt, reply: null }] : [] });
    service.on(`POST /v1/webhooks/${id}/test`, answer(deliverySchema, test, 201));
    await user.click(screen.getByRole("button", { name: "Send a test" }));
    expect((await screen.findByRole("status")).textContent).toBe(
      "The test was refused: answered 500 in 12 ms.",
    );
  });

  it("switches it off at the version that was read", async () => {
    const { user, service } = await open();
    service.on(`PATCH /v1/webhooks/${id}`, answer(webhookSchema, webhook({ active: false, version: 4 })));
    service.on(`GET /v1/webhooks/${id}`, answer(webhookSchema, webhook({ active: false, version: 4 })));
    await user.click(screen.getByRole("button", { name: "Switch off" }));
    expect(await screen.findByRole("button", { name: "Switch on" })).toBeTruthy();
    const [sent] = service.callsTo(`PATCH /v1/webhooks/${id}`);
    expect([sent?.headers.get("if-match"), sent?.bodyText]).toEqual(['"3"', '{"active":false}']);
    expect(screen.queryByRole("button", { name: /again$/ })).toBeNull();
  });

  it("replaces the secret and shows the new one this once", async () => {
    const { user, service } = await open();
    service.on(`POST /v1/webhooks/${id}/secret`, answer(webhookWithSecret, { ...webhook(), secret }, 201));
    await user.click(screen.getByRole("button", { name: "Replace secret" }));
    const asked = screen.getByRole("dialog", { name: "Replace the signing secret?" });
    await user.click(within(asked).getByRole("button", { name: "Replace secret" }));
    const shown = await screen.findByRole("dialog", { name: "Secret replaced" });
    expect(within(shown).getByText(secret)).toBeTruthy();
    await user.click(within(shown).getByRole("button", { name: "I have copied it" }));
    expect(document.body.innerHTML).not.toContain(secret);
  });

  it("removes it when told to, and goes back to the list", async () => {
    const { user, service, router } = await open();
    service.on(`DELETE /v1/webhooks/${id}`, { status: 204, body: null }).on("GET /v1/webhooks", pageOf([]));
    await user.click(screen.getByRole("button", { name: "Remove webhook" }));
    const dialog = screen.getByRole("dialog", { name: "Remove webhook “Outage planner”?" });
    await user.click(within(dialog).getByRole("button", { name: "Remove webhook" }));
    expect(await screen.findByText("No webhooks yet")).toBeTruthy();
    expect(router.state.location.pathname).toBe("/webhooks");
  });
});

describe("the outbox page", () => {
  const mail = {
    id: sampleId(400),
    to: ["owner@example.com"],
    subject: "Report",
    date: "2026-12-01T06:00:00.000Z",
    bytes: 2_049,
  };
  it("lists what was kept, for administrators", async () => {
    serviceFor("admin").on(
      "GET /v1/outbox",
      answer(outboxPage, { data: [mail], nextCursor: null, limit: 50 }),
    );
    renderConsole("/outbox");
    const [, row] = await screen.findAllByRole("row");
    for (const words of ["Report", "owner@example.com", "3 kB"]) expect(row?.textContent).toContain(words);
    expect(screen.getByRole("button", { name: "Download Report" })).toBeTruthy();
  });

  it("says that it is empty, that it failed, and whose it is", async () => {
    const service = serviceFor("admin").on("GET /v1/outbox", refusal("internal_error"));
    const { user } = renderConsole("/outbox");
    const alert = await screen.findByRole("alert");
    service.on("GET /v1/outbox", answer(outboxPage, { data: [], nextCursor: null, limit: 50 }));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("No mail was kept here.")).toBeTruthy();
  });

  it("is no page for other roles", async () => {
    serviceFor("engineer");
    renderConsole("/outbox");
    expect(await screen.findByText("For administrators")).toBeTruthy();
    expect(screen.queryByRole("link", { name: "Outbox" })).toBeNull();
  });
});
