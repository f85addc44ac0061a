import { request as httpRequest, type IncomingMessage } from "node:http";
import { once } from "node:events";
import { setTimeout as sleep } from "node:timers/promises";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { asFoundReadings } from "../../server/demo/fellgate-job.ts";
import type { IndicationAnswer } from "../../shared/schemas/indications.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";

describe("following a move", () => {
  let app: ListeningApp;
  let job: JobDriver;
  let record: JobRecord;
  let plan: string;
  beforeAll(async () => {
    app = await openListeningApp();
    job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.start();
    const found = await job.survey("as_found", asFoundReadings());
    plan = await job.add("/plans", { survey: found });
    record = await job.read();
  }, 60_000);
  afterAll(() => app.close());

  const component = "compressor-casing";
  const at = "2026-11-06T10:05:00Z";
  const centreOf = (station: string, moved: { h: number; v: number }) => {
    const fit = record.surveys[0]?.result?.fits.find(({ id }) => id === station);
    return { station, centre: { h: (fit?.centre.h ?? 0) + moved.h, v: (fit?.centre.v ?? 0) + moved.v } };
  };
  const planned = () => record.plans[0]?.result.components.find(({ id }) => id === component)?.realised ?? [];
  /** The casing's sights when it has come `share` of the way. */
  const sights = (share: number) => {
    const [first, last] = [planned()[0], planned().at(-1)];
    const supports = record.machine.components?.find(({ id }) => id === component)?.supports ?? [];
    const zs = [supports[0]?.z ?? 0, supports.at(-1)?.z ?? 1];
    return ["cas-1", "cas-5"].map((station) => {
      const z = record.machine.stations.find(({ id }) => id === station)?.z ?? 0;
      const part = (z - (zs[0] ?? 0)) / ((zs[1] ?? 1) - (zs[0] ?? 0));
      const between = (plane: "h" | "v") =>
        share * ((first?.[plane] ?? 0) + part * ((last?.[plane] ?? 0) - (first?.[plane] ?? 0)));
      return centreOf(station, { h: between("h"), v: between("v") });
    });
  };
  const indicate = async (body: object) => {
    const { status, body: answer } = await job.post(`/v1/jobs/${job.id}/indications`, {
      plan,
      component,
      at,
      ...body,
    });
    return { status, answer: answer as unknown as IndicationAnswer };
  };

  it("answers half way with half of the move left at every support", async () => {
    const { status, answer } = await indicate({ sights: sights(0.5) });
    expect([status, answer.done, answer.stop]).toEqual([201, false, []]);
    for (const { support, left } of answer.supports) {
      const wanted = planned().find((one) => one.support === support);
      expect(Math.abs((left.h ?? Number.NaN) - (wanted?.h ?? 0) / 2)).toBeLessThan(1e-9); // mm
      expect(Math.abs((left.v ?? Number.NaN) - (wanted?.v ?? 0) / 2)).toBeLessThan(1e-9); // mm
    }
  });

  it("says when to stop: there, gone past, or a neighbour that moved more than it may", async () => {
    const there = await indicate({ sights: sights(1) });
    expect([there.answer.done, there.answer.stop.map(({ code }) => code)]).toEqual([true, ["move_complete"]]);
    const past = await indicate({ sights: sights(1.5) });
    expect(new Set(past.answer.stop.map(({ code }) => code))).toEqual(new Set(["gone_past"]));
    const neighbour = await indicate({ sights: [...sights(0.5), centreOf("brg-1", { h: 0, v: 0.05 })] });
    expect(neighbour.answer.neighbours).toMatchObject([{ station: "brg-1", passed: true }]);
    expect(neighbour.answer.stop).toMatchObject([{ code: "neighbour_passed", station: "brg-1" }]);
  });

  it("refuses what the job does not have, at its place", async () => {
    const { answer } = await indicate({ sights: [centreOf("brg-77", { h: 0, v: 0 })] });
    expect(answer).toMatchObject({ errors: [{ pointer: "/sights/0/station", code: "unknown_reference" }] });
    expect((await indicate({})).answer).toMatchObject({ code: "too_few_items" });
    expect((await indicate({ plan: app.deps.newId(), sights: sights(1) })).status).toBe(404);
  });

  const open = (method: string, path: string, headers: Record<string, string> = {}) =>
    httpRequest(`${app.url}/v1/jobs/${job.id}/${path}`, {
      method,
      headers: { Authorization: `Bearer ${job.token}`, ...headers },
    });
  const collect = (response: IncomingMessage) => {
    const heard = { text: "" };
    response.setEncoding("utf8").on("data", (text: string) => (heard.text += text));
    return heard;
  };
  const until = async (condition: () => boolean) => {
    for (let tries = 0; tries < 200 && !condition(); tries += 1) await sleep(25);
    expect(condition()).toBe(true);
  };

  it("answers a stream line by line while it is sent, a bad line with its problem, and says where it ended", async () => {
    const sender = open("POST", "indication-stream", { "Content-Type": "application/x-ndjson" });
    const line = (body: object) => `${JSON.stringify({ plan, component, at, ...body })}\n`;
    const [answered] = await Promise.all([
      once(sender, "response") as Promise<[IncomingMessage]>,
      Promise.resolve(sender.write(line({ sights: sights(0.25) }))),
    ]);
    const heard = collect(answered[0]);
    await until(() => heard.text.split("\n").length > 1);
    sender.write('{"plan": 1}\n');
    await until(() => heard.text.split("\n").length > 2);
    sender.end(line({ sights: sights(0.75) }));
    await once(answered[0], "end");
    const lines = heard.text
      .trimEnd()
      .split("\n")
      .map((text) => JSON.parse(text) as Record<string, unknown>);
    expect(lines.map((one) => one["done"] ?? one["code"] ?? one["end"])).toEqual([
      false,
      "several_faults",
      false,
      true,
    ]);
    expect(lines.at(-1)).toEqual({ end: true, lines: 3 });
  });

  it("tells whoever watches, goes on where a stream was cut, and repeats nothing", async () => {
    const watch = async (headers: Record<string, string> = {}) => {
      const watcher = open("GET", "events", { Accept: "text/event-stream", ...headers });
      watcher.end();
      const [response] = (await once(watcher, "response")) as [IncomingMessage];
      return { watcher, response, heard: collect(response) };
    };
    const first = await watch();
    expect(first.response.headers["content-type"]).toContain("text/event-stream");
    const { answer } = await indicate({ sights: sights(0.3) });
    await until(() => first.heard.text.includes(answer.id));
    expect(first.heard.text).toContain(`id: ${answer.id}\nevent: indication\ndata: {`);
    first.watcher.destroy();
    const later = await indicate({ sights: sights(0.4) });
    const comment = await job.add("/comments", { text: "Bolts loose." });
    const second = await watch({ "Last-Event-ID": answer.id });
    await until(() => second.heard.text.includes(comment));
    expect(second.heard.text).toContain(later.answer.id);
    expect(second.heard.text).not.toContain(answer.id);
    second.watcher.destroy();
  });

  it("ends a watcher whose key is revoked", async () => {
    const key = await job.works.key("jobs:read");
    const watcher = httpRequest(`${app.url}/v1/jobs/${job.id}/events`, {
      headers: { Authorization: `Bearer ${key.secret}`, Accept: "text/event-stream" },
    });
    watcher.end();
    const [response] = (await once(watcher, "response")) as [IncomingMessage];
    const heard = collect(response);
    await app
      .call()
      .post(`/v1/keys/${key.id}/revoke`)
      .set("Authorization", `Bearer ${job.works.tokens.admin}`);
    await once(response, "end");
    expect(heard.text).toContain('event: end\ndata: {"reason":"credential_ended"}');
  }, 15_000);

  it("lets one credential watch eight times at once and no more", async () => {
    const key = await job.works.key("jobs:read");
    const watchers = Array.from({ length: 9 }, () => {
      const watcher = httpRequest(`${app.url}/v1/jobs/${job.id}/events`, {
        headers: { Authorization: `Bearer ${key.secret}` },
      });
      watcher.end();
      return watcher;
    });
    const responses = await Promise.all(
      watchers.map(async (watcher) => {
        const [response] = (await once(watcher, "response")) as [IncomingMessage];
        response.resume();
        return response.statusCode;
      }),
    );
    expect(responses.filter((status) => status === 200)).toHaveLength(8);
    expect(responses.filter((status) => status === 429)).toHaveLength(1);
    for (const watcher of watchers) watcher.destroy();
  });
});
