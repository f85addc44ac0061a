import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { calculationPage, type CalculationSummary } from "../../../../shared/schemas/calculations.ts";
import { keyPage } from "../../../../shared/schemas/keys.ts";
import { answer, heldAnswer, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { sampleId, sampleKey, sampleSummary } from "../../testing/samples.ts";

const pageOf = (data: CalculationSummary[], nextCursor: string | null = null) =>
  answer(calculationPage, { data, nextCursor, limit: 25 });
const keys = answer(keyPage, { data: [sampleKey()], nextCursor: null, limit: 50 });
const list = "GET /v1/calculations";
const service = () => serviceFor("engineer").on("GET /v1/keys", keys);

describe("the list of calculations", () => {
  it("shows its shape while it is read", async () => {
    const held = heldAnswer(pageOf([]));
    service().on(list, held.answerer);
    renderConsole("/calculations");
    expect(await screen.findByText("Reading the calculations")).toBeTruthy();
    held.release();
    expect(await screen.findByText("No calculations yet")).toBeTruthy();
  });

  it("says what to do when there are none, by what the role may do", async () => {
    service().on(list, pageOf([]));
    renderConsole("/calculations");
    const empty = (await screen.findByText("No calculations yet")).parentElement;
    expect(
      within(empty as HTMLElement)
        .getByRole("link", { name: "Try a call" })
        .getAttribute("href"),
    ).toBe("/try");
  });

  it("leads a viewer to the documents when there are none", async () => {
    serviceFor("viewer").on(list, pageOf([]));
    renderConsole("/calculations");
    const empty = (await screen.findByText("No calculations yet")).parentElement;
    expect(within(empty as HTMLElement).getByRole("link", { name: "the documents" })).toBeTruthy();
    expect(screen.queryByRole("link", { name: "Try a call" })).toBeNull();
  });

  it("says what failed, and reads again when asked", async () => {
    const faked = service().on(list, refusal("unavailable"));
    const { user } = renderConsole("/calculations");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The calculations could not be read.");
    faked.on(list, pageOf([sampleSummary()]));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByRole("link", { name: "Bore fit" })).toBeTruthy();
  });

  it("tries a passing failure once more by itself", async () => {
    const answers = [refusal("unavailable"), pageOf([sampleSummary()])];
    service().on(list, () => answers.shift() ?? refusal("unavailable"));
    renderConsole("/calculations");
    expect(await screen.findByRole("link", { name: "Bore fit" })).toBeTruthy();
  });

  it("names kind, id, status, note, maker, engine, duration and moment of each, and leads to its record", async () => {
    const failed = sampleSummary({
      id: sampleId(201),
      kind: "shim-move",
      status: "failed",
      member: null,
      key: { id: sampleId(100), name: "Outage planning", prefix: "bw_live_outage" },
      note: "Unit 2",
      durationMs: 12.34,
    });
    service().on(list, pageOf([sampleSummary(), failed]));
    renderConsole("/calculations");
    const [, first, second] = await screen.findAllByRole("row");
    for (const words of ["Bore fit", sampleId(200), "succeeded", "Ines Alder", "1.0.0", "1.3 ms"]) {
      expect(first?.textContent).toContain(words);
    }
    for (const words of [
      "Shim moves",
      "failed",
      "Unit 2",
      "key Outage planning",
      "bw_live_outage…",
      "12.3 ms",
    ]) {
      expect(second?.textContent).toContain(words);
    }
    const time = within(first as HTMLElement).getByText(/^2026-1[12]-\d\d \d\d:\d\d:\d\d$/);
    expect(time.getAttribute("title")).toBe("2026-12-01 06:00:00 UTC");
    expect(screen.getByRole("link", { name: "Shim moves" }).getAttribute("href")).toBe(
      `/calculations/${sampleId(201)}`,
    );
    expect(screen.getByRole("button", { name: `Copy id ${sampleId(201)}` })).toBeTruthy();
  });
});

