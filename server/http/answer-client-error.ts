import type { Duplex } from "node:stream";
import { problemKinds, type ProblemCode } from "../../shared/error-codes.ts";
import { newId } from "../services/ids.ts";
import { HttpProblem, problemBody } from "./http-problem.ts";

/** Answers what Node's own parser refuses, before there is a request: a problem like any other, then the socket closes. */
export function answerClientError(error: NodeJS.ErrnoException, socket: Duplex): void {
  if (error.code === "ECONNRESET" || !socket.writable) {
    socket.destroy();
    return;
  }
  const code = codeOf(error.code);
  const { status, title } = problemKinds[code];
  const body = JSON.stringify(problemBody(new HttpProblem(code, `${title}.`), newId(), ""));
  socket.end(
    [
      `HTTP/1.1 ${status} ${title}`,
      "Content-Type: application/problem+json",
      `Content-Length: ${Buffer.byteLength(body)}`,
      "Connection: close",
      "",
      body,
    ].join("\r\n"),
  );
}

function codeOf(code: string | undefined): ProblemCode {
  if (code === "HPE_HEADER_OVERFLOW") return "headers_too_large";
  return code === "ERR_HTTP_REQUEST_TIMEOUT" ? "request_timeout" : "malformed_request";
}
