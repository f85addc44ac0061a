import { expect, onTestFinished, vi } from "vitest";
import type { z } from "zod";
import { problemKinds, type ProblemCode } from "../../../shared/error-codes.ts";
import { problemSchema, type Problem } from "../../../shared/schemas/problem.ts";

export interface Call {
  readonly method: string;
  readonly path: string;
  readonly query: URLSearchParams;
  readonly headers: Headers;
  readonly bodyText: string;
  /** The body, where it is a file. */
  readonly file: Blob | null;
}

export interface Answer {
  readonly status: number;
  /** A stream is sent as it is, anything else as JSON. */
  readonly body: unknown;
}

type Answerer = (call: Call) => Answer | Promise<Answer>;

/** An answer whose body is held against the service's own schema, so that no test passes on a form it does not have. */
export function answer<Schema extends z.ZodType>(
  schema: Schema,
  body: z.input<Schema>,
  status = 200,
): Answer {
  schema.parse(body);
  return { status, body };
}

/** A refusal with the catalogue's status and title. */
export function refusal(code: ProblemCode, extra: Partial<Problem> = {}): Answer {
  const { status, title, fix } = problemKinds[code];
  const body = {
    type: `/v1/problems/${code}`,
    title,
    status,
    detail: title,
    code,
    requestId: "req-1",
    fix,
    ...extra,
  };
  problemSchema.parse(body);
  return { status, body };
}

/** Stands in for the network: what is not asked for beforehand is a fault of the test or of the console. */
export class FakeService {
  readonly calls: Call[] = [];
  private readonly answerers = new Map<string, Answerer>();
  private readonly unexpected: string[] = [];

  constructor() {
    vi.stubGlobal("fetch", (path: string, init: RequestInit) => this.take(path, init));
    onTestFinished(() => {
      vi.unstubAllGlobals();
      expect(this.unexpected).toEqual([]);
    });
  }

  /** `route` as "GET /v1/keys". The last word given for a route holds. */
  on(route: string, answerer: Answer | Answerer): this {
    this.answerers.set(route, typeof answerer === "function" ? answerer : () => answerer);
    return this;
  }

  callsTo(route: string): Call[] {
    return this.calls.filter(({ method, path }) => `${method} ${path}` === route);
  }

  private async take(address: string, init: RequestInit): Promise<Response> {
    const url = new URL(address, location.origin);
    const call: Call = {
      method: init.method ?? "GET",
      path: url.pathname,
      query: url.searchParams,
      headers: new Headers(init.headers),
      bodyText: typeof init.body === "string" ? init.body : "",
      file: init.body instanceof Blob ? init.body : null,
    };
    this.calls.push(call);
    const route = `${call.method} ${call.path}`;
    const answerer = this.answerers.get(route);
    if (!answerer) {
      this.unexpected.push(route);
      throw new TypeError(`The test answers nothing to ${route}.`);
    }
    const { status, body } = await orAborted(Promise.resolve(answerer(call)), init.signal);
    const sent = body instanceof ReadableStream ? body : status === 204 ? null : JSON.stringify(body);
    return new Response(sent, {
      status,
      headers: { "x-request-id": "req-1" },
    });
  }
}

/** The network is gone. */
export const noNetwork: Answerer = () => Promise.reject(new TypeError("Failed to fetch"));

/** An answer that comes when the test says so. */
export function heldAnswer(later: Answer): { answerer: Answerer; release: () => void } {
  let release = (): void => undefined;
  const held = new Promise<Answer>((resolve) => {
    release = () => resolve(later);
  });
  return { answerer: () => held, release: () => release() };
}

function orAborted<Result>(work: Promise<Result>, signal: AbortSignal | null | undefined): Promise<Result> {
  if (!signal) return work;
  return new Promise((resolve, reject) => {
    signal.addEventListener("abort", () => reject(new DOMException("Aborted", "AbortError")));
    work.then(resolve, reject);
  });
}
