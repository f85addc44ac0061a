import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { flowKey, keyRowHeight, wrapWords } from "./flow-key.ts";
import { textWidth } from "./shape.ts";

describe("wrapWords", () => {
  const words = fc.array(fc.stringMatching(/^[a-z]{1,9}$/), { minLength: 1, maxLength: 30 });

  it("keeps every word in order, and no line is wider than the sheet", () => {
    fc.assert(
      fc.property(words, fc.integer({ min: 25, max: 200 }), (sentence, width) => {
        const lines = wrapWords(sentence.join(" "), width).map((line) => line.words);
        expect(lines.join(" ")).toBe(sentence.join(" "));
        for (const line of lines) expect(textWidth(line)).toBeLessThanOrEqual(width);
      }),
    );
  });
});

describe("flowKey", () => {
  const entry = (words: string) => ({ words, sampleWidth: 3, sample: () => [] });

  it("sets entries side by side while they fit, then in a new row", () => {
    const one = textWidth("conforms") + 4.6;
    const { shapes, height } = flowKey(
      [entry("conforms"), entry("conforms"), entry("conforms")],
      { x: 0, y: 0 },
      2 * one + 7,
    );
    const rows = shapes.flatMap((shape) => (shape.kind === "text" ? [shape.at.y] : []));
    expect(new Set(rows).size).toBe(2);
    expect(rows[0]).toBe(rows[1]);
    expect(height).toBe(2 * keyRowHeight);
  });

  it("takes no room without entries", () => {
    expect(flowKey([], { x: 0, y: 0 }, 100)).toEqual({ shapes: [], height: 0 });
  });
});
