import { problemSchema } from "../../../shared/schemas/problem.ts";
import { NoAnswerError, ProblemError } from "./service-error.ts";

export interface ServiceRequest {
  readonly method: "GET" | "POST" | "PATCH" | "DELETE";
  readonly path: string;
  /** The body as text, so that what is sent is what was written. */
  readonly bodyText?: string;
  /** A file as the body, in place of text. */
  readonly file?: SentFile;
  /** The version that a change was made from, as its ETag. */
  readonly ifMatch?: string;
  readonly idempotencyKey?: string;
  readonly accessToken?: string;
  /** The event after which a stream goes on. */
  readonly lastEventId?: string;
  readonly signal?: AbortSignal;
}

export interface SentFile {
  readonly content: Blob;
  readonly mediaType: string;
}

export interface ServiceAnswer {
  readonly status: number;
  readonly body: unknown;
  readonly requestId: string | null;
}

/**
 * One exchange with the service.
 * @throws ProblemError for a refusal, NoAnswerError when nothing readable came back
 */
export async function sendRequest(request: ServiceRequest): Promise<ServiceAnswer> {
  const response = await exchange(request);
  const requestId = response.headers.get("x-request-id");
  const body = await readBody(response, requestId);
  if (response.ok) return { status: response.status, body, requestId };
  throw refusalOf(response, body, requestId);
}

/**
 * A file that the service answers with.
 * @throws ProblemError for a refusal, NoAnswerError when nothing readable came back
 */
export async function requestFile(request: ServiceRequest): Promise<Blob> {
  const response = await exchange(request, "*/*");
  const requestId = response.headers.get("x-request-id");
  if (!response.ok) throw refusalOf(response, await readBody(response, requestId), requestId);
  return response.blob().catch(() => {
    throw new NoAnswerError("The file broke off. Check the connection and try again.", requestId);
  });
}

/**
 * A stream of events, open as long as its reader wants it.
 * @throws ProblemError for a refusal, NoAnswerError when no stream came back
 */
export async function openEventStream(request: ServiceRequest): Promise<ReadableStream<Uint8Array>> {
  const response = await exchange(request, "text/event-stream, application/problem+json");
  const requestId = response.headers.get("x-request-id");
  if (!response.ok) throw refusalOf(response, await readBody(response, requestId), requestId);
  if (response.body) return response.body;
  throw new NoAnswerError("The service answered with no stream.", requestId);
}

function refusalOf(response: Response, body: unknown, requestId: string | null): Error {
  const problem = problemSchema.safeParse(body);
  if (problem.success) return new ProblemError(problem.data);
  return new NoAnswerError(
    `The service answered ${response.status} in a form the console cannot read.`,
    requestId,
  );
}

async function exchange(
  request: ServiceRequest,
  accept = "application/json, application/problem+json",
): Promise<Response> {
  const headers = new Headers({ Accept: accept });
  const body = request.file?.content ?? request.bodyText;
  if (body !== undefined) headers.set("Content-Type", request.file?.mediaType ?? "application/json");
  if (request.ifMatch !== undefined) headers.set("If-Match", request.ifMatch);
  if (request.idempotencyKey !== undefined) headers.set("Idempotency-Key", request.idempotencyKey);
  if (request.lastEventId !== undefined) headers.set("Last-Event-ID", request.lastEventId);
  if (request.accessToken !== undefined) headers.set("Authorization", `Bearer ${request.accessToken}`);
  try {
    return await fetch(request.path, {
      method: request.method,
      headers,
      credentials: "same-origin",
      ...(body === undefined ? {} : { body }),
      ...(request.signal === undefined ? {} : { signal: request.signal }),
    });
  } catch (error) {
    if (request.signal?.aborted) throw error;
    throw new NoAnswerError("The service cannot be reached. Check the connection and try again.");
  }
}

async function readBody(response: Response, requestId: string | null): Promise<unknown> {
  const text = await response.text().catch((error: unknown) => {
    if (error instanceof DOMException && error.name === "AbortError") throw error;
    throw new NoAnswerError("The answer broke off. Check the connection and try again.", requestId);
  });
  if (text === "") return null;
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new NoAnswerError("The service answered with something that is not JSON.", requestId);
  }
}
