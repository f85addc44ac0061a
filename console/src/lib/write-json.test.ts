import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { writeJson } from "./write-json.ts";

describe("writeJson", () => {
  it("writes what is read back the same", () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 5 }), fc.integer({ min: 1, max: 120 }), (value, width) => {
        expect(JSON.stringify(JSON.parse(writeJson(value, width)))).toBe(JSON.stringify(value));
      }),
    );
  });

  it("sets on one line what fits there, and parts what does not", () => {
    const value = {
      id: "brg-1",
      centre: { h: 0.01, v: -0.066 },
      covariance: [
        [1, 0],
        [0, 1],
      ],
      empty: {},
      none: [],
    };
    expect(writeJson(value, 40)).toBe(
      [
        "{",
        '  "id": "brg-1",',
        '  "centre": { "h": 0.01, "v": -0.066 },',
        '  "covariance": [[1, 0], [0, 1]],',
        '  "empty": {},',
        '  "none": []',
        "}",
      ].join("\n"),
    );
    expect(writeJson([1, 2, 3], 5)).toBe("[\n  1,\n  2,\n  3\n]");
  });

  it("leaves out what is undefined, as JSON.stringify does", () => {
    expect(writeJson({ a: undefined, b: [undefined] })).toBe('{ "b": [null] }');
  });
});
