import { screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { indicationAnswer, type IndicationAnswer } from "../../../../../shared/schemas/indications.ts";
import { jobRecord, type JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { FakeEvents } from "../../../testing/fake-events.ts";
import { answer, noNetwork, refusal } from "../../../testing/fake-service.ts";
import { renderConsole, serviceFor } from "../../../testing/render-console.tsx";
import { jobId, sampleJob, signedJob } from "../../../testing/sample-job.ts";
import { everyRole, sampleId } from "../../../testing/samples.ts";

const route = `GET /v1/jobs/${jobId}`;
const eventsRoute = `GET /v1/jobs/${jobId}/events`;
const indications = `POST /v1/jobs/${jobId}/indications`;
const plan = sampleJob().plans[0]?.id ?? "";

/** The sample job, its casing with one indicator on top. */
function jobWithIndicator(overrides: Partial<JobRecord> = {}): JobRecord {
  const job = sampleJob(overrides);
  const indicators = [{ id: "di-1", component: "casing", z: 1200, clockDeg: 0 }];
  return { ...job, machine: { ...job.machine, indicators } };
}

let count = 0;
function indication(overrides: Partial<IndicationAnswer> = {}): IndicationAnswer {
  count += 1;
  return indicationAnswer.parse({
    id: sampleId(600 + count),
    plan,
    component: "casing",
    at: "2026-11-06T10:05:00.000Z",
    createdAt: new Date(Date.parse("2026-11-06T10:05:01.000Z") + 1_000 * count).toISOString(),
    person: null,
    indicators: [{ id: "di-1", reading: 0.1 }],
    sights: [],
    units: { offset: "mm" },
    supports: [{ support: "feet", moved: { h: null, v: 0.1 }, left: { h: null, v: 0.21 } }],
    done: false,
    neighbours: [],
    stop: [],
    ...overrides,
  });
}
const passed = (isPassed: boolean): Partial<IndicationAnswer> => ({
  neighbours: [
    {
      station: "brg-1",
      change: { h: 0, v: isPassed ? 0.05 : 0.01 },
      stopAt: { h: [-0.02, 0.02], v: [-0.02, 0.02] },
      passed: isPassed,
    },
  ],
  stop: isPassed
    ? [
        {
          code: "neighbour_passed",
          detail: "brg-1 has moved more than it may.",
          station: "brg-1",
          support: null,
        },
      ]
    : [],
});

async function open(record = jobWithIndicator(), role: (typeof everyRole)[number] = "engineer") {
  const events = new FakeEvents();
  const service = serviceFor(role).on(route, answer(jobRecord, record)).on(eventsRoute, events.answerer);
  const view = renderConsole(`/jobs/${jobId}`);
  const follow = within(await screen.findByRole("region", { name: "Follow a move" }));
  const state = () => follow.getByRole("status", { name: "Live state" }).textContent ?? "";
  const goLive = async () => {
    await view.user.click(follow.getByRole("button", { name: "Follow live" }));
    await waitFor(() => expect(state()).toMatch(/^live/));
  };
  return { events, service, ...view, follow, state, goLive };
}

describe("following a move", () => {
  it("opens no stream until it is asked for, then shows what is left as it is told", async () => {
    const { events, service, follow, state, goLive } = await open();
    expect([state().split(":")[0], service.callsTo(eventsRoute)]).toEqual(["stopped", []]);
    await goLive();
    const [call] = service.callsTo(eventsRoute);
    expect(call?.headers.get("authorization")).toBe("Bearer token-of-engineer");
    expect([call?.headers.get("accept"), call?.headers.get("last-event-id")]).toEqual([
      "text/event-stream, application/problem+json",
      null,
    ]);
    events.say("indication", indication());
    const left = follow.getByRole("table", { name: "Left to move: + right, + up" });
    expect(await within(left).findByRole("row", { name: /^feet – \+0\.2100 – \+0\.1000/ })).toBeTruthy();
    expect(follow.getByText("Nothing in these readings says stop.")).toBeTruthy();
    expect(follow.getByRole("cell", { name: /di-1 \+0\.1000/ })).toBeTruthy();
  });

  it("says which neighbour passed its limit, in words with its code, until that one is read again", async () => {
    const { events, follow, goLive } = await open();
    const neighbours = follow.getByRole("table", { name: /^Neighbours/ });
    expect(within(neighbours).getByRole("row", { name: /^brg-1 not read/ })).toBeTruthy();
    await goLive();
    events.say("indication", indication(passed(true)));
    events.say("indication", indication());
    const status = follow.getByRole("status", { name: "Whether to stop" });
    await within(status).findByText("brg-1 has moved more than it may.");
    expect(status.textContent).toBe("Stop:brg-1 has moved more than it may.neighbour_passed");
    expect(within(neighbours).getByRole("row", { name: /^brg-1 passed its limit .*\+0\.0500/ })).toBeTruthy();
    events.say("indication", indication(passed(false)));
    await waitFor(() => expect(status.textContent).toBe("Nothing in these readings says stop."));
    expect(within(neighbours).getByRole("row", { name: /^brg-1 within/ })).toBeTruthy();
  });

  it("shows many readings at once as one change, the newest eight of them", async () => {
    const { events, follow, goLive } = await open();
    await goLive();
    for (let reading = 1; reading <= 30; reading += 1) {
      events.say("indication", indication({ indicators: [{ id: "di-1", reading: reading / 100 }] }));
    }
    const table = await follow.findByRole("table", { name: "Last readings" });
    expect(within(table).getAllByRole("row")).toHaveLength(9);
    expect(within(table).getAllByRole("row")[1]?.textContent).toContain("di-1 +0.3000");
    expect(follow.getByRole("button", { name: "Show 22 earlier readings" })).toBeTruthy();
  });

  it("keeps apart what other components and other plans are told of", async () => {
    const { events, follow, goLive } = await open();
    await goLive();
    events.say("indication", indication({ component: "exhaust" }));
    events.say("indication", indication({ plan: sampleId(999) }));
    events.say("indication", indication({ indicators: [{ id: "di-1", reading: 0.07 }] }));
    const table = await follow.findByRole("table", { name: "Last readings" });
    expect(within(table).getAllByRole("row")).toHaveLength(2);
  });

  it("says that it reconnects, goes on where it was cut, and says when it is live again", async () => {
    const { events, service, state, goLive } = await open();
    await goLive();
    events.say("indication", indication());
    service.on(eventsRoute, noNetwork);
    events.cut();
    await waitFor(() => expect(state()).toMatch(/^reconnecting/));
    await waitFor(() => expect(state()).toContain("The service cannot be reached."));
    service.on(eventsRoute, events.answerer);
    await waitFor(() => expect(state()).toMatch(/^live/));
    expect(service.callsTo(eventsRoute).at(-1)?.headers.get("last-event-id")).toBe("41");
  });

  it("stops for good where the service refuses, and says why", async () => {
    const { service, follow, state, user } = await open();
    service.on(eventsRoute, refusal("not_found", { detail: "The job is not there any more." }));
    await user.click(follow.getByRole("button", { name: "Follow live" }));
    await waitFor(() => expect(state()).toBe("stopped: The job is not there any more."));
    expect(service.callsTo(eventsRoute)).toHaveLength(1);
  });

  it("asks for a new token when the old one has ended", async () => {
    const { service, events, follow, state, user } = await open();
    let asked = 0;
    service.on(eventsRoute, () => (asked++ === 0 ? refusal("session_expired") : events.answerer()));
    await user.click(follow.getByRole("button", { name: "Follow live" }));
    await waitFor(() => expect(state()).toMatch(/^live/));
    expect(service.callsTo("POST /v1/sessions/refresh")).toHaveLength(2);
  });

  it("lets the stream go when it is told to stop, and when the page is left", async () => {
    const { events, follow, state, goLive, user, router } = await open();
    await goLive();
    await user.click(follow.getByRole("button", { name: "Stop following" }));
    await waitFor(() => expect([events.released, state().split(":")[0]]).toEqual([1, "stopped"]));
    await goLive();
    await router.navigate("/guide/conventions");
    await waitFor(() => expect([events.opened, events.released]).toEqual([2, 2]));
  });

  it("begins at the job's first event when earlier readings are asked for", async () => {
    const { service, follow, user } = await open();
    await user.click(follow.getByRole("button", { name: "Show earlier readings" }));
    await waitFor(() => expect(service.callsTo(eventsRoute)[0]?.headers.get("last-event-id")).toBe("0"));
  });

  it("reads the job anew, once, when its log has grown", async () => {
    const { events, service, goLive } = await open();
    await goLive();
    const before = service.callsTo(route).length;
    for (const sequence of [8, 9, 10]) {
      events.say("entry", { id: sampleId(700 + sequence), kind: "move", revision: 1, sequence });
    }
    await waitFor(() => expect(service.callsTo(route)).toHaveLength(before + 1));
  });
});

describe("a reading entered by hand", () => {
  const enter = async () => {
    const page = await open();
    await page.user.click(page.follow.getByText("Enter a reading"));
    return {
      ...page,
      send: () => page.user.click(page.follow.getByRole("button", { name: "Send reading" })),
    };
  };

  it("goes with decimal commas, and its answer is shown without a stream", async () => {
    const { follow, service, user, send } = await enter();
    expect(follow.getByText("0°, z 1200 mm; planned +0.1550, then +0.3100")).toBeTruthy();
    service.on(indications, answer(indicationAnswer, indication(), 201));
    await user.type(follow.getByLabelText("di-1"), "0,1");
    await user.type(follow.getByLabelText("brg-1 h"), "0,02");
    await user.type(follow.getByLabelText("brg-1 v"), "\u22120,3");
    await user.type(follow.getByLabelText("Read by"), "Sol Winter");
    await send();
    await follow.findByRole("row", { name: /^feet – \+0\.2100/ });
    const { at, ...sent } = JSON.parse(service.callsTo(indications)[0]?.bodyText ?? "") as { at: string };
    expect(Math.abs(Date.now() - Date.parse(at))).toBeLessThan(60_000); // ms
    expect(sent).toEqual({
      plan,
      component: "casing",
      person: "Sol Winter",
      indicators: [{ id: "di-1", reading: 0.1 }],
      sights: [{ station: "brg-1", centre: { h: 0.02, v: -0.3 } }],
    });
    expect(follow.getByLabelText<HTMLInputElement>("di-1").value).toBe("");
    expect(follow.getByLabelText<HTMLInputElement>("Read by").value).toBe("Sol Winter");
  });

  it("is one reading, though its answer comes from the call and from the stream", async () => {
    const { follow, service, user, send, events, goLive } = await enter();
    await goLive();
    const same = indication();
    service.on(indications, answer(indicationAnswer, same, 201));
    await user.type(follow.getByLabelText("di-1"), "0.1");
    await send();
    events.say("indication", same);
    events.say("indication", indication());
    const table = await follow.findByRole("table", { name: "Last readings" });
    await waitFor(() => expect(within(table).getAllByRole("row")).toHaveLength(3));
  });

  it("keeps what was typed when it is not taken, and is stored once when it is sent again", async () => {
    const { follow, service, user, send } = await enter();
    await user.type(follow.getByLabelText("di-1"), "0.1");
    service.on(indications, noNetwork);
    await send();
    expect((await follow.findByRole("alert")).textContent).toContain("The reading was not stored.");
    expect(follow.getByLabelText<HTMLInputElement>("di-1").value).toBe("0.1");
    service.on(indications, answer(indicationAnswer, indication(), 201));
    await send();
    await waitFor(() => expect(follow.queryByRole("alert")).toBeNull());
    const [first, second] = service.callsTo(indications);
    expect(second?.bodyText).toBe(first?.bodyText);
    expect(second?.headers.get("idempotency-key")).toBe(first?.headers.get("idempotency-key"));
  });

  it("is refused where nothing, no number, or half a sight was typed, each at its place", async () => {
    const { follow, service, user, send } = await enter();
    await send();
    expect(follow.getByRole("alert").textContent).toBe("Type at least one reading.");
    await user.type(follow.getByLabelText("di-1"), "x");
    await user.type(follow.getByLabelText("cas-1 v"), "0.1");
    await send();
    for (const name of ["di-1", "cas-1 h"]) {
      expect(follow.getByLabelText(name).getAttribute("aria-invalid")).toBe("true");
    }
    expect(follow.getByLabelText("cas-1 v").getAttribute("aria-invalid")).toBe("false");
    expect(service.callsTo(indications)).toEqual([]);
  });

  it("shows the service's own fault at its field", async () => {
    const { follow, service, user, send } = await enter();
    const detail = "No station of the plan's survey.";
    service.on(
      indications,
      refusal("unknown_reference", {
        errors: [{ pointer: "/sights/0/station", code: "unknown_reference", detail }],
      }),
    );
    await user.type(follow.getByLabelText("cas-1 h"), "0");
    await user.type(follow.getByLabelText("cas-1 v"), "0");
    await send();
    expect((await follow.findAllByText(detail)).length).toBeGreaterThan(0);
    expect(follow.getByLabelText("cas-1 h").getAttribute("aria-invalid")).toBe("true");
  });

  it.each(everyRole)("is entered by who may, and everybody else is told why not: %s", async (role) => {
    const { follow } = await open(jobWithIndicator(), role);
    const may = role === "admin" || role === "engineer";
    expect(follow.queryByText("Enter a reading") !== null).toBe(may);
    expect(follow.queryByText(/^You may follow a move and not enter readings/) !== null).toBe(!may);
  });

  it("is not entered into a signed job, nor before there is a plan, nor where nothing moves", async () => {
    const signed = await open(signedJob());
    expect(signed.follow.getByText("The job is signed: it takes no more readings.")).toBeTruthy();
    signed.unmount();
    const unplanned = await open(jobWithIndicator({ plans: [] }));
    expect(unplanned.follow.getByText(/^Plan moves first/)).toBeTruthy();
    unplanned.unmount();
    const [first] = jobWithIndicator().plans;
    const still = first && { ...first, result: { ...first.result, steps: [] } };
    const { follow } = await open(jobWithIndicator({ plans: still ? [still] : [] }));
    expect(follow.getByText("The newest plan moves nothing.")).toBeTruthy();
  });
});
