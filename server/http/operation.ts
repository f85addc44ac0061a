import type { Request, Response } from "express";
import type { z } from "zod";
import type { OperationId } from "../../shared/access.ts";
import type { Fault, ProblemCode } from "../../shared/error-codes.ts";
import type { Deps } from "../deps.ts";
import type { Caller } from "../services/caller.ts";
import type { Claim } from "../services/idempotency.ts";

export type Method = "get" | "post" | "patch" | "delete";

/** What a handler is given: all of it checked against the operation's own schemas. */
export interface Call<Body = unknown, Query = unknown> {
  readonly deps: Deps;
  readonly body: Body;
  readonly query: Query;
  readonly params: Readonly<Record<string, string>>;
  /** Who calls; absent only where the access table says anyone may. */
  readonly caller: Caller | null;
  readonly requestId: string;
  /** The address without its query. */
  readonly path: string;
  /** The body as received, and its RFC 8785 form. */
  readonly text: string;
  readonly canonicalText: string;
  /** The file sent, where the operation takes one; empty elsewhere. */
  readonly bytes: Buffer;
  /** What an Idempotency-Key has reserved; null when none was sent. */
  readonly claim: Claim | null;
  readonly request: Request;
  readonly response: Response;
}

export interface Reply {
  readonly status: number;
  readonly body?: unknown;
  readonly headers?: Readonly<Record<string, string>>;
  /** Writes the answer as it comes into being, and ends it. */
  readonly stream?: (response: Response) => Promise<void>;
}

export interface ExampleSet {
  readonly [name: string]: { readonly summary: string; readonly value: unknown };
}

/** What the document says of a success. `schema` is absent where there is no body, or one that is not JSON. */
export interface SuccessResponse {
  readonly status: number;
  readonly description: string;
  readonly schema?: z.ZodType;
  readonly mediaType?: string;
  /** The media types of an answer that is a file, the first where the caller states none. */
  readonly files?: readonly string[];
  readonly examples?: () => ExampleSet;
}

/**
 * One operation: the same literal registers the Express route and the OpenAPI path, so they cannot part.
 * Its access stands in shared/access.ts under its operationId.
 */
export interface Operation<Body = unknown, Query = unknown> {
  readonly operationId: OperationId;
  readonly method: Method;
  /** In OpenAPI form: `/v1/keys/{id}`. Every parameter is a UUID unless `params` says otherwise. */
  readonly path: string;
  readonly tag: string;
  readonly summary: string;
  readonly description: string;
  readonly params?: Readonly<Record<string, z.ZodType<string>>>;
  readonly query?: z.ZodObject & z.ZodType<Query>;
  readonly body?: z.ZodType<Body>;
  /** The body is a file, in one of these media types and no larger than this, and not JSON. */
  readonly file?: { readonly mediaTypes: readonly string[]; readonly limitBytes: number };
  /** Domain faults of the sound parts of a body that fails its schema elsewhere. */
  readonly faultsBesideSchema?:
    ((body: unknown, schemaFaults: readonly Fault[]) => readonly Fault[]) | undefined;
  /** The body is lines of JSON (NDJSON), each of the schema `body`; the handler takes them as they arrive. */
  readonly lines?: boolean;
  readonly requestExamples?: () => ExampleSet;
  readonly response: SuccessResponse;
  /** Beyond those that access, body and method bring by themselves. */
  readonly errors: readonly ProblemCode[];
  /** The answer holds a secret: a repeat under one Idempotency-Key is refused, never shown again. */
  readonly answersSecret?: boolean;
  /** A PATCH that needs If-Match. */
  readonly conditional?: boolean;
  /** Counts against the stricter limit of sign-in routes. */
  readonly limit?: "sign-in" | "none";
  readonly handle: (call: Call<Body, Query>) => Promise<Reply> | Reply;
}

/** Ties the handler's types to the schemas beside it. */
export function defineOperation<Body = undefined, Query = undefined>(
  operation: Operation<Body, Query>,
): Operation {
  return operation as unknown as Operation;
}

/** The caller of an operation whose access demands one. */
export function callerOf(call: Pick<Call, "caller">): Caller {
  if (!call.caller) throw new Error("The access table lets nobody here without a credential.");
  return call.caller;
}

export const reply = (status: number, body?: unknown, headers?: Record<string, string>): Reply => ({
  status,
  ...(body === undefined ? {} : { body }),
  ...(headers ? { headers } : {}),
});
