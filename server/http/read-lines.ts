import type { Readable } from "node:stream";
import { HttpProblem } from "./http-problem.ts";

/** More than any line of readings: what is longer is no line. */
const LINE_BYTES = 64 * 1024;

/**
 * The lines of a stream as they arrive, without their ends; empty ones are passed over. Nothing is read ahead of what is
 * taken, so that a sender is held back by whoever reads.
 * @throws HttpProblem call_too_large for a line without an end, invalid_encoding
 */
export async function* readLines(stream: Readable): AsyncGenerator<string> {
  const decoder = new TextDecoder("utf-8", { fatal: true });
  let rest = Buffer.alloc(0);
  const textOf = (line: Buffer): string => {
    try {
      return decoder.decode(line).trim();
    } catch {
      throw new HttpProblem("invalid_encoding", "A line is not valid UTF-8.");
    }
  };
  for await (const part of stream) {
    rest = Buffer.concat([rest, part as Buffer]);
    for (let end = rest.indexOf(0x0a); end >= 0; end = rest.indexOf(0x0a)) {
      const line = textOf(rest.subarray(0, end));
      rest = rest.subarray(end + 1);
      if (line !== "") yield line;
    }
    if (rest.length > LINE_BYTES) {
      throw new HttpProblem("call_too_large", `A line holds at most ${LINE_BYTES} bytes.`, {
        limit: LINE_BYTES,
      });
    }
  }
  const last = textOf(rest);
  if (last !== "") yield last;
}
