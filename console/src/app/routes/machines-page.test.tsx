import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { machineImport } from "../../../../shared/schemas/machine-workbooks.ts";
import {
  machineComparison,
  machinePage,
  machineRevisionPage,
  machineSchema,
  type MachineSummary,
} from "../../../../shared/schemas/machines.ts";
import { answer, heldAnswer, noNetwork, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { machineId, sampleMachine, sampleMachineSummary } from "../../testing/sample-job.ts";
import { everyRole, sampleId } from "../../testing/samples.ts";

const list = "GET /v1/machines";
const one = `GET /v1/machines/${machineId}`;
const pageOf = (data: MachineSummary[]) => answer(machinePage, { data, nextCursor: null, limit: 25 });
const document = {
  status: 200,
  body: {
    paths: {
      "/v1/machines": {
        post: {
          requestBody: {
            content: { "application/json": { examples: { unit: { value: sampleMachine().document } } } },
          },
        },
      },
    },
  },
};

describe("the list of machines", () => {
  it("is read, failed, empty and full", async () => {
    const held = heldAnswer(refusal("unavailable"));
    const service = serviceFor("engineer").on(list, held.answerer);
    const { user } = renderConsole("/machines");
    expect(await screen.findByText("Reading the machines")).toBeTruthy();
    held.release();
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The machines could not be read.");
    service.on(list, pageOf([]));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByText("No machines yet")).toBeTruthy();
    service.on(list, pageOf([sampleMachineSummary()]));
    await user.type(screen.getByLabelText("Name or id"), "Fell");
    await user.click(screen.getByRole("button", { name: "Apply filters" }));
    expect(await screen.findByRole("link", { name: "Fellgate Unit 2" })).toBeTruthy();
    expect(service.callsTo(list).at(-1)?.query.get("q")).toBe("Fell");
  });

  it("archives with a question, naming the version that was read", async () => {
    const service = serviceFor("admin").on(list, pageOf([sampleMachineSummary({ version: 4 })]));
    const { user } = renderConsole("/machines");
    await user.click(await screen.findByRole("button", { name: "Archive machine Fellgate Unit 2" }));
    const dialog = screen.getByRole("dialog", { name: "Archive machine “Fellgate Unit 2”?" });
    service
      .on(`PATCH /v1/machines/${machineId}`, answer(machineSchema, sampleMachine({ archived: true })))
      .on(list, pageOf([]));
    await user.click(within(dialog).getByRole("button", { name: "Archive machine" }));
    expect(await screen.findByText("No machines yet")).toBeTruthy();
    const [sent] = service.callsTo(`PATCH /v1/machines/${machineId}`);
    expect(sent?.headers.get("if-match")).toBe('"4"');
    expect(JSON.parse(sent?.bodyText ?? "")).toEqual({ archived: true });
  });

  it.each(everyRole)("offers changes to who may make them: %s", async (role) => {
    serviceFor(role).on(list, pageOf([sampleMachineSummary()]));
    renderConsole("/machines");
    await screen.findByRole("link", { name: "Fellgate Unit 2" });
    const mayWrite = role === "admin" || role === "engineer";
    expect(screen.queryByRole("link", { name: "Describe a machine" }) !== null).toBe(mayWrite);
    expect(screen.queryByRole("button", { name: /^Archive/ }) !== null).toBe(mayWrite);
  });
});

