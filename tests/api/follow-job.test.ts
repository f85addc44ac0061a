import { request as httpRequest, type IncomingMessage } from "node:http";
import { once } from "node:events";
import { setTimeout as sleep } from "node:timers/promises";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";
import { PlannedMove } from "../support/planned-move.ts";

describe("following a move", () => {
  let app: ListeningApp;
  let move: PlannedMove;
  beforeAll(async () => {
    app = await openListeningApp();
    move = await PlannedMove.make(app);
  }, 60_000);
  afterAll(() => app.close());

  it("answers half way with half of the move left at every support", async () => {
    const { status, answer } = await move.indicate({ sights: move.sights(0.5) });
    expect([status, answer.done, answer.stop]).toEqual([201, false, []]);
    for (const { support, left } of answer.supports) {
      const wanted = move.planned.find((one) => one.support === support);
      expect(Math.abs((left.h ?? Number.NaN) - (wanted?.h ?? 0) / 2)).toBeLessThan(1e-9); // mm
      expect(Math.abs((left.v ?? Number.NaN) - (wanted?.v ?? 0) / 2)).toBeLessThan(1e-9); // mm
    }
  });

  it("says when to stop: there, gone past, or a neighbour that moved more than it may", async () => {
    const there = await move.indicate({ sights: move.sights(1) });
    expect([there.answer.done, there.answer.stop.map(({ code }) => code)]).toEqual([true, ["move_complete"]]);
    const past = await move.indicate({ sights: move.sights(1.5) });
    expect(new Set(past.answer.stop.map(({ code }) => code))).toEqual(new Set(["gone_past"]));
    const neighbour = await move.indicate({
      sights: [...move.sights(0.5), move.sight("brg-1", { h: 0, v: 0.05 })],
    });
    expect(neighbour.answer.neighbours).toMatchObject([{ station: "brg-1", passed: true }]);
    expect(neighbour.answer.stop).toMatchObject([{ code: "neighbour_passed", station: "brg-1" }]);
  });

  it("refuses what the job does not have, at its place", async () => {
    const { answer } = await move.indicate({ sights: [move.sight("brg-77", { h: 0, v: 0 })] });
    expect(answer).toMatchObject({ errors: [{ pointer: "/sights/0/station", code: "unknown_reference" }] });
    expect((await move.indicate({})).answer).toMatchObject({ code: "too_few_items" });
    expect((await move.indicate({ plan: app.deps.newId(), sights: move.sights(1) })).status).toBe(404);
  });

  const open = (method: string, path: string, headers: Record<string, string> = {}) =>
    httpRequest(`${app.url}/v1/jobs/${move.job.id}/${path}`, {
      method,
      headers: { Authorization: `Bearer ${move.job.token}`, ...headers },
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
    const line = (body: object) => `${JSON.stringify(move.indication(body))}\n`;
    const [answered] = await Promise.all([
      once(sender, "response") as Promise<[IncomingMessage]>,
      Promise.resolve(sender.write(line({ sights: move.sights(0.25) }))),
    ]);
    const heard = collect(answered[0]);
    await until(() => heard.text.split("\n").length > 1);
    sender.write('{"plan": 1}\n');
    await until(() => heard.text.split("\n").length > 2);
    sender.end(line({ sights: move.sights(0.75) }));
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
    const { answer } = await move.indicate({ sights: move.sights(0.3) });
    await until(() => first.heard.text.includes(answer.id));
    const number = /id: (\d+)\nevent: indication\ndata: \{/.exec(first.heard.text)?.[1] ?? "";
    first.watcher.destroy();
    const later = await move.indicate({ sights: move.sights(0.4) });
    const comment = await move.job.add("/comments", { text: "Bolts loose." });
    const second = await watch({ "Last-Event-ID": number });
    await until(() => second.heard.text.includes(comment));
    expect(second.heard.text).toContain(later.answer.id);
    expect(second.heard.text).not.toContain(answer.id);
    second.watcher.destroy();
  });

  it("names its place before any event, so that a stream cut early goes on without a gap", async () => {
    const watch = async (headers: Record<string, string> = {}) => {
      const watcher = open("GET", "events", headers);
      watcher.end();
      const [response] = (await once(watcher, "response")) as [IncomingMessage];
      return { watcher, heard: collect(response) };
    };
    const first = await watch();
    await until(() => first.heard.text.endsWith("\n\n"));
    const [, place = ""] =
      /^id: (\d+)\nevent: watching\ndata: \{"last":\1\}\n\n$/.exec(first.heard.text) ?? [];
    expect(place).not.toBe("");
    first.watcher.destroy();
    const { answer } = await move.indicate({ indicators: [{ id: "compressor-aft-top", reading: 0.1 }] });
    const second = await watch({ "Last-Event-ID": place });
    await until(() => second.heard.text.includes(answer.id));
    const told = /event: indication\ndata: (.*)\n/.exec(second.heard.text)?.[1] ?? "";
    expect(JSON.parse(told)).toEqual(answer);
    expect(answer).toMatchObject({
      person: null,
      indicators: [{ id: "compressor-aft-top", reading: 0.1 }],
      sights: [],
    });
    second.watcher.destroy();
  });

  it("ends a watcher whose key is revoked", async () => {
    const key = await move.job.works.key("jobs:read");
    const watcher = httpRequest(`${app.url}/v1/jobs/${move.job.id}/events`, {
      headers: { Authorization: `Bearer ${key.secret}`, Accept: "text/event-stream" },
    });
    watcher.end();
    const [response] = (await once(watcher, "response")) as [IncomingMessage];
    const heard = collect(response);
    await app
      .call()
      .post(`/v1/keys/${key.id}/revoke`)
      .set("Authorization", `Bearer ${move.job.works.tokens.admin}`);
    await once(response, "end");
    expect(heard.text).toContain('event: end\ndata: {"reason":"credential_ended"}');
  }, 15_000);

  it("lets one credential watch eight times at once and no more", async () => {
    const key = await move.job.works.key("jobs:read");
    const watchers = Array.from({ length: 9 }, () => {
      const watcher = httpRequest(`${app.url}/v1/jobs/${move.job.id}/events`, {
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
