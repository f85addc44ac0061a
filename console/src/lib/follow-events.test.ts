import { describe, expect, it } from "vitest";
import { problemKinds, type ProblemCode } from "../../../shared/error-codes.ts";
import { delayAfter, followEvents, type StreamEvent } from "./follow-events.ts";
import { NoAnswerError, ProblemError } from "./service-error.ts";

const bytesOf = (text: string) => new TextEncoder().encode(text);
const streamOf = (...pieces: Uint8Array[]) =>
  new ReadableStream<Uint8Array>({
    start(controller) {
      for (const piece of pieces) controller.enqueue(piece);
      controller.close();
    },
  });
const refused = (code: ProblemCode) =>
  new ProblemError({ type: "", detail: "", code, requestId: "req-1", ...problemKinds[code] });

/** Follows what each attempt in turn answers with; ends after the last. */
async function follow(attempts: readonly (string | Error)[], lastId: string | null = null) {
  const [asked, events, states, pauses] = [
    [] as (string | null)[],
    [] as StreamEvent[],
    [] as string[],
    [] as number[],
  ];
  const ending = new AbortController();
  await followEvents({
    lastId,
    signal: ending.signal,
    open: (id) => {
      const answer = attempts[asked.length];
      asked.push(id);
      if (answer === undefined || answer instanceof Error)
        return Promise.reject(answer ?? new Error("No more."));
      return Promise.resolve(streamOf(bytesOf(answer)));
    },
    onEvent: (event) => events.push(event),
    onState: (state) => states.push(state),
    wait: (milliseconds) => {
      pauses.push(milliseconds);
      if (asked.length === attempts.length) ending.abort();
      return Promise.resolve();
    },
  });
  return { asked, events, states, pauses };
}

describe("followEvents", () => {
  it("opens a broken stream again after the last event it heard, and hears each event once", async () => {
    const { asked, events, states } = await follow(["id: 7\ndata: a\n\n", "id: 8\ndata: b\n\n"]);
    expect(asked).toEqual([null, "7"]);
    expect(events.map(({ data }) => data)).toEqual(["a", "b"]);
    expect(states).toEqual(["live", "reconnecting", "live", "reconnecting"]);
  });

  it("goes on from the place that the service named before any event", async () => {
    const { asked, events } = await follow(['id: 41\nevent: watching\ndata: {"last":41}\n\n', ""]);
    expect([asked, events]).toEqual([[null, "41"], []]);
  });

  it("hears the same wherever the stream is cut, and not what its end cuts off", async () => {
    const text = 'id: 7\r\nevent: entry\r\ndata: {"a":"σ"}\r\n\r\n: alive\n\ndata: 8\n\ndata: 9';
    const bytes = bytesOf(text);
    for (let at = 0; at <= bytes.length; at++) {
      const events: StreamEvent[] = [];
      const ending = new AbortController();
      await followEvents({
        lastId: null,
        signal: ending.signal,
        open: () => Promise.resolve(streamOf(bytes.slice(0, at), bytes.slice(at))),
        onEvent: (event) => events.push(event),
        onState: () => undefined,
        wait: () => Promise.resolve(ending.abort()),
      });
      expect(events).toEqual([
        { type: "entry", data: '{"a":"σ"}' },
        { type: "message", data: "8" },
      ]);
    }
  });

  it("keeps the place it was given while nothing was heard", async () => {
    expect((await follow([new NoAnswerError("Gone."), ""], "5")).asked).toEqual(["5", "5"]);
  });

  it("waits longer after every attempt that fails, and begins anew once it hears something", async () => {
    const gone = new NoAnswerError("Gone.");
    const { pauses } = await follow([gone, gone, gone, "data: a\n\n", gone]);
    const least = [250, 500, 1_000, 250, 500];
    pauses.forEach((pause, index) => {
      expect(pause).toBeGreaterThanOrEqual(least[index] ?? Infinity); // ms
      expect(pause).toBeLessThanOrEqual(2 * (least[index] ?? 0)); // ms
    });
    expect(delayAfter(40, 1)).toBe(30_000); // ms
  });

  it.each(["rate_limited", "unavailable", "internal_error"] as const)(
    "tries again after %s",
    async (code) => {
      expect((await follow([refused(code), "data: a\n\n"])).events).toHaveLength(1);
    },
  );

  it.each(["not_found", "scope_missing", "session_expired"] as const)(
    "stops for good at %s",
    async (code) => {
      const { states, asked } = await follow([refused(code), "data: a\n\n"]);
      expect([states, asked]).toEqual([["stopped"], [null]]);
    },
  );

  it("lets the stream go at once when it is told to stop", async () => {
    let isCancelled = false;
    const stream = new ReadableStream<Uint8Array>({
      cancel: () => {
        isCancelled = true;
      },
    });
    const ending = new AbortController();
    const states: string[] = [];
    await followEvents({
      lastId: null,
      signal: ending.signal,
      open: () => Promise.resolve(stream),
      onEvent: () => undefined,
      onState: (state) => {
        states.push(state);
        setTimeout(() => ending.abort(), 1);
      },
    });
    expect([states, isCancelled]).toEqual([["live"], true]);
  });
});
