import { render, screen, waitFor, within } from "@testing-library/react";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { describe, expect, it, vi } from "vitest";
import { cautions } from "../../../shared/cautions.ts";
import { calculationPage } from "../../../shared/schemas/calculations.ts";
import { keyPage } from "../../../shared/schemas/keys.ts";
import { answer, noNetwork } from "../testing/fake-service.ts";
import { renderConsole, serviceFor, serviceForStranger } from "../testing/render-console.tsx";
import { ErrorPage } from "./routes/error-page.tsx";

const keys = answer(keyPage, { data: [], nextCursor: null, limit: 50 });
const calculations = answer(calculationPage, { data: [], nextCursor: null, limit: 25 });

describe("every page", () => {
  it("has the service's cautions at its foot, for a stranger too", async () => {
    serviceForStranger();
    renderConsole("/sign-in");
    const foot = await screen.findByRole("region", { name: "Cautions" });
    await waitFor(() => expect(within(foot).getAllByRole("listitem")).toHaveLength(cautions.length));
    for (const { text } of cautions) expect(within(foot).getByText(text)).toBeTruthy();
  });

  it("never stands without a caution, even when the service gives none", async () => {
    serviceForStranger().on("GET /v1/meta", noNetwork);
    renderConsole("/sign-in");
    const foot = await screen.findByRole("region", { name: "Cautions" });
    expect(foot.textContent).toContain("a qualified engineer decides");
  });

  it("is reached past the header by the skip link, the first stop of the Tab key", async () => {
    serviceFor("admin").on("GET /v1/keys", keys);
    const { user } = renderConsole("/keys");
    await screen.findByText("No keys yet");
    await user.tab();
    expect(document.activeElement?.textContent).toBe("Skip to the page");
    await user.keyboard("{Enter}");
    expect(document.activeElement).toBe(screen.getByRole("main"));
  });

  it("is named in the tab's title and in its heading, which has focus after the page changed", async () => {
    serviceFor("admin").on("GET /v1/keys", keys).on("GET /v1/calculations", calculations);
    const { user } = renderConsole("/keys");
    await screen.findByText("No keys yet");
    expect(document.title).toBe("Keys · Borewright");
    await user.click(screen.getByRole("link", { name: "Calculations" }));
    await screen.findByText("No calculations yet");
    expect(document.title).toBe("Calculations · Borewright");
    expect(document.activeElement).toBe(screen.getByRole("heading", { level: 1 }));
  });

  it("leads by its navigation to what the role can use, and marks where it is", async () => {
    serviceFor("viewer").on("GET /v1/calculations", calculations);
    renderConsole("/calculations");
    await screen.findByText("No calculations yet");
    const links = within(screen.getByRole("navigation", { name: "Main" })).getAllByRole("link");
    expect(links.map((link) => link.textContent)).toEqual([
      "Jobs",
      "Machines",
      "Calculations",
      "Guide",
      "Documents",
    ]);
    expect(links[2]?.getAttribute("aria-current")).toBe("page");
  });

  it("wears the theme that is chosen, and keeps it", async () => {
    serviceForStranger();
    const { user } = renderConsole("/sign-in");
    await user.selectOptions(await screen.findByLabelText("Theme"), "dark");
    expect(document.documentElement.dataset["theme"]).toBe("dark");
    expect(localStorage.getItem("borewright.theme")).toBe("dark");
    await user.selectOptions(screen.getByLabelText("Theme"), "as the system");
    expect(document.documentElement.dataset["theme"]).toBeUndefined();
    expect(localStorage.getItem("borewright.theme")).toBeNull();
  });
});

describe("an address without a page", () => {
  it("says so, and where the records are", async () => {
    serviceForStranger();
    renderConsole("/nowhere");
    expect(await screen.findByText("There is no page at this address")).toBeTruthy();
    expect(screen.getByRole("link", { name: "See all calculations" })).toBeTruthy();
  });
});

describe("a page that fails", () => {
  it("says so and can be loaded again", async () => {
    const told = vi.spyOn(console, "error").mockImplementation(() => undefined);
    const Failing = () => {
      throw new Error("Broken.");
    };
    const routes = [{ path: "/", element: <Failing />, errorElement: <ErrorPage /> }];
    render(<RouterProvider router={createMemoryRouter(routes)} />);
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The page could not be shown.");
    expect(alert.textContent).not.toContain("Broken.");
    expect(within(alert).getByRole("button", { name: "Try again" })).toBeTruthy();
    told.mockRestore();
  });
});
