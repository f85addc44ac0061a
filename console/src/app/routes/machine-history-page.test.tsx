import { screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { machineHistory } from "../../../../shared/schemas/machine-history.ts";
import { machineSchema } from "../../../../shared/schemas/machines.ts";
import { answer, heldAnswer, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { machineId, sampleMachine } from "../../testing/sample-job.ts";
import { sampleHistory } from "../../testing/sample-history.ts";

const one = `GET /v1/machines/${machineId}`;
const open = () => serviceFor("viewer").on(one, answer(machineSchema, sampleMachine()));

describe("a machine's history", () => {
  it("is read, failed and empty, and says what to do next", async () => {
    const held = heldAnswer(refusal("unavailable"));
    const service = open().on(`${one}/history`, held.answerer);
    const { user } = renderConsole(`/machines/${machineId}/history`);
    expect(await screen.findByText("Reading the history")).toBeTruthy();
    held.release();
    const alert = await screen.findByRole("alert");
    service.on(`${one}/history`, answer(machineHistory, { ...sampleHistory(), outages: [], stations: [] }));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("No outage has been surveyed yet")).toBeTruthy();
  });

  it("has the figure with its words, the drifts with what the test shows, and marks reference stations", async () => {
    open().on(`${one}/history`, answer(machineHistory, sampleHistory()));
    renderConsole(`/machines/${machineId}/history`);
    expect(await screen.findByRole("img", { name: "Figure 5. History over the outages" })).toBeTruthy();
    expect(screen.getByText("Drift is shown at cas-1.")).toBeTruthy();
    const table = screen.getByRole("table", { name: "Drift from one outage to the next" });
    expect(within(table).getByRole("row", { name: /^cas-1 drifted 1 2/ })).toBeTruthy();
    expect(
      within(table).getByRole("row", { name: /^brg-1 \(ref\.\) not tested .* hidden in it$/ }),
    ).toBeTruthy();
    expect(screen.getByRole("table", { name: "Places over the outages" })).toBeTruthy();
  });
});
