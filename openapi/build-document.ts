import { OpenAPIRegistry, OpenApiGeneratorV31, type RouteConfig } from "@asteasolutions/zod-to-openapi";
import { z } from "zod";
import { operationAccess, roles, type Access } from "../shared/access.ts";
import { problemKinds, type ProblemCode } from "../shared/error-codes.ts";
import { problemSchema } from "../shared/schemas/problem.ts";
import type { ExampleSet, Operation } from "../server/http/operation.ts";
import { apiVersion } from "../server/http/api-version.ts";

const bearer = "bearer";

/** The OpenAPI 3.1 document, from the literals that route the calls. */
export function buildDocument(operations: readonly Operation[]): object {
  const registry = new OpenAPIRegistry();
  registry.registerComponent("securitySchemes", bearer, {
    type: "http",
    scheme: "bearer",
    description: "An API key, or the access token of a sign-in.",
  });
  const shared = new SharedProblems(registry);
  for (const operation of operations) registry.registerPath(pathOf(operation, shared));
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: "3.1.0",
    info: {
      title: "Borewright",
      version: apiVersion,
      description: DESCRIPTION,
      license: { name: "MIT", identifier: "MIT" },
    },
    servers: [{ url: "/" }],
    tags: TAGS,
  });
}

const DESCRIPTION = `Every computing call states its units and is kept as a record that can be read and replayed.

\`z\` runs downstream from one common face. A cross-section is seen looking downstream: \`h\` to the right, \`v\` up; \`clockDeg\` clockwise from 12 o'clock. Uncertainties sent in are standard (k = 1); expanded ones in answers carry k and dof.

Errors are RFC 9457 problems; \`errors\` names every fault by RFC 6901 pointer. Any POST takes an \`Idempotency-Key\`.

The service computes; it does not authorise a move. Lock out and prove dead; follow the maker's limits and torque values; a qualified engineer decides.`;

const TAGS = [
  {
    name: "Calculations",
    description: "Readings to centres, centres to deviations, deviations to shim moves.",
  },
  { name: "Records", description: "What was computed, by whom, from what: immutable and replayable." },
  { name: "Machines", description: "What a machine is, revision by revision." },
  { name: "Jobs", description: "One outage on one machine: surveys, moves, proof, signature." },
  { name: "Keys", description: "API keys for programs." },
  { name: "Members", description: "People and their roles." },
  { name: "Webhooks", description: "Telling plant software of what happens." },
  { name: "Outbox", description: "Mail that was kept here for want of a mail server." },
  { name: "Usage", description: "What was computed, counted." },
  { name: "Sign-in", description: "Sessions of people." },
  { name: "Service", description: "Health, versions, codes, this document." },
];

function pathOf(operation: Operation, shared: SharedProblems): RouteConfig {
  const access: Access = operationAccess[operation.operationId];
  const headers = headersOf(operation, access);
  const params = paramsOf(operation);
  return {
    operationId: operation.operationId,
    method: operation.method,
    path: operation.path,
    tags: [operation.tag],
    summary: operation.summary,
    description: `${operation.description}${accessSentence(access)}`,
    security: access.by === "anyone" ? [] : [{ [bearer]: [] }],
    request: {
      ...(params ? { params: z.object(params) } : {}),
      ...(operation.query ? { query: operation.query } : {}),
      ...(headers ? { headers } : {}),
      ...(operation.body
        ? {
            body: {
              required: true,
              content: {
                [operation.lines ? "application/x-ndjson" : "application/json"]: {
                  schema: operation.body,
                  ...examplesOf(operation.requestExamples),
                },
              },
            },
          }
        : {}),
      ...(operation.file
        ? { body: { required: true, content: fileContent(operation.file.mediaTypes) } }
        : {}),
    },
    responses: {
      [operation.response.status]: successOf(operation),
      ...problemsOf(operation, access, shared),
      default: anyProblem,
    },
  };
}

function accessSentence(access: Access): string {
  if (access.by === "anyone") return "";
  if (access.by === "caller") return "\n\nAny credential.";
  if (access.by === "member") return "\n\nA signed-in member.";
  const who = access.roles.length === roles.length ? "any role" : access.roles.join(", ");
  return `\n\nKeys: scope \`${access.scope}\`. Members: ${who}.`;
}

function paramsOf({ path, params = {} }: Operation): Record<string, z.ZodType> | null {
  const names = [...path.matchAll(/\{(\w+)\}/g)].map(([, name = ""]) => name);
  if (names.length === 0) return null;
  return Object.fromEntries(names.map((name) => [name, params[name] ?? z.uuid()]));
}

function headersOf(operation: Operation, access: Access): z.ZodObject | null {
  const headers: Record<string, z.ZodType> = {};
  if (operation.method === "post" && access.by !== "anyone" && !operation.lines) {
    headers["Idempotency-Key"] = z.string().min(1).max(255).optional().meta({
      description: "Any text of your own. The same key and body give the first answer again.",
    });
  }
  if (operation.conditional) {
    headers["If-Match"] = z
      .string()
      .meta({ description: "The ETag of the version you read.", example: '"1"' });
  }
  return Object.keys(headers).length === 0 ? null : z.object(headers);
}

