/** One event of a stream, as the standard would dispatch it. */
export interface StreamEvent {
  readonly type: string;
  readonly data: string;
}

export interface EventReader {
  /** Takes the next piece of the stream, cut anywhere; gives the events that it completes. */
  readonly take: (text: string) => StreamEvent[];
  /** What to send as Last-Event-ID to go on from here; empty where the stream named none. */
  readonly lastId: () => string;
}

/**
 * Interprets server-sent events as the HTML Standard does, section 9.2.6 (from memory). The browser's own EventSource
 * sends no Authorization, so the stream is fetched and read here. `retry` is left to the caller.
 */
export function createEventReader(): EventReader {
  let [rest, afterReturn, begun] = ["", false, false];
  let [type, data, id, lastId] = ["", [] as string[], "", ""];

  const dispatch = (): StreamEvent[] => {
    lastId = id;
    const event = data.length > 0 ? [{ type: type === "" ? "message" : type, data: data.join("\n") }] : [];
    [type, data] = ["", []];
    return event;
  };
  const takeLine = (line: string): StreamEvent[] => {
    if (line === "") return dispatch();
    const colon = line.indexOf(":");
    const field = colon < 0 ? line : line.slice(0, colon);
    const value = colon < 0 ? "" : line.slice(colon + 1).replace(/^ /, "");
    if (field === "event") type = value;
    if (field === "data") data.push(value);
    if (field === "id" && !value.includes("\0")) id = value;
    return [];
  };
  const take = (text: string): StreamEvent[] => {
    if (text === "") return [];
    let piece = text;
    if (!begun) piece = piece.replace(/^\uFEFF/, "");
    begun = true;
    // The line feed of a pair that was cut in two belongs to the line before.
    if (afterReturn) piece = piece.replace(/^\n/, "");
    if (piece === "") {
      afterReturn = false;
      return [];
    }
    afterReturn = piece.endsWith("\r");
    const lines = (rest + piece).split(/\r\n|\n|\r/);
    rest = lines.pop() ?? "";
    return lines.flatMap(takeLine);
  };
  return { take, lastId: () => lastId };
}
