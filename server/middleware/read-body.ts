import express, { type Request, type RequestHandler } from "express";
import { limits } from "../../shared/limits.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Operation } from "../http/operation.ts";

const readBytes = express.raw({ type: () => true, limit: limits.bodyBytes, inflate: true });
const decoder = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true });

/**
 * Reads the body and nothing more: as text, where the operation takes JSON, or as the bytes of a file. A body in another
 * media type is refused; no body needs no Content-Type.
 */
export function readBody({ file, lines }: Pick<Operation, "file" | "lines">): RequestHandler[] {
  if (lines) return [refuseOtherThanLines];
  return file ? readFile(file.mediaTypes, file.limitBytes) : readText;
}

const readText: RequestHandler[] = [
  (request, _response, next) => {
    if (hasBody(request)) refuseOtherMediaTypes(request);
    next();
  },
  readBytes,
  (request, response, next) => {
    const bytes: unknown = request.body;
    response.locals.text = Buffer.isBuffer(bytes) ? decode(bytes) : "";
    response.locals.bytes = Buffer.alloc(0);
    next();
  },
];

/** Lines are taken by the handler as they arrive. */
const refuseOtherThanLines: RequestHandler = (request, response, next) => {
  if (!request.is("application/x-ndjson")) {
    throw new HttpProblem(
      "media_type_unsupported",
      "Send lines of JSON as application/x-ndjson.",
      {},
      { Accept: "application/x-ndjson" },
    );
  }
  Object.assign(response.locals, { text: "", bytes: Buffer.alloc(0) });
  next();
};

function readFile(mediaTypes: readonly string[], limitBytes: number): RequestHandler[] {
  return [
    (request, _response, next) => {
      if (hasBody(request) && !request.is([...mediaTypes])) {
        throw new HttpProblem(
          "media_type_unsupported",
          `Send one of: ${mediaTypes.join(", ")}.`,
          {},
          { Accept: mediaTypes.join(", ") },
        );
      }
      next();
    },
    express.raw({ type: () => true, limit: limitBytes, inflate: false }),
    (request, response, next) => {
      const bytes: unknown = request.body;
      response.locals.text = "";
      response.locals.bytes = Buffer.isBuffer(bytes) ? bytes : Buffer.alloc(0);
      next();
    },
  ];
}

function hasBody({ headers }: Request): boolean {
  return headers["transfer-encoding"] !== undefined || Number(headers["content-length"] ?? 0) > 0;
}

function refuseOtherMediaTypes(request: Request): void {
  const sent = request.get("Content-Type") ?? "";
  if (/^application\/json *(; *charset="?utf-?8"?)? *$/i.test(sent)) return;
  throw new HttpProblem(
    "media_type_unsupported",
    `${sent === "" ? "A body without Content-Type" : sent.slice(0, limits.echoedTextLength)} is not taken; send application/json in UTF-8.`,
    {},
    { Accept: "application/json" },
  );
}

function decode(bytes: Buffer): string {
  try {
    return decoder.decode(bytes);
  } catch {
    throw new HttpProblem("invalid_encoding", "The body is not valid UTF-8.");
  }
}