describe("describing a machine", () => {
  it("begins with the example, shows faults at their lines, and keeps the text until it is stored", async () => {
    const service = serviceFor("engineer").on("GET /openapi.json", document);
    const { user, router } = renderConsole("/machines/new");
    await user.click(await screen.findByRole("button", { name: "Put in the example" }));
    const text = screen.getByLabelText("Machine, JSON");
    expect(JSON.parse((text as HTMLTextAreaElement).value)).toEqual(sampleMachine().document);
    const detail = "A tolerance is positive.";
    service.on(
      "POST /v1/machines",
      refusal("out_of_range", {
        errors: [{ pointer: "/stations/0/tolerance/radial", code: "out_of_range", detail }],
      }),
    );
    await user.click(screen.getByRole("button", { name: "Store machine" }));
    expect(await screen.findByText("/stations/0/tolerance/radial")).toBeTruthy();
    expect(screen.getByRole("button", { name: /^line \d+$/ })).toBeTruthy();
    expect(text.getAttribute("aria-invalid")).toBe("true");

    service.on("POST /v1/machines", noNetwork);
    await user.click(screen.getByRole("button", { name: "Store machine" }));
    expect((await screen.findByRole("alert")).textContent).toContain("The machine was not stored.");
    expect((text as HTMLTextAreaElement).value).toContain("Fellgate Unit 2");
    service
      .on("POST /v1/machines", answer(machineSchema, sampleMachine(), 201))
      .on(one, answer(machineSchema, sampleMachine()))
      .on(`${one}/revisions`, answer(machineRevisionPage, { data: [], nextCursor: null, limit: 50 }));
    await user.click(screen.getByRole("button", { name: "Store machine" }));
    await waitFor(() => expect(router.state.location.pathname).toBe(`/machines/${machineId}`));
    expect(Object.keys(sessionStorage).filter((key) => key.includes("machine.new"))).toEqual([]);
  });

  it("takes a JSON file, and a workbook with its faults by cell", async () => {
    const service = serviceFor("engineer").on("GET /openapi.json", document);
    const { user } = renderConsole("/machines/new");
    await user.upload(
      await screen.findByLabelText("JSON file"),
      new File(['{"name":"Unit 9"}'], "unit-9.json"),
    );
    await waitFor(() =>
      expect(screen.getByLabelText<HTMLTextAreaElement>("Machine, JSON").value).toBe('{"name":"Unit 9"}'),
    );
    await user.click(screen.getByText("From a workbook"));
    const faults = [
      { sheet: "Stations", cell: "C7", code: "wrong_type", detail: "A formula, not a value." },
    ] as const;
    service.on(
      "POST /v1/machine-imports",
      answer(machineImport, { document: null, documentHash: null, faults: [...faults], machine: null }),
    );
    await user.upload(screen.getByLabelText("Workbook (XLSX)"), new File(["x"], "unit.xlsx"));
    const table = await screen.findByRole("table", { name: "Faults by cell" });
    expect(within(table).getByRole("row", { name: "Stations C7 A formula, not a value." })).toBeTruthy();
    expect(screen.queryByRole("button", { name: "Store machine from workbook" })).toBeNull();
  });
});

