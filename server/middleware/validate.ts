import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import type { Request, RequestHandler } from "express";
import { z } from "zod";
import type { Fault } from "../../shared/error-codes.ts";
import { HttpProblem, problemOfFaults, type AddressFault } from "../http/http-problem.ts";
import { parseJsonText } from "../http/json-text.ts";
import type { Operation } from "../http/operation.ts";
import { schemaFaults } from "../http/schema-faults.ts";

/** Checks path, query and body against the operation's schemas and puts what they give where the handler finds it. */
export function validate(operation: Operation): RequestHandler {
  return (request, response, next) => {
    const { locals } = response;
    locals.params = checkParams(operation, request.params);
    locals.query = checkQuery(operation, request);
    Object.assign(locals, checkSent(operation, locals as { bytes: Buffer; text: string }));
    next();
  };
}

function checkParams({ params = {} }: Operation, sent: Request["params"]): Record<string, string> {
  for (const [name, value] of Object.entries(sent)) {
    const schema = params[name] ?? z.uuid();
    if (!schema.safeParse(value).success)
      throw new HttpProblem("not_found", "There is nothing with this id.");
  }
  return sent as Record<string, string>;
}

function checkQuery({ query }: Operation, request: Request): unknown {
  const [, text = ""] = request.url.split("?", 2);
  refuseBadEncoding(text);
  const sent: Record<string, string> = {};
  const faults: AddressFault[] = [];
  const known = query ? Object.keys(query.shape) : [];
  for (const [name, value] of new URLSearchParams(text)) {
    if (!known.includes(name)) {
      const allowed = known.length === 0 ? "none" : known.join(", ");
      faults.push({ parameter: name, code: "unknown_parameter", detail: `Parameters here: ${allowed}.` });
    } else if (name in sent) {
      faults.push({
        parameter: name,
        code: "invalid_parameter",
        detail: "The parameter stands more than once.",
      });
    } else {
      sent[name] = value;
    }
  }
  const parsed = query?.safeParse(sent);
  for (const issue of parsed?.error?.issues ?? []) {
    faults.push({ parameter: String(issue.path[0] ?? ""), code: "invalid_parameter", detail: issue.message });
  }
  const [first] = faults;
  if (first) throw new HttpProblem(first.code, `${first.parameter}: ${first.detail}`, { errors: faults });
  return parsed?.data;
}

function refuseBadEncoding(text: string): void {
  try {
    decodeURIComponent(text.replaceAll("+", " "));
  } catch {
    throw new HttpProblem("invalid_encoding", "The address is not valid percent-encoded UTF-8.");
  }
}

function checkBody(operation: Operation, text: string): { body: unknown; canonicalText: string } {
  if (!operation.body) return checkNoBody(text);
  if (text === "") throw problemOfFaults([{ pointer: "", code: "required", detail: "The body is missing." }]);
  const { value, faults: textFaults } = parseJsonText(text);
  const known = new Set(textFaults.map((fault) => fault.pointer));
  const faults: Fault[] = [
    ...textFaults,
    ...schemaFaults(operation.body, value).filter((fault) => !known.has(fault.pointer)),
  ];
  if (faults.length > 0) {
    throw problemOfFaults([...faults, ...(operation.faultsBesideSchema?.(value, faults) ?? [])]);
  }
  return { body: operation.body.parse(value), canonicalText: canonicalize(value) ?? "" };
}

function checkSent(operation: Operation, { bytes, text }: { bytes: Buffer; text: string }) {
  if (operation.lines) return { body: undefined, canonicalText: "" };
  return operation.file ? checkFile(bytes) : checkBody(operation, text);
}

/**
 * One body, or one line of several, against the schema of an operation.
 * @throws HttpProblem naming every fault
 */
export function checkText<Body>(
  operation: Pick<Operation<Body>, "body" | "faultsBesideSchema">,
  text: string,
) {
  return checkBody(operation as Operation, text) as { body: Body; canonicalText: string };
}

/** A file stands for itself: two calls are the same when its bytes are. */
function checkFile(bytes: Buffer): { body: undefined; canonicalText: string } {
  if (bytes.length === 0) {
    throw problemOfFaults([{ pointer: "", code: "required", detail: "The file is missing." }]);
  }
  return { body: undefined, canonicalText: createHash("sha256").update(bytes).digest("hex") };
}

function checkNoBody(text: string): { body: undefined; canonicalText: string } {
  if (text === "") return { body: undefined, canonicalText: "" };
  const { value } = parseJsonText(text);
  if (typeof value === "object" && value !== null && Object.keys(value).length === 0)
    return { body: undefined, canonicalText: "" };
  throw problemOfFaults([{ pointer: "", code: "unknown_field", detail: "This operation takes no body." }]);
}
