import { request as requestHttp, type ClientRequest, type IncomingMessage } from "node:http";
import { request as requestHttps } from "node:https";
import type { LookupFunction } from "node:net";
import type { Address, Target } from "./check-target.ts";

/** As much of an answer as is read; whatever comes after is nobody's concern. */
const READ_BYTES = 64 * 1024;
/** As much of it as is kept. */
const KEPT_BYTES = 1024;

export interface Answered {
  readonly status: number;
  readonly retryAfter: string | undefined;
  readonly replyText: string;
}

/**
 * Posts to a checked address and to no other: the connection takes the numbers that were checked, and a redirect is an
 * answer like any other. Reads at most 64 kB, and stops with `signal`: what had been answered by then counts.
 * @throws the error of the connection; AbortError when `signal` came before an answer
 */
export function postMessage(
  { url, addresses }: Target,
  headers: Record<string, string>,
  body: string,
  signal: AbortSignal,
): Promise<Answered> {
  const request = url.protocol === "https:" ? requestHttps : requestHttp;
  return new Promise((resolve, reject) => {
    const sent: ClientRequest = request(
      url,
      {
        method: "POST",
        headers,
        agent: false,
        lookup: pinnedTo(addresses),
        signal,
        maxHeaderSize: 16 * 1024,
      },
      (answer) => {
        // From here on the answer is what counts: what breaks off afterwards takes nothing from it.
        sent.off("error", reject).on("error", () => undefined);
        readSome(answer).then(
          (replyText) => {
            sent.destroy();
            const { statusCode = 0, headers: answered } = answer;
            resolve({ status: statusCode, retryAfter: answered["retry-after"], replyText });
          },
          (error: unknown) => reject(error instanceof Error ? error : new Error(String(error))),
        );
      },
    );
    sent.on("error", reject);
    sent.end(body);
  });
}

/** A look-up that looks nothing up. */
function pinnedTo(addresses: readonly Address[]): LookupFunction {
  return (_name, options, callback) => {
    const [first] = addresses;
    if (!first) callback(new Error("There is no address."), "");
    else if (options.all)
      callback(
        null,
        addresses.map(({ address, family }) => ({ address, family })),
      );
    else callback(null, first.address, first.family);
  };
}

/** The beginning of an answer as text. An answer that breaks off has been given all the same. */
async function readSome(answer: IncomingMessage): Promise<string> {
  const kept: Buffer[] = [];
  let read = 0;
  try {
    for await (const chunk of answer as AsyncIterable<Buffer>) {
      if (read < KEPT_BYTES) kept.push(chunk.subarray(0, KEPT_BYTES - read));
      read += chunk.length;
      if (read >= READ_BYTES) break;
    }
  } catch {
    // Cut by the other side, or by us for taking too long.
  }
  return printable(Buffer.concat(kept));
}

/** Text that fits its column whatever was sent: at most 1 kB, nothing that is no character. */
function printable(bytes: Buffer): string {
  const text = new TextDecoder().decode(bytes).replaceAll(/[^\P{C}\n\t]/gu, "\u{FFFD}");
  return text.slice(0, KEPT_BYTES);
}
