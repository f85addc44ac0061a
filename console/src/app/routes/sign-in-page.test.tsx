import { screen, waitFor } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { calculationPage } from "../../../../shared/schemas/calculations.ts";
import { keyPage } from "../../../../shared/schemas/keys.ts";
import { sessionSchema } from "../../../../shared/schemas/sessions.ts";
import { answer, heldAnswer, noNetwork, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceForStranger } from "../../testing/render-console.tsx";
import { sampleSession } from "../../testing/samples.ts";
import { ownAddress } from "./sign-in-page.tsx";

const noCalculations = answer(calculationPage, { data: [], nextCursor: null, limit: 25 });
const noKeys = answer(keyPage, { data: [], nextCursor: null, limit: 50 });

const fill = async (user: ReturnType<typeof renderConsole>["user"], password = "a long sentence") => {
  await user.type(await screen.findByLabelText("E-mail"), "admin@example.com");
  await user.type(screen.getByLabelText("Password"), password);
  await user.click(screen.getByRole("button", { name: "Sign in" }));
};

describe("the sign-in page", () => {
  it("asks for the session of an earlier visit first, and shows no form meanwhile", async () => {
    const held = heldAnswer(refusal("session_expired"));
    serviceForStranger().on("POST /v1/sessions/refresh", held.answerer);
    renderConsole("/sign-in");
    expect(await screen.findByText("Reading your session")).toBeTruthy();
    expect(screen.queryByLabelText("Password")).toBeNull();
    held.release();
    expect(await screen.findByLabelText("Password")).toBeTruthy();
  });

  it("says that the service does not answer, and asks again", async () => {
    const service = serviceForStranger().on("POST /v1/sessions/refresh", noNetwork);
    const { user } = renderConsole("/sign-in");
    expect((await screen.findByRole("alert")).textContent).toContain("The service cannot be reached.");
    service.on("POST /v1/sessions/refresh", refusal("session_expired"));
    await user.click(screen.getByRole("button", { name: "Try again" }));
    await waitFor(() => expect(screen.queryByRole("alert")).toBeNull());
  });

  it("says at each field what it needs, and sends nothing", async () => {
    const service = serviceForStranger();
    const { user } = renderConsole("/sign-in");
    await user.click(await screen.findByRole("button", { name: "Sign in" }));
    const email = screen.getByLabelText("E-mail");
    expect(email.getAttribute("aria-invalid")).toBe("true");
    expect(document.getElementById(email.getAttribute("aria-describedby") ?? "")?.textContent).toBe(
      "An e-mail address is needed, as name@example.com.",
    );
    expect(screen.getByText("The password is needed.")).toBeTruthy();
    expect(service.callsTo("POST /v1/sessions")).toEqual([]);
  });

  it("shows the service's refusal of a wrong password, and keeps the e-mail", async () => {
    serviceForStranger().on("POST /v1/sessions", refusal("sign_in_refused"));
    const { user } = renderConsole("/sign-in");
    await fill(user, "wrong");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("You are not signed in.E-mail or password is wrong");
    expect(screen.getByLabelText<HTMLInputElement>("E-mail").value).toBe("admin@example.com");
  });

  it("leads on to the page that was asked for, and its calls carry the token", async () => {
    const service = serviceForStranger()
      .on("POST /v1/sessions", answer(sessionSchema, sampleSession("admin"), 201))
      .on("GET /v1/keys", noKeys);
    const { user, router } = renderConsole("/keys?cursor=abc");
    await fill(user);
    expect(await screen.findByText("No keys yet")).toBeTruthy();
    expect(router.state.location.pathname + router.state.location.search).toBe("/keys?cursor=abc");
    expect(service.callsTo("GET /v1/keys")[0]?.headers.get("authorization")).toBe("Bearer token-of-admin");
    const [signIn] = service.callsTo("POST /v1/sessions");
    expect(JSON.parse(signIn?.bodyText ?? "")).toEqual({
      email: "admin@example.com",
      password: "a long sentence",
    });
    expect(screen.getByText("Ines Alder, admin")).toBeTruthy();
  });

  it("keeps the token out of every storage", async () => {
    serviceForStranger()
      .on("POST /v1/sessions", answer(sessionSchema, sampleSession("admin"), 201))
      .on("GET /v1/calculations", noCalculations)
      .on("GET /v1/keys", noKeys);
    const { user } = renderConsole("/sign-in");
    await fill(user);
    expect(await screen.findByText("No calculations yet")).toBeTruthy();
    const stored = JSON.stringify([{ ...localStorage }, { ...sessionStorage }, document.cookie]);
    expect(stored).not.toContain("token-of-admin");
  });
});

describe("the address to go on to after signing in", () => {
  it.each([
    [null, "/calculations"],
    ["/keys", "/keys"],
    ["/calculations?kind=bore-fit", "/calculations?kind=bore-fit"],
    ["/sign-in", "/calculations"],
    ["https://elsewhere.example/keys", "/calculations"],
    ["//elsewhere.example/keys", "/calculations"],
    ["/\\elsewhere.example", "/calculations"],
    ["javascript:alert(1)", "/calculations"],
  ])("for %s is %s", (next, address) => {
    expect(ownAddress(next)).toBe(address);
  });
});
