import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import {
  calculationRecord,
  replaySchema,
  type CalculationRecord,
} from "../../../../shared/schemas/calculations.ts";
import { answer, heldAnswer, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { alignmentRecord } from "../../testing/sample-alignment.ts";
import { refusedRecord, sampleRecord } from "../../testing/sample-records.ts";
import { sampleId } from "../../testing/samples.ts";

const address = `/calculations/${sampleId(200)}`;
const route = `GET /v1/calculations/${sampleId(200)}`;
const open = (record: CalculationRecord, search = "") => {
  const service = serviceFor("engineer").on(route, answer(calculationRecord, record));
  return { service, ...renderConsole(address + search) };
};
const titleBlock = () => screen.findByLabelText("Title block");

/** Cells of a table by its caption, row by row, without the heading. */
function rowsOf(caption: string): string[][] {
  const rows = within(screen.getByRole("table", { name: caption }))
    .getAllByRole("row")
    .slice(1);
  return rows.map((row) => [...row.children].map((cell) => cell.textContent ?? ""));
}

describe("a record's page", () => {
  it("shows its shape while it is read, and reads it once", async () => {
    const held = heldAnswer(answer(calculationRecord, sampleRecord("bore-fit")));
    const service = serviceFor("engineer").on(route, held.answerer);
    renderConsole(address);
    expect(await screen.findByText("Reading the record")).toBeTruthy();
    held.release();
    expect(await titleBlock()).toBeTruthy();
    expect(service.callsTo(route)).toHaveLength(1);
  });

  it("says that there is no such record, and where the others are", async () => {
    serviceFor("engineer").on(route, refusal("not_found"));
    renderConsole(address);
    expect(await screen.findByText("There is no record with this id")).toBeTruthy();
    expect(screen.getByRole("link", { name: "See all calculations" }).getAttribute("href")).toBe(
      "/calculations",
    );
  });

  it("says what failed, and reads again when asked", async () => {
    const service = serviceFor("engineer").on(route, refusal("unavailable"));
    const { user } = renderConsole(address);
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The record could not be read.");
    service.on(route, answer(calculationRecord, sampleRecord("bore-fit")));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await titleBlock()).toBeTruthy();
  });

  it("says so when the answer has a form that it does not know", async () => {
    serviceFor("engineer").on(route, { status: 200, body: { id: 1 } });
    renderConsole(address);
    expect((await screen.findByRole("alert")).textContent).toContain("in a form this console does not know");
  });

  it("has the fields of ISO 7200 and what makes the record defensible at its foot", async () => {
    open(sampleRecord("bore-fit"));
    const block = await titleBlock();
    const fields = Object.fromEntries(
      [...block.querySelectorAll("dt")].map((name) => [
        name.textContent,
        name.nextElementSibling?.textContent,
      ]),
    );
    expect(fields).toMatchObject({
      "legal owner": "Fellgate Works",
      title: "Bore fit",
      "identification number": sampleId(200),
      creator: "Ines Alder",
      "approval person": "not approved",
      sheet: "1 / 1",
      status: "succeeded",
      engine: "1.0.0",
      took: "1.25 ms",
      "input hash": `sha256:${"1".repeat(64)}`,
      "result hash": `sha256:${"2".repeat(64)}`,
      request: "req-200",
      note: "As found",
    });
    expect(fields["date of issue"]).toContain("2026-12-01 06:00:00 UTC");
    for (const what of ["record id", "input hash", "result hash", "request id"]) {
      expect(within(block).getByRole("button", { name: `Copy ${what}` })).toBeTruthy();
    }
  });

  it("shows what was sent and what was answered as JSON", async () => {
    const { user } = open(sampleRecord("axis-deviation"));
    await user.click(await screen.findByText("Request"));
    const request = await screen.findByLabelText("Request");
    expect(JSON.parse(request.textContent ?? "")).toEqual(sampleRecord("axis-deviation").request);
  });
});

