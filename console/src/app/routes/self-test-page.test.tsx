import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { selfTestSchema, type SelfTest } from "../../../../shared/schemas/engine.ts";
import { answer, heldAnswer, noNetwork, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor, serviceForStranger } from "../../testing/render-console.tsx";

const route = "GET /v1/engine/self-test";

const figure = (overrides: Partial<SelfTest["figures"][number]> = {}): SelfTest["figures"][number] => ({
  id: "circle-gander",
  area: "bore-fit",
  source: "A published example, table 1",
  figure: "radius",
  expected: 4.7142,
  got: 4.714226,
  tolerance: 0.0001,
  passed: true,
  ...overrides,
});

const test = (figures: SelfTest["figures"]): SelfTest => ({
  at: "2026-12-01T06:00:00.000Z",
  engineVersion: "1.0.0",
  passed: figures.filter(({ passed }) => passed).length,
  failed: figures.filter(({ passed }) => !passed).length,
  figures,
});

const cellsOf = (row: HTMLElement) =>
  within(row)
    .getAllByRole("cell")
    .map((cell) => cell.lastElementChild?.textContent);

describe("the self-test's page", () => {
  it("shows its shape while the engine computes, and runs the test once", async () => {
    const held = heldAnswer(answer(selfTestSchema, test([figure()])));
    const service = serviceFor("viewer").on(route, held.answerer);
    renderConsole("/self-test");
    expect(await screen.findByText("Reading the self-test")).toBeTruthy();
    expect(screen.queryByRole("button", { name: "Run self-test again" })).toBeNull();
    held.release();
    expect(await screen.findByRole("table", { name: "Bore fits" })).toBeTruthy();
    expect(service.callsTo(route)).toHaveLength(1);
  });

  it("shows every figure with its source, what was expected and got, and how it came out", async () => {
    const other = figure({
      id: "factors",
      area: "statistics",
      figure: "t(10)",
      expected: -2.23,
      got: -2.228,
      tolerance: 0.005,
    });
    serviceFor("viewer").on(route, answer(selfTestSchema, test([figure(), other])));
    renderConsole("/self-test");
    const bores = await screen.findByRole("table", { name: "Bore fits" });
    const [, row] = within(bores).getAllByRole("row");
    expect(cellsOf(row!)).toEqual([
      "circle-ganderA published example, table 1",
      "radius",
      "4.7142",
      "4.714226",
      "2.6e−5",
      "1.0e−4",
      "passed",
    ]);
    const factors = screen.getByRole("table", { name: "Statistics" });
    expect(within(factors).getByText("−2.23")).toBeTruthy();
    expect(screen.getByText(/^Engine 1\.0\.0:/).textContent).toContain("2 passed, 0 failed");
  });

  it("shows each part of the engine by itself", async () => {
    const areas = [
      ["bore-fit", "Bore fits"],
      ["axis-deviation", "Axis and deviations"],
      ["shim-move", "Shim moves"],
      ["cold-target", "Cold targets"],
      ["repeatability-study", "Repeatability"],
      ["confirmation", "Confirmations"],
      ["statistics", "Statistics"],
    ] as const;
    const figures = areas.map(([area], index) => figure({ area, id: `case-${index}` }));
    serviceFor("viewer").on(route, answer(selfTestSchema, test(figures)));
    renderConsole("/self-test");
    for (const [index, [, name]] of areas.entries()) {
      const table = await screen.findByRole("table", { name });
      expect(within(table).getByText(`case-${index}`)).toBeTruthy();
      expect(within(table).getAllByRole("row").length).toBe(2);
    }
  });

  it("puts what failed first and says what not to use", async () => {
    const off = figure({ figure: "centreH", got: 5, passed: false });
    const none = figure({ figure: "centreV", got: null, passed: false });
    serviceFor("viewer").on(route, answer(selfTestSchema, test([figure(), off, none])));
    renderConsole("/self-test");
    const table = await screen.findByRole("table", { name: "Bore fits" });
    const [, first, second, third] = within(table).getAllByRole("row");
    expect(first?.textContent).toContain("× failed");
    expect(second?.textContent).toContain("no number");
    expect(third?.textContent).toContain("passed");
    expect(screen.getByText(/^Engine 1\.0\.0:/).textContent).toContain("Do not use its answers");
  });

  it("does not take no cases for a pass", async () => {
    serviceFor("viewer").on(route, answer(selfTestSchema, test([])));
    renderConsole("/self-test");
    expect(await screen.findByText("This engine ships no cases")).toBeTruthy();
    expect(screen.queryByText(/passed/)).toBeNull();
  });

  it("says what failed, and runs again when asked", async () => {
    const service = serviceFor("viewer").on(route, refusal("unavailable"));
    const { user } = renderConsole("/self-test");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The self-test could not be run.");
    service.on(route, answer(selfTestSchema, test([figure()])));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    const again = await screen.findByRole("button", { name: "Run self-test again" });
    const before = service.callsTo(route).length;
    await user.click(again);
    await waitFor(() => expect(service.callsTo(route)).toHaveLength(before + 1));
  });

  it("tells the engine's version and what changed in it, also when the test cannot be run", async () => {
    serviceFor("viewer").on(route, refusal("unavailable"));
    renderConsole("/self-test");
    const engine = await screen.findByRole("region", { name: "Engine" });
    expect(await within(engine).findByRole("heading", { level: 3, name: "1.0.0" })).toBeTruthy();
    expect(within(engine).getByRole("heading", { level: 2, name: "Engine 1.0.0" })).toBeTruthy();
    expect(within(engine).getByRole("listitem").textContent).toBe("Bore fits by least_squares, from points.");
    expect(within(engine).queryByText("Changes of the engine")).toBeNull();
  });

  it("says so when the changes cannot be read", async () => {
    serviceFor("viewer")
      .on(route, answer(selfTestSchema, test([figure()])))
      .on("GET /v1/meta", noNetwork);
    renderConsole("/self-test");
    expect((await screen.findByRole("alert")).textContent).toContain(
      "What changed in the engine could not be read.",
    );
  });

  it("is reached from the foot of every page by members", async () => {
    serviceFor("viewer").on(route, answer(selfTestSchema, test([figure()])));
    renderConsole("/self-test");
    expect((await screen.findByRole("link", { name: "self-test" })).getAttribute("href")).toBe("/self-test");
  });

  it("asks a stranger to sign in", async () => {
    serviceForStranger();
    const { router } = renderConsole("/self-test");
    expect(await screen.findByLabelText("Password")).toBeTruthy();
    expect(router.state.location.search).toBe("?next=%2Fself-test");
    expect(screen.queryByRole("link", { name: "self-test" })).toBeNull();
  });
});
