import { screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { problemKinds } from "../../../../shared/error-codes.ts";
import { problemListSchema } from "../../../../shared/schemas/problem.ts";
import { guidePages } from "../../features/guide/guide-pages.ts";
import { answer, heldAnswer, noNetwork, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor, serviceForStranger } from "../../testing/render-console.tsx";
import { alignmentRecord } from "../../testing/sample-alignment.ts";
import { documentWith } from "../../testing/sample-document.ts";

const problems = "GET /v1/problems";
const openApi = "GET /openapi.json";
const twoCodes = answer(problemListSchema, {
  data: (["too_few_points", "not_found"] as const).map((code) => ({ code, ...problemKinds[code] })),
});
/** The sample's chain, its bore brg-1 using most of its tolerance. */
function followable(withMoves = true) {
  const record = alignmentRecord(withMoves);
  const { result } = record.response as { result: { summary: { worst: { id: string } } } };
  result.summary.worst.id = "brg-1";
  return documentWith(record);
}
const example = followable();

describe("the guide", () => {
  it("can be read without signing in, and leads to the sign-in and back", async () => {
    serviceForStranger();
    const { user, router } = renderConsole("/guide");
    expect(await screen.findByRole("heading", { level: 1, name: "Guide" })).toBeTruthy();
    expect(screen.queryByLabelText("Password")).toBeNull();
    expect(screen.queryByRole("link", { name: "Self-test" })).toBeNull();
    await user.click(await screen.findByRole("link", { name: "Sign in" }));
    expect(await screen.findByLabelText("Password")).toBeTruthy();
    expect(router.state.location.search).toBe("?next=%2Fguide");
  });

  it("keeps a member signed in who opens it first", async () => {
    serviceFor("viewer");
    renderConsole("/guide");
    expect(await screen.findByText("Ines Alder, viewer")).toBeTruthy();
    expect(screen.getByRole("link", { name: "Self-test" })).toBeTruthy();
    expect(screen.queryByRole("link", { name: "Sign in" })).toBeNull();
  });

  it.each(guidePages.map((page) => [page.slug, page] as const))(
    "has a page %s with its heading, reached from the contents",
    async (slug, { title }) => {
      serviceForStranger().on(problems, twoCodes).on(openApi, example);
      const { user, router } = renderConsole("/guide");
      const contents = await screen.findByRole("navigation", { name: "Guide" });
      await user.click(within(contents).getByRole("link", { name: title }));
      expect(await screen.findByRole("heading", { level: 1, name: title })).toBeTruthy();
      expect(router.state.location.pathname).toBe(`/guide/${slug}`);
      const here = within(screen.getByRole("navigation", { name: "Guide" })).getByRole("link", {
        name: title,
      });
      expect(here.getAttribute("aria-current")).toBe("page");
    },
  );

  it("goes from page to page in the order of a job", async () => {
    serviceForStranger();
    const { user } = renderConsole("/guide/cold-targets");
    const steps = await screen.findByRole("navigation", { name: "Pages before and after" });
    expect(
      within(steps)
        .getAllByRole("link")
        .map(({ textContent }) => textContent),
    ).toEqual(["Worked example", "Measurement plans"]);
    await user.click(within(steps).getByRole("link", { name: "Measurement plans" }));
    expect(await screen.findByRole("heading", { level: 1, name: "Measurement plans" })).toBeTruthy();
  });

  it("says that a page it does not have is not there", async () => {
    serviceForStranger();
    renderConsole("/guide/nothing");
    expect(await screen.findByText("There is no page at this address")).toBeTruthy();
  });

  it("writes a method with its formula, its letters and its sources", async () => {
    serviceForStranger();
    renderConsole("/guide/bore-fits");
    const method = await screen.findByRole("article", { name: /^Minimum circumscribed \(MCCI\)/ });
    expect(
      within(method).getByRole("group", { name: "Formula: Minimum circumscribed (MCCI)" }).textContent,
    ).toBe("minimise max |pi − c|");
    expect(method.querySelector("sub")?.textContent).toBe("i");
    expect(method.textContent).toContain("The smallest enclosing ball of balls, SoCG 2003");
    expect(screen.getByRole("img", { name: /^Figure 1\. Four forms of reading/ })).toBeTruthy();
  });

  it("names the units that the service itself takes", async () => {
    serviceForStranger();
    renderConsole("/guide/conventions");
    const table = await screen.findByRole("table", { name: "Units of a call" });
    expect(within(table).getByText("mm, um, in, mil")).toBeTruthy();
    expect(screen.getAllByRole("img").filter(({ tagName }) => tagName === "svg")).toHaveLength(5);
  });
});

describe("the guide's codes", () => {
  it("show their shape while they are read", async () => {
    const held = heldAnswer(twoCodes);
    serviceForStranger().on(problems, held.answerer);
    renderConsole("/guide/codes");
    expect(await screen.findByText("Reading the codes")).toBeTruthy();
    held.release();
    expect(await screen.findByText("too_few_points")).toBeTruthy();
  });

  it("stand in the order of their status with what each means and what to do", async () => {
    serviceForStranger().on(problems, twoCodes);
    renderConsole("/guide/codes#too_few_points");
    const table = await screen.findByRole("table", { name: "Problem codes" });
    expect(within(table).getByText("There are fewer readings than the fit needs")).toBeTruthy();
    expect(within(table).getByText("Take more readings.")).toBeTruthy();
    const link = within(table).getByRole("link", { name: "too_few_points" });
    expect(link.getAttribute("href")).toBe("/v1/problems/too_few_points");
    expect(link.id).toBe("too_few_points");
    const [, first, second] = within(table).getAllByRole("row");
    expect(first?.textContent).toContain("404");
    expect(second?.textContent).toContain("422");
  });

  it("say so when there are none", async () => {
    serviceForStranger().on(problems, answer(problemListSchema, { data: [] }));
    renderConsole("/guide/codes");
    expect(await screen.findByText("The service lists no codes")).toBeTruthy();
  });

  it("say what failed, and are read again when asked", async () => {
    const service = serviceForStranger().on(problems, noNetwork);
    const { user } = renderConsole("/guide/codes");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The codes could not be read.");
    service.on(problems, twoCodes);
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("not_found")).toBeTruthy();
  });
});

