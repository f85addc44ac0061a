import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { parseJsonText } from "./json-text.ts";

describe("parseJsonText", () => {
  it("gives the value that JSON.parse gives, and no fault, for whatever JSON.stringify writes", () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 8, noUnicodeString: false }), (value) => {
        const text = JSON.stringify(value);
        // Integers past 2^53 − 1 are refused by design, as are the names and texts below.
        fc.pre(!/(?<![\d.eE+])\d{16,}(?![\d.eE])/.test(text));
        fc.pre(!/__proto__|\\u0000|\\ud[89a-f]/i.test(text));
        expect(parseJsonText(text)).toEqual({ value: JSON.parse(text) as unknown, faults: [] });
      }),
    );
  });

  it("finds a member that stands twice wherever it stands, by pointer", () => {
    const twice = (text: string) => () => parseJsonText(text);
    expect(twice('{"a":1,"a":2}')).toThrow(expect.objectContaining({ code: "duplicate_key" }) as Error);
    for (const [text, pointer] of [
      ['[{"b":[],"c":{"a":1,"b":2,"a":3}}]', "/0/c/a"],
      ['{"x~/y":[0,{"k":1,"k":1}]}', "/x~0~1y/1/k"],
      ['{"\\u0061":1,"a":2}', "/a"],
    ] as const) {
      expect(twice(text)).toThrow(
        expect.objectContaining({ members: { errors: [expect.objectContaining({ pointer })] } }) as Error,
      );
    }
  });

  it("takes the same name again in another object, and names that are values elsewhere", () => {
    expect(parseJsonText('[{"a":"a"},{"a":["a","a"]}]').faults).toEqual([]);
  });

  it("names every number that a float cannot hold, and takes those at the edge", () => {
    const codes = (text: string) => parseJsonText(text).faults.map(({ pointer, code }) => [pointer, code]);
    expect(codes('{"a":[1e400,-1e309,1],"b":1e-400,"c":9007199254740992}')).toEqual([
      ["/a/0", "number_not_finite"],
      ["/a/1", "number_not_finite"],
      ["/b", "number_not_finite"],
      ["/c", "number_not_exact"],
    ]);
    const edge =
      "[0,-0,0e10,0.0000000000000000000,5e-324,1.7976931348623157e308,9007199254740991,0.12345678901234567890]";
    expect(codes(edge)).toEqual([]);
  });

  it("is not misled by braces, commas and quotes inside text", () => {
    expect(parseJsonText('{"a":"},{\\"a\\":[","b\\\\":"\\\\","c":"x"}').faults).toEqual([]);
  });
});
