import express, { type Request, type RequestHandler } from "express";
import { limits } from "../../shared/limits.ts";
import { HttpProblem } from "../http/http-problem.ts";

const readBytes = express.raw({ type: () => true, limit: limits.bodyBytes, inflate: true });
const decoder = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true });

/**
 * Reads the body as text and nothing more. A body that is not declared as JSON in UTF-8 is refused; no body needs no
 * Content-Type.
 */
export const readBody: RequestHandler[] = [
  (request, _response, next) => {
    if (hasBody(request)) refuseOtherMediaTypes(request);
    next();
  },
  readBytes,
  (request, response, next) => {
    const bytes: unknown = request.body;
    response.locals.text = Buffer.isBuffer(bytes) ? decode(bytes) : "";
    next();
  },
];

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
