import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { lineAndColumn, parseJsonText, placeOfPointer } from "./json-text.ts";

/** The stretch of the text at which a fault of `pointer` is shown. */
function stretchAt(text: string, pointer: string): string | null {
  const parsed = parseJsonText(text);
  const place = parsed.ok ? placeOfPointer(parsed.places, pointer) : null;
  return place && text.slice(place.from, place.to);
}

/** A member's name as RFC 6901 section 3 writes it in a pointer. */
const escapeName = (name: string) => name.replaceAll("~", "~0").replaceAll("/", "~1");

/** Every value of a document by its pointer; a member of an object with its name. */
function valuesOf(value: unknown, pointer = "", name: string | null = null): Place[] {
  const inside =
    typeof value === "object" && value !== null
      ? Object.entries(value).flatMap(([key, member]) =>
          valuesOf(member, `${pointer}/${escapeName(key)}`, Array.isArray(value) ? null : key),
        )
      : [];
  return [{ pointer, value, name }, ...inside];
}

interface Place {
  readonly pointer: string;
  readonly value: unknown;
  readonly name: string | null;
}

describe("parseJsonText", () => {
  it("reads what JSON.parse reads", () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 5 }), fc.constantFrom(undefined, 2, "\t"), (value, indent) => {
        const text = JSON.stringify(value, null, indent);
        expect(parseJsonText(text)).toMatchObject({ ok: true });
        const parsed = parseJsonText(text);
        expect(parsed.ok && JSON.stringify(parsed.value)).toBe(JSON.stringify(JSON.parse(text)));
      }),
    );
  });

  it("refuses what JSON.parse refuses", () => {
    const nearJson = fc
      .tuple(
        fc.jsonValue({ maxDepth: 3 }),
        fc.nat(),
        fc.constantFrom("", ",", '"', "}", "]", "x", "01", "\\"),
      )
      .map(([value, at, piece]) => {
        const text = JSON.stringify(value);
        const cut = at % (text.length + 1);
        return text.slice(0, cut) + piece + text.slice(cut + 1);
      });
    const accepts = (text: string) => {
      try {
        JSON.parse(text);
        return true;
      } catch {
        return false;
      }
    };
    fc.assert(
      fc.property(nearJson, (text) => {
        expect(parseJsonText(text).ok).toBe(accepts(text));
      }),
    );
  });

  it.each([
    ["", 0, "The text ends where a value should stand"],
    ['{ "a": 1, }', 10, null],
    ["[1 2]", 3, null],
    ['{ "a": 01 }', 7, null],
    ["[1] x", 4, "Nothing may follow the JSON value"],
  ])("says where %j stops being JSON", (text, at, detail) => {
    const parsed = parseJsonText(text);
    expect(parsed).toMatchObject({ ok: false, fault: { at } });
    if (detail !== null) expect(parsed).toMatchObject({ fault: { detail } });
  });

  it("stops at the depth that the service stops at", () => {
    expect(parseJsonText("[".repeat(31) + "]".repeat(31)).ok).toBe(true);
    expect(parseJsonText("[".repeat(2_000) + "]".repeat(2_000))).toMatchObject({
      fault: { detail: "Nested deeper than 32 levels" },
    });
  });
});

describe("a pointer's place in the text", () => {
  it("is where that value stands, whatever the names", () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 4 }), (document) => {
        const value: unknown = JSON.parse(JSON.stringify(document));
        const text = JSON.stringify(value, null, 2);
        for (const { pointer, value: expected, name } of valuesOf(value)) {
          const stretch = stretchAt(text, pointer) ?? "";
          // A member of an object begins at its name.
          const found: unknown = JSON.parse(name === null ? stretch : `{${stretch}}`);
          const whole = name === null ? expected : Object.fromEntries([[name, expected]]);
          expect(JSON.stringify(found)).toBe(JSON.stringify(whole));
        }
      }),
      { numRuns: 60 },
    );
  });

  // The document and pointers of RFC 6901 section 5.
  it.each([
    ["/foo", '"foo": ["bar", "baz"]'],
    ["/foo/0", '"bar"'],
    ["/", '"": 0'],
    ["/a~1b", '"a/b": 1'],
    ["/m~0n", '"m~n": 8'],
    ["", '{ "foo": ["bar", "baz"], "": 0, "a/b": 1, "m~n": 8 }'],
  ])("%s", (pointer, stretch) => {
    expect(stretchAt('{ "foo": ["bar", "baz"], "": 0, "a/b": 1, "m~n": 8 }', pointer)).toBe(stretch);
  });

  it("is the nearest thing round it for a member that is missing", () => {
    expect(stretchAt('{ "bores": [{ "id": "a" }] }', "/bores/0/points/3")).toBe('{ "id": "a" }');
    expect(stretchAt('{ "a": 1 }', "/units")).toBe('{ "a": 1 }');
  });

  it("has a line and a column, both from 1", () => {
    expect(lineAndColumn("ab\ncd\n", 0)).toEqual({ line: 1, column: 1 });
    expect(lineAndColumn("ab\ncd\n", 4)).toEqual({ line: 2, column: 2 });
    expect(lineAndColumn("ab\ncd\n", 6)).toEqual({ line: 3, column: 1 });
  });
});
