import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createEventReader } from "./read-event-stream.ts";

const dataOf = (text: string): string[] =>
  createEventReader()
    .take(text)
    .map(({ data }) => data);

/*
 * The streams and what comes of them are the examples of the HTML Standard, section 9.2.6, "Interpreting an event
 * stream"; from memory.
 */
describe("createEventReader", () => {
  it("joins the lines of one event", () => {
    expect(createEventReader().take("data: YHOO\ndata: +2\ndata: 10\n\n")).toEqual([
      { type: "message", data: "YHOO\n+2\n10" },
    ]);
  });

  it("passes over comments, keeps an id until it is taken back, and one leading space only is dropped", () => {
    const reader = createEventReader();
    expect(reader.take(": test stream\n\n")).toEqual([]);
    expect(reader.take("data: first event\nid: 1\n\n")).toEqual([{ type: "message", data: "first event" }]);
    expect(reader.lastId()).toBe("1");
    expect(reader.take("data:second event\nid\n\n")).toEqual([{ type: "message", data: "second event" }]);
    expect(reader.lastId()).toBe("");
    expect(reader.take("data:  third event\n\n")).toEqual([{ type: "message", data: " third event" }]);
  });

  it("gives empty data, and nothing for a block that the stream's end cuts off", () => {
    expect(dataOf("data\n\ndata\ndata\n\ndata:")).toEqual(["", "\n"]);
    expect(dataOf("data:test\n\ndata: test\n\n")).toEqual(["test", "test"]);
  });

  it("names the event, and goes back to message", () => {
    expect(createEventReader().take("event: add\ndata: 7\n\ndata: 8\n\nfoo: bar\n\n")).toEqual([
      { type: "add", data: "7" },
      { type: "message", data: "8" },
    ]);
  });

  it("takes an id that stands alone, without an event", () => {
    const reader = createEventReader();
    expect(reader.take("id: 41\n")).toEqual([]);
    expect(reader.lastId()).toBe("");
    expect(reader.take("\n")).toEqual([]);
    expect(reader.lastId()).toBe("41");
    reader.take("id: 4\u00002\n\n");
    expect(reader.lastId()).toBe("41");
  });

  it("leaves a byte order mark at the beginning out, and there alone", () => {
    expect(dataOf("\uFEFFdata: a\n\ndata: \uFEFFb\n\n")).toEqual(["a", "\uFEFFb"]);
  });

  it("reads the same wherever the stream is cut, whatever ends its lines", () => {
    const block = fc.record({
      id: fc.nat(99),
      type: fc.constantFrom("entry", "end"),
      lines: fc.array(fc.string()),
    });
    const ends = fc.constantFrom("\n", "\r\n", "\r");
    fc.assert(
      fc.property(fc.array(block, { maxLength: 5 }), ends, fc.array(fc.nat(60)), (blocks, end, cuts) => {
        const sent = blocks.map(({ id, type, lines }) => ({
          id,
          type,
          lines: lines.map((line) => line.replaceAll(/[\r\n]/g, "")),
        }));
        const text = sent
          .map(({ id, type, lines }) =>
            [`id: ${id}`, `event: ${type}`, ...lines.map((line) => `data: ${line}`), "", ""].join(end),
          )
          .join("");
        const reader = createEventReader();
        const heard = [];
        let from = 0;
        for (const cut of cuts) {
          heard.push(...reader.take(text.slice(from, from + cut)));
          from += cut;
        }
        heard.push(...reader.take(text.slice(from)));
        expect(heard).toEqual(
          sent
            .filter(({ lines }) => lines.length > 0)
            .map(({ type, lines }) => ({ type, data: lines.join("\n") })),
        );
        expect(reader.lastId()).toBe(String(sent.at(-1)?.id ?? ""));
      }),
    );
  });
});
