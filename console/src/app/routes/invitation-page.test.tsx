import { screen } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { memberSchema } from "../../../../shared/schemas/members.ts";
import { answer, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceForStranger } from "../../testing/render-console.tsx";
import { sampleId } from "../../testing/samples.ts";

const accept = "POST /v1/invitations/accept";
const member = {
  id: sampleId(12),
  email: "sol@example.com",
  name: "Sol Winter",
  role: "viewer",
  status: "active",
  createdAt: "2026-12-01T06:00:00.000Z",
  lastSignedInAt: null,
  version: 2,
} as const;

describe("the page of an invitation", () => {
  it("uses nothing up when it is opened", async () => {
    const service = serviceForStranger();
    renderConsole("/invitation#token=secret-token");
    expect(await screen.findByLabelText("New password")).toBeTruthy();
    expect(service.callsTo(accept)).toEqual([]);
  });

  it("says that a link without its token is not whole", async () => {
    serviceForStranger();
    renderConsole("/invitation");
    expect(await screen.findByText("This link is not whole")).toBeTruthy();
  });

  it("sets the password and leads to the sign-in", async () => {
    const service = serviceForStranger().on(accept, answer(memberSchema, member));
    const { user } = renderConsole("/invitation#token=secret-token");
    await user.type(await screen.findByLabelText("New password"), "a long and private sentence");
    await user.click(screen.getByRole("button", { name: "Accept invitation" }));
    const next = await screen.findByRole("link", { name: "Go to sign in" });
    expect(next.getAttribute("href")).toBe("/sign-in");
    expect(JSON.parse(service.callsTo(accept)[0]?.bodyText ?? "")).toEqual({
      token: "secret-token",
      password: "a long and private sentence",
    });
  });

  it("shows the service's fault at the password", async () => {
    const detail = "At least 12 characters are needed.";
    serviceForStranger().on(
      accept,
      refusal("password_weak", { errors: [{ pointer: "/password", code: "password_weak", detail }] }),
    );
    const { user } = renderConsole("/invitation#token=secret-token");
    await user.type(await screen.findByLabelText("New password"), "short");
    await user.click(screen.getByRole("button", { name: "Accept invitation" }));
    expect(await screen.findByText(detail)).toBeTruthy();
  });

  it("says that an invitation was used before", async () => {
    serviceForStranger().on(accept, refusal("invitation_invalid"));
    const { user } = renderConsole("/invitation#token=used");
    await user.type(await screen.findByLabelText("New password"), "a long and private sentence");
    await user.click(screen.getByRole("button", { name: "Accept invitation" }));
    expect((await screen.findByRole("alert")).textContent).toContain("The invitation was not accepted.");
  });
});