describe("the guide on jobs", () => {
  it("has a line for every obstacle to a signature, with what to do", async () => {
    serviceForStranger().on(openApi, example);
    renderConsole("/guide/jobs");
    const table = await screen.findByRole("table", { name: "What stands in the way of a signature" });
    expect(within(table).getAllByRole("row").length).toBeGreaterThan(10);
    const row = within(table).getByRole("row", { name: /^not_confirmed / });
    expect(row.textContent).toContain("Confirm the last survey against the one as found.");
    expect(screen.getByRole("img", { name: "Figure 1. The order of a job" })).toBeTruthy();
    const refusals = screen.getByRole("table", { name: "What the call that signs refuses" });
    expect(within(refusals).getByText("Enter your own password again.")).toBeTruthy();
  });

  it("says so when the document has no job that can be followed, and what failed when it cannot be read", async () => {
    const service = serviceForStranger().on(openApi, refusal("unavailable"));
    const { user } = renderConsole("/guide/jobs");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The example could not be read.");
    service.on(openApi, example);
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("The documents have no job that can be followed")).toBeTruthy();
  });
});

describe("the guide's worked example", () => {
  it("shows its shape while the document is read", async () => {
    const held = heldAnswer(example);
    serviceForStranger().on(openApi, held.answerer);
    renderConsole("/guide/worked-example");
    expect(await screen.findByText("Reading the example")).toBeTruthy();
    held.release();
    expect(await screen.findByText("Deviations to shims", { exact: false })).toBeTruthy();
  });

  it("follows the documented answer, not numbers of its own", async () => {
    serviceForStranger().on(openApi, example);
    renderConsole("/guide/worked-example");
    expect(await screen.findByText(/It follows brg-1,/)).toBeTruthy();
    expect(screen.getByRole("img", { name: "Figure 1. Bore section brg-1" })).toBeTruthy();
    expect(screen.getByRole("img", { name: "Figure 2. Plan and elevation" })).toBeTruthy();
    expect(screen.getByRole("table", { name: "Shims" })).toBeTruthy();
    expect(screen.queryByRole("link", { name: "Try this call" })).toBeNull();
  });

  it("can be tried by who may compute", async () => {
    serviceFor("engineer").on(openApi, example);
    renderConsole("/guide/worked-example");
    const link = await screen.findByRole("link", { name: "Try this call" });
    expect(link.getAttribute("href")).toBe("/try?endpoint=alignments");
  });

  it("says so when the document has none that goes to moves", async () => {
    serviceForStranger().on(openApi, followable(false));
    renderConsole("/guide/worked-example");
    expect(await screen.findByText("The documents have no example that can be followed")).toBeTruthy();
  });

  it("says what failed, and reads again when asked", async () => {
    const service = serviceForStranger().on(openApi, refusal("unavailable"));
    const { user } = renderConsole("/guide/worked-example");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The example could not be read.");
    service.on(openApi, followable(false));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("The documents have no example that can be followed")).toBeTruthy();
  });
});
