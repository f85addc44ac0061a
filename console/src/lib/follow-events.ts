import { createParser } from "eventsource-parser";
import { ProblemError } from "./service-error.ts";

export interface StreamEvent {
  readonly type: string;
  readonly data: string;
}

export type StreamState = "live" | "reconnecting" | "stopped";

export interface EventSubscription {
  /** Opens the stream after the event with this id; null begins with what comes now. */
  readonly open: (lastId: string | null, signal: AbortSignal) => Promise<ReadableStream<Uint8Array>>;
  readonly onEvent: (event: StreamEvent) => void;
  /** The error is that which ended the stream, or keeps it from being opened. */
  readonly onState: (state: StreamState, error: unknown) => void;
  readonly lastId: string | null;
  readonly signal: AbortSignal;
  readonly wait?: (milliseconds: number, signal: AbortSignal) => Promise<void>;
}

/** The service's first word: where the stream begins. */
const greeting = "watching";
/** The service says that it is alive every 10 s: after this long without a word the line is dead. */
const silenceMs = 35_000;
const [firstDelayMs, longestDelayMs] = [500, 30_000];
/** A stream that lasted this long was no failed attempt. */
const steadyMs = 10_000;

/**
 * Follows a stream of events until the signal says so or the service refuses for good. A stream that breaks is opened
 * again where it was cut, after a pause that doubles with every attempt that failed.
 */
export async function followEvents({
  open,
  onEvent,
  onState,
  signal,
  lastId: from,
  wait = waitFor,
}: EventSubscription): Promise<void> {
  let lastId = from;
  let failures = 0;
  while (!signal.aborted) {
    const openedAt = performance.now();
    let error: unknown = null;
    try {
      const stream = await open(lastId, signal);
      onState("live", null);
      for await (const { id, type, data } of readEvents(stream, signal)) {
        lastId = id ?? lastId;
        if (type === greeting) continue;
        failures = 0;
        onEvent({ type, data });
      }
    } catch (caught) {
      error = caught;
    }
    if (isAborted(signal)) return;
    if (isFinal(error)) return onState("stopped", error);
    if (performance.now() - openedAt > steadyMs) failures = 0;
    onState("reconnecting", error);
    await wait(delayAfter(failures), signal);
    failures += 1;
  }
}

/** Half of the pause is left to chance, so that a service that comes back is not asked by all at once. */
export function delayAfter(failures: number, chance = Math.random()): number {
  return Math.min(longestDelayMs, firstDelayMs * 2 ** failures) * (0.5 + chance / 2);
}

/** The browser's own EventSource sends no Authorization, so the stream is fetched and read here. */
async function* readEvents(stream: ReadableStream<Uint8Array>, signal: AbortSignal) {
  const reader = stream.getReader();
  const cancel = (): void => void reader.cancel().catch(() => undefined);
  signal.addEventListener("abort", cancel);
  const decoder = new TextDecoder();
  const heard: (StreamEvent & { readonly id: string | undefined })[] = [];
  const parser = createParser({
    onEvent: ({ id, event = "message", data }) => heard.push({ id, type: event, data }),
  });
  try {
    for (;;) {
      const silence = setTimeout(cancel, silenceMs);
      const { done, value } = await reader.read().finally(() => clearTimeout(silence));
      if (done || signal.aborted) return;
      parser.feed(decoder.decode(value, { stream: true }));
      yield* heard.splice(0);
    }
  } finally {
    signal.removeEventListener("abort", cancel);
    cancel();
  }
}

/** Asked anew after every wait: the signal may have changed meanwhile. */
function isAborted(signal: AbortSignal): boolean {
  return signal.aborted;
}

/** Asking again would be refused again. */
function isFinal(error: unknown): boolean {
  if (!(error instanceof ProblemError)) return false;
  const { status } = error.problem;
  return status < 500 && status !== 408 && status !== 429;
}

function waitFor(milliseconds: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const finish = (): void => {
      clearTimeout(timer);
      signal.removeEventListener("abort", finish);
      resolve();
    };
    const timer = setTimeout(finish, milliseconds);
    signal.addEventListener("abort", finish);
  });
}
