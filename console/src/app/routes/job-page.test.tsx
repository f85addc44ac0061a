import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { jobLog } from "../../../../shared/schemas/job-log.ts";
import { addedEntries, jobRecord, type JobRecord } from "../../../../shared/schemas/jobs.ts";
import { setUpChecks } from "../../../../shared/set-up-checks.ts";
import { answer, heldAnswer, noNetwork, refusal } from "../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../testing/render-console.tsx";
import { jobId, sampleJob, signedJob } from "../../testing/sample-job.ts";
import { everyRole, sampleId } from "../../testing/samples.ts";

const address = `/jobs/${jobId}`;
const route = `GET /v1/jobs/${jobId}`;
const added = answer(addedEntries, { ids: [sampleId(500)], version: 8, flags: [] }, 201);
const section = (name: string) => screen.findByRole("region", { name });

const open = (record: JobRecord = sampleJob(), role: (typeof everyRole)[number] = "engineer") => {
  const service = serviceFor(role).on(route, answer(jobRecord, record));
  return { service, ...renderConsole(address) };
};

describe("a job's page", () => {
  it("shows its shape while it is read", async () => {
    const held = heldAnswer(answer(jobRecord, sampleJob()));
    serviceFor("viewer").on(route, held.answerer);
    renderConsole(address);
    expect(await screen.findByText("Reading the job")).toBeTruthy();
    held.release();
    expect(await screen.findByLabelText("Title block")).toBeTruthy();
  });

  it("says that there is no such job, and where the others are", async () => {
    serviceFor("engineer").on(route, refusal("not_found"));
    renderConsole(address);
    expect(await screen.findByText("There is no job with this id")).toBeTruthy();
  });

  it("has the figure, the verdicts, the flags and the title block", async () => {
    const { container } = open();
    expect(await screen.findByRole("img", { name: "Figure 2. Plan and elevation" })).toBeTruthy();
    expect(within(await section("Flags")).getByText(/brg-1 was not read once more/)).toBeTruthy();
    const block = screen.getByLabelText("Title block");
    for (const words of ["Unit 2, major outage", "not signed", "draft", "Ines Alder", "Fellgate Works"]) {
      expect(block.textContent).toContain(words);
    }
    expect(container.textContent).not.toMatch(/NaN|Infinity|undefined|\[object/);
  });

  it("says what stands in the way of the signature, each kind with what to do next", async () => {
    open();
    const before = await section("Before the signature");
    expect(within(before).getAllByText(/^Next:/)).toHaveLength(1);
    expect(before.textContent).toContain("cas-1 exceeds its tolerance.");
    expect(within(before).getByRole("link", { name: "Go there" }).getAttribute("href")).toBe("#concessions");
    expect(screen.getByRole<HTMLButtonElement>("button", { name: "Sign job" }).disabled).toBe(true);
  });

  it("strikes a reading that counts no more, and keeps it in sight", async () => {
    const { user } = open();
    await user.click(await screen.findByText("2 readings, 1 of which count"));
    const table = await screen.findByRole("table", { name: "Readings of survey 1" });
    const [, counting, struck] = within(table).getAllByRole("row");
    expect(counting?.querySelector("s")).toBeNull();
    expect(struck?.querySelector("s")?.textContent).toContain("cas-1");
    expect(within(struck!).queryByRole("button")).toBeNull();
  });

  it.each(everyRole)("lets act who may, and lets everybody see: %s", async (role) => {
    open(sampleJob(), role);
    expect(await screen.findByLabelText("Title block")).toBeTruthy();
    const mayAct = role === "admin" || role === "engineer";
    expect(screen.queryByText("Open a survey") !== null).toBe(mayAct);
    expect(screen.queryByRole("button", { name: "Sign job" }) !== null).toBe(mayAct);
    expect(screen.queryAllByLabelText("Remark").length > 0).toBe(mayAct);
  });

  it("is frozen once signed, and opened again only with a reason", async () => {
    const { user, service } = open(signedJob());
    const signed = await section("Signed");
    expect(signed.textContent).toContain("This revision changes no more.");
    expect(screen.queryByText("Open a survey")).toBeNull();
    expect(screen.queryByLabelText("Remark")).toBeNull();
    await user.click(within(signed).getByRole("button", { name: "Open a new revision" }));
    const dialog = screen.getByRole("dialog", { name: "Open a new revision?" });
    const send = within(dialog).getByRole("button", { name: "Open revision" });
    await user.click(send);
    expect(within(dialog).getByText("This is needed.")).toBeTruthy();
    service.on(`POST /v1/jobs/${jobId}/revisions`, answer(jobRecord, sampleJob({ revision: 2 }), 201));
    await user.type(within(dialog).getByLabelText("Reason"), "brg-2 was read with the wrong gauge.");
    await user.click(send);
    await waitFor(() => expect(screen.queryByRole("dialog")).toBeNull());
    expect(JSON.parse(service.callsTo(`POST /v1/jobs/${jobId}/revisions`)[0]?.bodyText ?? "")).toEqual({
      reason: "brg-2 was read with the wrong gauge.",
    });
  });

  it("reads the log only when it is opened", async () => {
    const { user, service } = open();
    const log = answer(jobLog, {
      job: jobId,
      revision: 1,
      recordHash: `sha256:${"5".repeat(64)}`,
      entries: [
        {
          sequence: 1,
          id: sampleId(401),
          kind: "details",
          createdAt: "2026-11-04T06:30:00.000Z",
          author: { member: { id: sampleId(10), name: "Ines Alder" }, key: null },
          document: { title: "Unit 2" },
        },
      ],
      hashed: {},
    });
    service.on(`GET /v1/jobs/${jobId}/log`, log);
    const title = await screen.findByText("Every entry, in the order in which it was made");
    expect(service.callsTo(`GET /v1/jobs/${jobId}/log`)).toEqual([]);
    await user.click(title);
    expect(await screen.findByText("1. details")).toBeTruthy();
  });
});

describe("what is done on a job's page", () => {
  it("answers a check with its remark, and keeps the remark when that fails", async () => {
    const { user, service } = open();
    const checks = await section("Set-up checks");
    const [, second] = within(checks).getAllByRole("group");
    const remark = within(second!).getByLabelText("Remark");
    await user.type(remark, "Props out at 06:10");
    service.on(`POST /v1/jobs/${jobId}/checks`, noNetwork);
    await user.click(within(second!).getByRole("button", { name: "yes" }));
    expect((await within(second!).findByRole("alert")).textContent).toContain("The answer was not stored.");
    expect((remark as HTMLInputElement).value).toBe("Props out at 06:10");
    service.on(`POST /v1/jobs/${jobId}/checks`, added);
    await user.click(within(second!).getByRole("button", { name: "yes" }));
    await waitFor(() => expect((remark as HTMLInputElement).value).toBe(""));
    expect(JSON.parse(service.callsTo(`POST /v1/jobs/${jobId}/checks`).at(-1)?.bodyText ?? "")).toEqual({
      check: setUpChecks[1].id,
      answer: "yes",
      remark: "Props out at 06:10",
    });
  });

  it("asks for the reason of an unusual move only when the service does", async () => {
    const { user, service } = open();
    await user.click(await screen.findByText("Log a move"));
    const moves = await section("Moves");
    expect(within(moves).queryByLabelText("Reason for this order")).toBeNull();
    await user.type(within(moves).getByLabelText("feet v"), "0,3");
    const detail = "The bearing moves before a casing that is planned.";
    service.on(
      `POST /v1/jobs/${jobId}/moves`,
      refusal("reason_required", { errors: [{ pointer: "/reason", code: "reason_required", detail }] }),
    );
    await user.click(within(moves).getByRole("button", { name: "Log move" }));
    const reason = await within(moves).findByLabelText("Reason for this order");
    expect(
      document.getElementById(reason.getAttribute("aria-describedby")?.split(" ").at(-1) ?? "")?.textContent,
    ).toBe(detail);
    service.on(`POST /v1/jobs/${jobId}/moves`, added);
    await user.type(reason, "The crane is here today only.");
    await user.click(within(moves).getByRole("button", { name: "Log move" }));
    await waitFor(() => expect(within(moves).queryByRole("alert")).toBeNull());
    expect(JSON.parse(service.callsTo(`POST /v1/jobs/${jobId}/moves`).at(-1)?.bodyText ?? "")).toMatchObject({
      component: "casing",
      finished: true,
      moved: [{ support: "feet", h: 0, v: 0.3 }],
      reason: "The crane is here today only.",
    });
  });

  it("shows faults of a file of readings by line, and stores only one without", async () => {
    const { user, service } = open();
    await user.click(await screen.findByText("Upload a file of readings"));
    const previews = `POST /v1/jobs/${jobId}/surveys/${sampleId(410)}/reading-previews`;
    const file = { name: "found.csv", bytes: 12, sha256: "6".repeat(64) };
    const columns = [{ header: "station", column: "station", unit: null }];
    service.on(previews, {
      status: 200,
      body: {
        file,
        delimiter: ",",
        decimal: "point",
        columns,
        readings: [],
        faults: [{ line: 7, column: "reading (mm)", code: "wrong_type", detail: "No number stands here." }],
      },
    });
    await user.upload(
      screen.getByLabelText("File of readings, CSV or XLSX"),
      new File(["station\nbrg-1"], "found.csv", { type: "application/vnd.ms-excel" }),
    );
    const faults = await screen.findByRole("table", { name: "Faults by line" });
    expect(within(faults).getByRole("row", { name: /^7 reading \(mm\) No number/ })).toBeTruthy();
    expect(screen.queryByRole("button", { name: /^Store/ })).toBeNull();
    const [call] = service.callsTo(previews);
    expect(call?.headers.get("content-type")).toBe("text/csv");
    expect(call?.query.get("name")).toBe("found.csv");
    expect(await call?.file?.text()).toBe("station\nbrg-1");
  });

  it("signs with the password again, keeps it nowhere, and says when it is wrong", async () => {
    const { user, service } = open(sampleJob({ signOff: { ready: true, obstacles: [] } }));
    await user.click(await screen.findByRole("button", { name: "Sign job" }));
    const dialog = screen.getByRole("dialog", { name: "Sign this job?" });
    const signature = `POST /v1/jobs/${jobId}/signature`;
    const detail = "This is not the password you sign in with.";
    service.on(
      signature,
      refusal("password_wrong", { errors: [{ pointer: "/password", code: "password_wrong", detail }] }),
    );
    await user.type(within(dialog).getByLabelText("What your signature says"), "Reviewed and accepted.");
    await user.type(within(dialog).getByLabelText("Your password"), "a long and private sentence");
    await user.click(within(dialog).getByRole("button", { name: "Sign job" }));
    expect((await within(dialog).findByRole("alert")).textContent).toContain("The job is not signed.");
    expect(within(dialog).getByLabelText("Your password").getAttribute("aria-invalid")).toBe("true");

    service.on(signature, answer(jobRecord, signedJob(), 201)).on(route, answer(jobRecord, signedJob()));
    await user.click(within(dialog).getByRole("button", { name: "Sign job" }));
    expect(await section("Signed")).toBeTruthy();
    expect(screen.queryByRole("dialog")).toBeNull();
    for (const store of [sessionStorage, localStorage]) {
      expect(JSON.stringify(Object.entries(store))).not.toContain("private sentence");
    }
    expect(document.body.innerHTML).not.toContain("private sentence");
  });

  it("stores a reading typed with decimal commas, and keeps what was typed when that fails", async () => {
    const { user, service } = open();
    await user.click(await screen.findByText("Add a reading"));
    const readings = `POST /v1/jobs/${jobId}/surveys/${sampleId(410)}/readings`;
    service.on(readings, refusal("unavailable"));
    await user.type(screen.getByLabelText("reading, row 1"), "0,12");
    await user.type(screen.getByLabelText("reading, row 2"), "x");
    await user.click(screen.getByRole("button", { name: "Store reading" }));
    expect(await screen.findByText(/row 2, reading: A number is needed/)).toBeTruthy();
    expect(service.callsTo(readings)).toEqual([]);
    await user.clear(screen.getByLabelText("reading, row 2"));
    await user.type(screen.getByLabelText("reading, row 2"), "0,05");
    await user.click(screen.getByRole("button", { name: "Store reading" }));
    expect(await screen.findByText("The reading was not stored.")).toBeTruthy();
    expect(screen.getByLabelText<HTMLInputElement>("reading, row 1").value).toBe("0,12");
    service.on(readings, added);
    await user.click(screen.getByRole("button", { name: "Store reading" }));
    expect(await screen.findByText("The reading of brg-1 is stored.")).toBeTruthy();
    expect(JSON.parse(service.callsTo(readings).at(-1)?.bodyText ?? "")).toMatchObject({
      readings: [
        {
          station: "brg-1",
          readings: [
            { clockDeg: 0, reading: 0.12 },
            { clockDeg: 90, reading: 0.05 },
          ],
        },
      ],
    });
    expect(screen.getByLabelText<HTMLInputElement>("reading, row 1").value).toBe("");
  });
});