describe("the filters", () => {
  it("put what is chosen into the address, without what is not", async () => {
    const faked = service().on(list, pageOf([sampleSummary()]));
    const { user, router } = renderConsole("/calculations");
    await screen.findByRole("link", { name: "Bore fit" });
    await user.selectOptions(screen.getByLabelText("Kind"), "Axis and deviations");
    await user.selectOptions(await screen.findByLabelText("Key"), "Outage planning");
    await user.type(screen.getByLabelText("Note or id"), "unit 2");
    await user.click(screen.getByRole("button", { name: "Apply filters" }));
    await waitFor(() =>
      expect(router.state.location.search).toBe(`?kind=axis-deviation&keyId=${sampleId(100)}&q=unit+2`),
    );
    const query = faked.callsTo(list).at(-1)?.query;
    expect(Object.fromEntries(query ?? [])).toEqual({
      kind: "axis-deviation",
      keyId: sampleId(100),
      q: "unit 2",
      limit: "25",
    });
  });

  it("are filled from the address, days as the reader's own, the last one included", async () => {
    const faked = service().on(list, pageOf([sampleSummary()]));
    renderConsole("/calculations?status=failed&from=2026-11-30&to=2026-12-01&kind=shim-move");
    await screen.findByRole("link", { name: "Bore fit" });
    expect(screen.getByLabelText<HTMLSelectElement>("Status").value).toBe("failed");
    expect(screen.getByLabelText<HTMLSelectElement>("Kind").value).toBe("shim-move");
    expect(screen.getByLabelText<HTMLInputElement>("From day").value).toBe("2026-11-30");
    expect(screen.getByLabelText<HTMLInputElement>("To day").value).toBe("2026-12-01");
    const query = faked.callsTo(list).at(-1)?.query;
    expect(query?.get("from")).toBe(new Date(2026, 10, 30).toISOString());
    expect(query?.get("to")).toBe(new Date(2026, 11, 2).toISOString());
  });

  it("say when nothing fits them, and are cleared by a link", async () => {
    service().on(list, ({ query }) => (query.has("q") ? pageOf([]) : pageOf([sampleSummary()])));
    const { user, router } = renderConsole("/calculations?q=nothing");
    expect(await screen.findByText("No calculation fits these filters")).toBeTruthy();
    await user.click(screen.getByRole("link", { name: "Clear filters" }));
    expect(await screen.findByRole("link", { name: "Bore fit" })).toBeTruthy();
    expect(router.state.location.search).toBe("");
    expect(screen.getByLabelText<HTMLInputElement>("Note or id").value).toBe("");
  });

  it("come back with the back button", async () => {
    service().on(list, pageOf([sampleSummary()]));
    const { user, router } = renderConsole("/calculations?kind=bore-fit");
    await screen.findByRole("link", { name: "Bore fit" });
    await user.selectOptions(screen.getByLabelText("Kind"), "Shim moves");
    await user.click(screen.getByRole("button", { name: "Apply filters" }));
    await waitFor(() => expect(router.state.location.search).toBe("?kind=shim-move"));
    await router.navigate(-1);
    await waitFor(() => expect(screen.getByLabelText<HTMLSelectElement>("Kind").value).toBe("bore-fit"));
  });

  it("keep a value of the address that the form does not know", async () => {
    service().on(list, pageOf([sampleSummary()]));
    renderConsole(`/calculations?keyId=${sampleId(999)}`);
    await screen.findByRole("link", { name: "Bore fit" });
    expect((await screen.findByLabelText<HTMLSelectElement>("Key")).value).toBe(sampleId(999));
  });

  it("offer no keys to a role that may not read them", async () => {
    serviceFor("viewer").on(list, pageOf([sampleSummary()]));
    renderConsole("/calculations");
    await screen.findByRole("link", { name: "Bore fit" });
    expect(screen.queryByLabelText("Key")).toBeNull();
  });
});

describe("the pager", () => {
  it("leads onward with the filters kept, and back to the newest", async () => {
    const older = sampleSummary({ id: sampleId(300), kind: "shim-move" });
    const faked = service().on(list, ({ query }) =>
      query.get("cursor") === "c1" ? pageOf([older]) : pageOf([sampleSummary()], "c1"),
    );
    const { user, router } = renderConsole("/calculations?status=succeeded");
    await user.click(await screen.findByRole("link", { name: "Older" }));
    expect(await screen.findByRole("link", { name: "Shim moves" })).toBeTruthy();
    expect(router.state.location.search).toBe("?status=succeeded&cursor=c1");
    expect(faked.callsTo(list).at(-1)?.query.get("status")).toBe("succeeded");
    expect(screen.queryByRole("link", { name: "Older" })).toBeNull();
    await user.click(screen.getByRole("link", { name: "Newest" }));
    expect(await screen.findByRole("link", { name: "Bore fit" })).toBeTruthy();
    expect(router.state.location.search).toBe("?status=succeeded");
    expect(screen.queryByRole("link", { name: "Newest" })).toBeNull();
  });

  it("begins anew when the filters change", async () => {
    service().on(list, pageOf([sampleSummary()]));
    const { user, router } = renderConsole("/calculations?cursor=c1");
    await screen.findByRole("link", { name: "Bore fit" });
    await user.selectOptions(screen.getByLabelText("Status"), "failed");
    await user.click(screen.getByRole("button", { name: "Apply filters" }));
    await waitFor(() => expect(router.state.location.search).toBe("?status=failed"));
  });
});
