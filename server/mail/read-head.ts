/** What a list shows of a mail. */
export interface MailHead {
  readonly to: readonly string[];
  readonly subject: string;
  readonly date: string | null;
}

/** Reads To, Subject and Date from the head of a mail (RFC 5322; encoded words of RFC 2047 in UTF-8, as they are sent). */
export function readMailHead(text: string): MailHead {
  const [head = ""] = text.split(/\r?\n\r?\n/, 1);
  const lines = head.replaceAll(/\r?\n[ \t]+/g, " ").split(/\r?\n/);
  const field = (name: string): string => {
    const line = lines.find((found) => found.toLowerCase().startsWith(`${name}:`)) ?? "";
    return line.slice(name.length + 1).trim();
  };
  const sent = Date.parse(field("date"));
  return {
    to: field("to")
      .split(",")
      .map((recipient) => /<([^>]*)>/.exec(recipient)?.[1] ?? recipient.trim())
      .filter((recipient) => recipient !== ""),
    subject: decodeWords(field("subject")),
    date: Number.isNaN(sent) ? null : new Date(sent).toISOString(),
  };
}

function decodeWords(text: string): string {
  return text
    .replaceAll(/(=\?[^?]+\?[bq]\?[^?]*\?=)\s+(?==\?)/gi, "$1")
    .replaceAll(/=\?utf-8\?([bq])\?([^?]*)\?=/gi, (_, way: string, coded: string) =>
      way.toLowerCase() === "b" ? Buffer.from(coded, "base64").toString() : decodeQuoted(coded),
    );
}

function decodeQuoted(coded: string): string {
  const bytes = coded
    .replaceAll("_", " ")
    .replaceAll(/=([0-9A-F]{2})/gi, (_, hex: string) => String.fromCharCode(Number.parseInt(hex, 16)));
  return Buffer.from(bytes, "latin1").toString();
}