describe("the record of a bore fit", () => {
  it("has figure 1 of the bore chosen in the address, its readings, all centres, and the warnings", async () => {
    const { user, router } = open(sampleRecord("bore-fit"));
    const figure = await screen.findByRole("img", { name: "Figure 1. Bore section brg-1" });
    const words = document.getElementById(figure.getAttribute("aria-describedby") ?? "")?.textContent;
    expect(words).toContain("least-squares circle through 3 of 4 readings.");
    expect(words).toContain("Excluded: reading 4.");
    expect(rowsOf("Readings of brg-1").map(([number, , residual, use]) => [number, residual, use])).toEqual([
      ["1", "+0.0020", "used"],
      ["2", "−0.0010", "used"],
      ["3", "−0.0020", "used"],
      ["4", "+0.0800", "excluded"],
    ]);
    expect(rowsOf("Centres and sizes").map(([id, h, v]) => [id, h, v])).toEqual([
      ["brg-1", "+0.1000", "+0.0500"],
      ["brg-2", "+0.1000", "+0.0500"],
    ]);
    expect(screen.getByRole("region", { name: "Warnings" }).textContent).toContain(
      "brg-1: Three readings leave nothing to judge them by.",
    );
    await user.click(screen.getByRole("button", { name: "Next" }));
    expect(await screen.findByRole("img", { name: "Figure 1. Bore section brg-2" })).toBeTruthy();
    expect(router.state.location.search).toBe("?bore=brg-2");
    expect(screen.getByRole("button", { name: "Next" }).hasAttribute("disabled")).toBe(true);
  });

  it("opens at the bore that the address names", async () => {
    open(sampleRecord("bore-fit"), "?bore=brg-2");
    expect(await screen.findByRole("img", { name: "Figure 1. Bore section brg-2" })).toBeTruthy();
  });
});

describe("the record of deviations", () => {
  it("has figure 2, the verdicts counted and in words, and the numbers behind them", async () => {
    open(sampleRecord("axis-deviation"));
    const figure = await screen.findByRole("img", { name: "Figure 2. Plan and elevation" });
    const words = document.getElementById(figure.getAttribute("aria-describedby") ?? "")?.textContent;
    expect(words).toContain("Reference stations: brg-1, brg-2.");
    expect(words).toContain("Measured: 1 conform, 1 undecided (cas-2), 1 exceed (cas-1).");
    const verdicts = screen.getByLabelText("Verdicts").textContent;
    expect(verdicts).toContain("conforms1");
    expect(verdicts).toContain("cas-1 242 %");
    expect(rowsOf("Deviations measured").map(([id, verdict, , , , h, v]) => [id, verdict, h, v])).toEqual([
      ["brg-1 (ref.)", "conforms", "0.0000", "0.0000"],
      ["cas-1", "exceeds", "+0.1200", "−0.2100"],
      ["cas-2", "undecided", "+0.0300", "−0.0800"],
      ["brg-2 (ref.)", "not judged", "0.0000", "0.0000"],
    ]);
    expect(rowsOf("Reference axis")).toHaveLength(2);
  });
});

describe("the record of moves", () => {
  it("has figure 2 before and after, what is out of reach, shims, steps in order, and what to measure", async () => {
    open(sampleRecord("shim-move"));
    const figure = await screen.findByRole("img", { name: "Figure 2. Plan and elevation" });
    const words = document.getElementById(figure.getAttribute("aria-describedby") ?? "")?.textContent;
    expect(words).toContain("As found: not judged.");
    expect(words).toContain("As left, predicted: 2 conform, 0 undecided, 1 exceed (exh-1).");
    const unreached = screen.getByRole("region", { name: "Out of reach" });
    expect(unreached.textContent).toContain("exhaust: The travel stops at 0.3 mm.");
    expect(unreached.textContent).toContain("/components/1/supports/0/travel/v/1");
    expect(
      rowsOf("Shims").map(([component, , place, from, , change, to, add, remove]) => [
        component,
        place,
        from,
        change,
        to,
        add,
        remove,
      ]),
    ).toEqual([
      ["casing", "left", "8.0000", "+0.3100", "8.3100", "0.30 + 0.01", "–"],
      ["casing", "right", "8.0000", "+0.3100", "8.3100", "0.30 + 0.01", "–"],
    ]);
    expect(rowsOf("Step 1: casing, in 2 parts")).toEqual([
      ["1", "−0.0600", "+0.1550", "+0.1550"],
      ["2", "−0.1200", "+0.3100", "+0.3100"],
    ]);
    expect(rowsOf("Watch while moving: change of each station, and where to stop")).toEqual([
      ["1", "casing", "brg-1", "0.0000", "−0.0200", "+0.0200", "0.0000", "−0.0200", "+0.0200"],
    ]);
    const again = screen.getByRole("region", { name: "Measure again" });
    expect(
      within(again)
        .getAllByRole("listitem")
        .map((item) => item.textContent),
    ).toEqual(["1 brg-1", "2 cas-1", "3 exh-1"]);
    expect(screen.getByRole("region", { name: "Advice" }).textContent).toContain(
      "At most four pieces in a stack.",
    );
  });
});