describe("a machine's page", () => {
  const revisions = (count: number) =>
    answer(machineRevisionPage, {
      data: Array.from({ length: count }, (_, index) => ({
        revision: count - index,
        reason: index === count - 1 ? "First description." : "Feet added.",
        documentHash: `sha256:${"3".repeat(64)}`,
        createdAt: "2026-11-04T06:30:00.000Z",
        by: { member: { id: sampleId(10), name: "Ines Alder" }, key: null },
      })),
      nextCursor: null,
      limit: 50,
    });

  it("has the document as tables, the maker's cautions and who changed it", async () => {
    serviceFor("viewer").on(one, answer(machineSchema, sampleMachine())).on(`${one}/revisions`, revisions(1));
    renderConsole(`/machines/${machineId}`);
    const stations = await screen.findByRole("table", { name: "Stations" });
    expect(within(stations).getByRole("row", { name: /^brg-1 \(ref\.\)/ })).toBeTruthy();
    for (const name of ["Components", "Supports", "Shim stacks as they stand"]) {
      expect(screen.getByRole("table", { name })).toBeTruthy();
    }
    expect(screen.getByText("Lift with the maker's gear alone.")).toBeTruthy();
    const table = await screen.findByRole("table", { name: "Revisions, newest first" });
    expect(within(table).getByText("Ines Alder")).toBeTruthy();
    expect(screen.queryByRole("link", { name: "Change machine" })).toBeNull();
  });

  it("compares the two revisions that stand in the address", async () => {
    const service = serviceFor("viewer")
      .on(one, answer(machineSchema, sampleMachine({ revision: 2, version: 2 })))
      .on(`${one}/revisions`, revisions(2))
      .on(
        `${one}/comparison`,
        answer(machineComparison, {
          from: 1,
          to: 2,
          same: false,
          differences: [{ pointer: "/stations/cas-1/target/v", from: -0.1, to: -0.12 }],
        }),
      );
    const { user } = renderConsole(`/machines/${machineId}`);
    await user.click(await screen.findByRole("button", { name: "Compare" }));
    const table = await screen.findByRole("table", { name: "1 difference" });
    expect(within(table).getByRole("row", { name: "/stations/cas-1/target/v -0.1 -0.12" })).toBeTruthy();
    expect(Object.fromEntries(service.callsTo(`${one}/comparison`)[0]?.query ?? [])).toEqual({
      from: "1",
      to: "2",
    });
  });

  it("says that there is no such machine", async () => {
    serviceFor("viewer").on(one, refusal("not_found"));
    renderConsole(`/machines/${machineId}`);
    expect(await screen.findByText("There is no machine with this id")).toBeTruthy();
  });
});

describe("changing a machine", () => {
  it("says what somebody else changed meanwhile, keeps the text, and goes on from there", async () => {
    const service = serviceFor("engineer").on(one, answer(machineSchema, sampleMachine()));
    const { user, router } = renderConsole(`/machines/${machineId}/edit`);
    const text = await screen.findByLabelText<HTMLTextAreaElement>(/^Document, begun from revision 1/);
    const mine = text.value.replace("Fellgate Unit 2", "Fellgate Unit Two");
    await user.clear(text);
    await user.click(text);
    await user.paste(mine);
    const store = screen.getByRole("button", { name: "Store as a new revision" });
    await user.click(store);
    expect(screen.getByText("This is needed.")).toBeTruthy();
    await user.type(screen.getByLabelText("Reason"), "Name corrected.");

    const newer = sampleMachine({ revision: 2, version: 2 });
    service
      .on(`POST /v1/machines/${machineId}/revisions`, refusal("version_stale"))
      .on(one, answer(machineSchema, newer))
      .on(
        `${one}/comparison`,
        answer(machineComparison, {
          from: 1,
          to: 2,
          same: false,
          differences: [{ pointer: "/plantTag", from: "FG-2-GT", to: "FG-2" }],
        }),
      );
    await user.click(store);
    const changed = await screen.findByRole("region", { name: "Changed meanwhile" });
    expect(await within(changed).findByText("/plantTag")).toBeTruthy();
    expect(text.value).toBe(mine);

    await user.click(within(changed).getByRole("button", { name: "Go on from revision 2" }));
    service
      .on(
        `POST /v1/machines/${machineId}/revisions`,
        answer(machineSchema, sampleMachine({ revision: 3 }), 201),
      )
      .on(`${one}/revisions`, revisions());
    await user.click(screen.getByRole("button", { name: "Store as a new revision" }));
    await waitFor(() => expect(router.state.location.pathname).toBe(`/machines/${machineId}`));
    const sent = service.callsTo(`POST /v1/machines/${machineId}/revisions`);
    expect(sent.map(({ headers }) => headers.get("if-match"))).toEqual(['"1"', '"2"']);
    expect(JSON.parse(sent[1]?.bodyText ?? "")).toEqual({
      document: JSON.parse(mine) as unknown,
      reason: "Name corrected.",
    });
  });
  const revisions = () => answer(machineRevisionPage, { data: [], nextCursor: null, limit: 50 });
});
