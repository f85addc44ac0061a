import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { jobPage, jobRecord, type JobSummary } from "../../../../shared/schemas/jobs.ts";
import { machinePage, machineSchema } from "../../../../shared/schemas/machines.ts";
import { answer, heldAnswer, noNetwork, refusal, type FakeService } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import {
  jobId,
  machineId,
  sampleJob,
  sampleJobSummary,
  sampleMachine,
  sampleMachineSummary,
} from "../../testing/sample-job.ts";
import { everyRole } from "../../testing/samples.ts";

const route = "GET /v1/jobs";
const pageOf = (data: JobSummary[], nextCursor: string | null = null) =>
  answer(jobPage, { data, nextCursor, limit: 25 });
const withMachines = (service: FakeService): FakeService =>
  service.on(
    "GET /v1/machines",
    answer(machinePage, { data: [sampleMachineSummary()], nextCursor: null, limit: 200 }),
  );

describe("the list of jobs", () => {
  it("shows its shape while it is read", async () => {
    const held = heldAnswer(pageOf([sampleJobSummary()]));
    withMachines(serviceFor("viewer")).on(route, held.answerer);
    renderConsole("/jobs");
    expect(await screen.findByText("Reading the jobs")).toBeTruthy();
    held.release();
    expect(await screen.findByRole("link", { name: "Unit 2, major outage" })).toBeTruthy();
  });

  it("says what failed, and reads again when asked", async () => {
    const service = withMachines(serviceFor("engineer")).on(route, refusal("unavailable"));
    const { user } = renderConsole("/jobs");
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("The jobs could not be read.");
    service.on(route, pageOf([sampleJobSummary()]));
    await user.click(within(alert).getByRole("button", { name: "Try again" }));
    expect(await screen.findByRole("link", { name: "Unit 2, major outage" })).toBeTruthy();
  });

  it("tells no jobs from none that fit, and the way on from each", async () => {
    withMachines(serviceFor("engineer")).on(route, pageOf([]));
    renderConsole("/jobs");
    expect(await screen.findByText("No jobs yet")).toBeTruthy();
    expect(screen.getByRole("link", { name: "See the machines" }).getAttribute("href")).toBe("/machines");
  });

  it("keeps its filters in the address and sends them on", async () => {
    const service = withMachines(serviceFor("engineer")).on(route, pageOf([]));
    const { user, router } = renderConsole("/jobs?state=signed");
    expect(await screen.findByText("No job fits these filters")).toBeTruthy();
    const form = screen.getByRole("search", { name: "Filter jobs" });
    await within(form).findByRole("option", { name: "Fellgate Unit 2" });
    await user.selectOptions(within(form).getByLabelText("Machine"), machineId);
    await user.type(within(form).getByLabelText("Title or id"), "outage");
    await user.click(within(form).getByRole("button", { name: "Apply filters" }));
    await waitFor(() => expect(router.state.location.search).toContain("q=outage"));
    const asked = service.callsTo(route).at(-1)?.query;
    expect(Object.fromEntries(asked ?? [])).toMatchObject({ machineId, state: "signed", q: "outage" });
  });

  it.each(everyRole)("offers to start a job to who may: %s", async (role) => {
    withMachines(serviceFor(role)).on(route, pageOf([sampleJobSummary()], "next"));
    renderConsole("/jobs");
    expect(await screen.findByRole("link", { name: "Older" })).toBeTruthy();
    const mayStart = role === "admin" || role === "engineer";
    expect(screen.queryByRole("link", { name: "Start a job" }) !== null).toBe(mayStart);
  });
});

describe("starting a job", () => {
  const open = async () => {
    const service = withMachines(serviceFor("engineer")).on(
      `GET /v1/machines/${machineId}`,
      answer(machineSchema, sampleMachine()),
    );
    const page = renderConsole(`/jobs/new?machine=${machineId}`);
    await screen.findByLabelText("Title");
    return { ...page, service };
  };

  it("asks for what is missing, at its field, and sends nothing", async () => {
    const { user, service } = await open();
    await user.type(screen.getByLabelText("Description, instrument 1"), "Gauge");
    await user.click(screen.getByRole("button", { name: "Start job" }));
    const title = screen.getByLabelText("Title");
    expect(title.getAttribute("aria-invalid")).toBe("true");
    expect(screen.getByLabelText("Id, instrument 1").getAttribute("aria-invalid")).toBe("true");
    expect(service.callsTo("POST /v1/jobs")).toEqual([]);
  });

  it("sends what was typed, with the machine's reference stations, and opens the job", async () => {
    const { user, service, router } = await open();
    service.on("POST /v1/jobs", noNetwork).on(`GET /v1/jobs/${jobId}`, answer(jobRecord, sampleJob()));
    await user.type(screen.getByLabelText("Title"), "Unit 2, major outage");
    await user.type(screen.getByLabelText("Id, instrument 1"), "gauge-1");
    await user.type(screen.getByLabelText("Description, instrument 1"), "Turned gauge");
    await user.type(screen.getByLabelText("u of a reading, instrument 1"), "0,008");
    await user.click(screen.getByRole("button", { name: "Start job" }));
    expect((await screen.findByRole("alert")).textContent).toContain("The job was not started.");
    expect(screen.getByLabelText<HTMLInputElement>("Title").value).toBe("Unit 2, major outage");

    service.on("POST /v1/jobs", answer(jobRecord, sampleJob(), 201));
    await user.click(screen.getByRole("button", { name: "Start job" }));
    await waitFor(() => expect(router.state.location.pathname).toBe(`/jobs/${jobId}`));
    const [first, second] = service.callsTo("POST /v1/jobs");
    expect(second?.headers.get("idempotency-key")).toBe(first?.headers.get("idempotency-key"));
    expect(JSON.parse(second?.bodyText ?? "")).toEqual({
      machineId,
      details: {
        title: "Unit 2, major outage",
        seen: "downstream",
        axis: { method: "two_station", through: ["brg-1", "brg-2"] },
        instruments: [{ id: "gauge-1", description: "Turned gauge", readingUncertainty: 0.008 }],
      },
    });
  });
});