describe("the record of the whole chain", () => {
  it("has deviations before and after in one figure 2, the move sheet, and the bores it began with", async () => {
    open(alignmentRecord(true));
    const figure = await screen.findByRole("img", { name: "Figure 2. Plan and elevation" });
    const words = document.getElementById(figure.getAttribute("aria-describedby") ?? "")?.textContent;
    expect(words).toContain("As found: 1 conform, 1 undecided (cas-2), 1 exceed (cas-1).");
    expect(words).toContain("As left, predicted:");
    expect(rowsOf("Deviations as found")).toHaveLength(4);
    expect(rowsOf("Step 1: casing, in 2 parts")).toHaveLength(2);
    expect(screen.getByRole("img", { name: "Figure 1. Bore section brg-1" })).toBeTruthy();
    expect(rowsOf("Centres and sizes")).toHaveLength(2);
  });

  it("has no move sheet where no components were sent", async () => {
    open(alignmentRecord(false));
    expect(await screen.findByRole("img", { name: "Figure 2. Plan and elevation" })).toBeTruthy();
    expect(rowsOf("Deviations measured")).toHaveLength(4);
    expect(screen.queryByRole("table", { name: "Shims" })).toBeNull();
  });
});

describe("the record of a refused call", () => {
  it("says why at the fault's pointer, and has no result hash", async () => {
    open(refusedRecord());
    const refused = await screen.findByRole("region", { name: "Refusal" });
    expect(refused.textContent).toContain("There are fewer readings than the fit needs");
    expect(within(refused).getByText("/bores/0/points")).toBeTruthy();
    expect((await titleBlock()).textContent).toContain("× failed");
    expect(screen.queryByRole("img")).toBeNull();
  });
});

describe("replaying a record", () => {
  const replay = `POST /v1/calculations/${sampleId(200)}/replay`;
  const engines = { engineVersion: "1.1.0", recordedEngineVersion: "1.0.0" };

  it("says that the answer is the same", async () => {
    const { service, user } = open(sampleRecord("bore-fit"));
    service.on(replay, answer(replaySchema, { same: true, differences: [], ...engines }));
    await user.click(await screen.findByRole("button", { name: "Replay record" }));
    expect(await screen.findByText("same")).toBeTruthy();
    expect(screen.getByText(/Engine 1\.1\.0 today, 1\.0\.0 then/)).toBeTruthy();
  });

  it("names every place that differs, with both values", async () => {
    const { service, user } = open(sampleRecord("bore-fit"));
    const differences = [
      { pointer: "/result/bores/0/diameter", then: 360, now: 360.001 },
      { pointer: "/result/bores/0/taper", then: null, now: { halfAngleDeg: 7 } },
    ];
    service.on(replay, answer(replaySchema, { same: false, differences, ...engines }));
    await user.click(await screen.findByRole("button", { name: "Replay record" }));
    const table = within(await screen.findByRole("region", { name: "Differences" })).getByRole("table");
    const cells = within(table)
      .getAllByRole("row")
      .slice(1)
      .map((row) => [...row.children].map((cell) => cell.textContent));
    expect(cells).toEqual([
      ["/result/bores/0/diameter", "360", "360.001"],
      ["/result/bores/0/taper", "null", '{"halfAngleDeg":7}'],
    ]);
  });

  it("says when it failed", async () => {
    const { service, user } = open(sampleRecord("bore-fit"));
    service.on(replay, refusal("unavailable"));
    await user.click(await screen.findByRole("button", { name: "Replay record" }));
    expect((await screen.findByRole("alert")).textContent).toContain("The record could not be replayed.");
  });

  it("is not offered to a viewer", async () => {
    serviceFor("viewer").on(route, answer(calculationRecord, sampleRecord("bore-fit")));
    renderConsole(address);
    await titleBlock();
    await waitFor(() => expect(screen.queryByRole("button", { name: "Replay record" })).toBeNull());
  });
});