/** A body that is a file, in any of these media types. */
function fileContent(mediaTypes: readonly string[]) {
  const schema = z.string().meta({ format: "binary", description: "The file's bytes." });
  const json = z.record(z.string(), z.unknown());
  return Object.fromEntries(
    mediaTypes.map((mediaType) => [mediaType, { schema: mediaType === "application/json" ? json : schema }]),
  );
}

function successOf({ response }: Operation) {
  if (response.files) return { description: response.description, content: fileContent(response.files) };
  if (!response.schema) return { description: response.description };
  const mediaType = response.mediaType ?? "application/json";
  const schema =
    mediaType === "application/json" && response.schema instanceof z.ZodString
      ? z.record(z.string(), z.unknown())
      : response.schema;
  return {
    description: response.description,
    content: { [mediaType]: { schema, ...examplesOf(response.examples) } },
  };
}

function examplesOf(examples: (() => ExampleSet) | undefined): { examples?: ExampleSet } {
  return examples ? { examples: examples() } : {};
}

/** Every problem the operation can answer, by status; operations that can answer the same share one description. */
function problemsOf(operation: Operation, access: Access, shared: SharedProblems): Record<string, unknown> {
  const byStatus = new Map<number, ProblemCode[]>();
  for (const code of new Set<ProblemCode>([...impliedCodes(operation, access), ...operation.errors])) {
    const { status } = problemKinds[code];
    byStatus.set(status, [...(byStatus.get(status) ?? []), code]);
  }
  return Object.fromEntries(
    [...byStatus].map(([status, codes]) => [
      status,
      { $ref: `#/components/responses/${shared.nameOf(status, codes)}` },
    ]),
  );
}

/** What any call can meet before its operation is reached: a cut connection, headers too large. */
const anyProblem = {
  description: "Any other problem.",
  content: { "application/problem+json": { schema: problemSchema } },
};

/** The problem responses and examples that operations refer to: written once, since most share most of them. */
class SharedProblems {
  private readonly names = new Map<string, string>();
  private readonly shown = new Set<ProblemCode>();
  constructor(private readonly registry: OpenAPIRegistry) {}

  nameOf(status: number, codes: readonly ProblemCode[]): string {
    const key = [...codes].sort().join(" ");
    const known = this.names.get(key);
    if (known) return known;
    const earlier = [...this.names.values()].filter((name) => name.startsWith(`Problem${status}`)).length;
    const name = `Problem${status}${earlier === 0 ? "" : `_${earlier + 1}`}`;
    this.names.set(key, name);
    this.registry.registerComponent("responses", name, {
      description: codes.map((code) => `${problemKinds[code].title} (\`${code}\`).`).join(" "),
      content: {
        "application/problem+json": {
          schema: { $ref: "#/components/schemas/Problem" },
          examples: Object.fromEntries(codes.map((code) => [code, this.exampleOf(code)])),
        },
      },
    });
    return name;
  }

  private exampleOf(code: ProblemCode): { $ref: string } {
    if (!this.shown.has(code)) this.registry.registerComponent("examples", code, problemExample(code));
    this.shown.add(code);
    return { $ref: `#/components/examples/${code}` };
  }
}

/** What a problem with this code looks like: written once, since most operations share most codes. */
function problemExample(code: ProblemCode) {
  const { status, title, fix } = problemKinds[code];
  const detail = `${title}.`;
  const value = {
    type: `/v1/problems/${code}`,
    title,
    status,
    detail,
    code,
    requestId: "0193a5e0-7c00-7000-8000-00000000000a",
    fix,
    ...(status === 422 ? { errors: [{ pointer: "", code, detail }] } : {}),
  };
  return { summary: title, value };
}

/** Codes that method, access and body bring by themselves. */
function impliedCodes(operation: Operation, access: Access): ProblemCode[] {
  const codes: ProblemCode[] = ["unknown_parameter", "invalid_header", "not_acceptable"];
  if (operation.limit !== "none") codes.push("rate_limited");
  if (operation.query) codes.push("invalid_parameter");
  if (access.by !== "anyone")
    codes.push(
      "credential_missing",
      "credential_invalid",
      "key_expired",
      "key_revoked",
      "session_expired",
      "scope_missing",
    );
  if (operation.file) codes.push("media_type_unsupported", "call_too_large");
  if (operation.path.includes("{")) codes.push("not_found");
  if (operation.conditional) codes.push("precondition_required", "version_stale");
  if (operation.method === "post" && access.by !== "anyone" && !operation.lines)
    codes.push("idempotency_in_progress", "idempotency_key_reused");
  if (operation.body) {
    codes.push(
      "invalid_json",
      "duplicate_key",
      "too_deep",
      "invalid_encoding",
      "call_too_large",
      "media_type_unsupported",
    );
    codes.push(
      "several_faults",
      "required",
      "unknown_field",
      "wrong_type",
      "number_not_exact",
      "out_of_range",
      "too_few_items",
      "too_many_items",
      "text_invalid",
      "choice_unknown",
    );
  }
  codes.push("internal_error", "unavailable");
  return [...new Set(codes)];
}
