import { problemSchema } from "../../../shared/schemas/problem.ts";
import { NoAnswerError, ProblemError } from "./service-error.ts";

export interface ServiceRequest {
  readonly method: "GET" | "POST" | "DELETE";
  readonly path: string;
  /** The body as text, so that what is sent is what was written. */
  readonly bodyText?: string;
  readonly idempotencyKey?: string;
  readonly accessToken?: string;
  readonly signal?: AbortSignal;
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
  const problem = problemSchema.safeParse(body);
  if (problem.success) throw new ProblemError(problem.data);
  throw new NoAnswerError(
    `The service answered ${response.status} in a form the console cannot read.`,
    requestId,
  );
}

async function exchange(request: ServiceRequest): Promise<Response> {
  const headers = new Headers({ Accept: "application/json, application/problem+json" });
  if (request.bodyText !== undefined) headers.set("Content-Type", "application/json");
  if (request.idempotencyKey !== undefined) headers.set("Idempotency-Key", request.idempotencyKey);
  if (request.accessToken !== undefined) headers.set("Authorization", `Bearer ${request.accessToken}`);
  try {
    return await fetch(request.path, {
      method: request.method,
      headers,
      credentials: "same-origin",
      ...(request.bodyText === undefined ? {} : { body: request.bodyText }),
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
