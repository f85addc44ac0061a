import { limits } from "../../../shared/limits.ts";

/** A stretch of text: from the first character, to after the last. */
export interface Place {
  readonly from: number;
  readonly to: number;
}

export interface JsonSyntaxFault {
  readonly detail: string;
  readonly at: number;
}

export type ParsedJson =
  | {
      readonly ok: true;
      readonly value: unknown;
      /** RFC 6901 pointer → where that value stands; a member of an object begins at its name. */
      readonly places: ReadonlyMap<string, Place>;
    }
  | { readonly ok: false; readonly fault: JsonSyntaxFault };

class SyntaxFault extends Error {
  constructor(
    message: string,
    readonly at: number,
  ) {
    super(message);
  }
}

/** Parses JSON and remembers where every value stands, so that a fault named by pointer can be shown in the text. */
export function parseJsonText(text: string): ParsedJson {
  const reader = new JsonReader(text);
  try {
    return { ok: true, value: reader.readDocument(), places: reader.places };
  } catch (error) {
    if (!(error instanceof SyntaxFault)) throw error;
    return { ok: false, fault: { detail: error.message, at: error.at } };
  }
}

class JsonReader {
  readonly places = new Map<string, Place>();
  private at = 0;

  constructor(private readonly text: string) {}

  readDocument(): unknown {
    const value = this.readValue("", 0);
    this.skipSpace();
    if (this.at < this.text.length) this.fail("Nothing may follow the JSON value");
    return value;
  }

  private readValue(pointer: string, depth: number): unknown {
    if (depth > limits.jsonDepth) this.fail(`Nested deeper than ${limits.jsonDepth} levels`);
    this.skipSpace();
    const from = this.at;
    const value = this.readAny(pointer, depth);
    this.places.set(pointer, { from: this.places.get(pointer)?.from ?? from, to: this.at });
    return value;
  }

  private readAny(pointer: string, depth: number): unknown {
    const first = this.text[this.at];
    if (first === undefined) this.fail("The text ends where a value should stand");
    if (first === "{") return this.readObject(pointer, depth);
    if (first === "[") return this.readArray(pointer, depth);
    if (first === '"') return this.readString();
    return this.readScalar();
  }

  private readObject(pointer: string, depth: number): unknown {
    this.at += 1;
    const members = new Map<string, unknown>();
    this.skipSpace();
    if (this.take("}")) return {};
    do {
      this.skipSpace();
      const from = this.at;
      if (this.text[this.at] !== '"') this.fail("A member name in double quotes should stand here");
      const name = this.readString();
      if (members.has(name)) this.fail(`"${name}" stands twice in one object`, from);
      const place = `${pointer}/${name.replaceAll("~", "~0").replaceAll("/", "~1")}`;
      this.skipSpace();
      if (!this.take(":")) this.fail("A colon should stand here");
      this.places.set(place, { from, to: this.at });
      members.set(name, this.readValue(place, depth + 1));
      this.skipSpace();
    } while (this.take(","));
    if (!this.take("}")) this.fail("A comma or a closing brace should stand here");
    return Object.fromEntries(members);
  }

  private readArray(pointer: string, depth: number): unknown[] {
    this.at += 1;
    const items: unknown[] = [];
    this.skipSpace();
    if (this.take("]")) return items;
    do {
      items.push(this.readValue(`${pointer}/${items.length}`, depth + 1));
      this.skipSpace();
    } while (this.take(","));
    if (!this.take("]")) this.fail("A comma or a closing bracket should stand here");
    return items;
  }

  private readString(): string {
    const string = /"(?:[^"\\\r\n]|\\[^\r\n])*"/y;
    string.lastIndex = this.at;
    const found = string.exec(this.text)?.[0];
    if (found === undefined) this.fail("This string does not end on its line");
    try {
      const read = JSON.parse(found) as string;
      this.at += found.length;
      return read;
    } catch {
      return this.fail("This string holds a control character or an escape that JSON does not know");
    }
  }

  private readScalar(): unknown {
    const scalar = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?(?![\w.+-])|(?:true|false|null)\b/y;
    scalar.lastIndex = this.at;
    const found = scalar.exec(this.text)?.[0];
    if (found === undefined)
      this.fail("A value should stand here: a number is written 0.5, a text in double quotes");
    this.at += found.length;
    return JSON.parse(found) as unknown;
  }

  private take(sign: string): boolean {
    if (this.text[this.at] !== sign) return false;
    this.at += 1;
    return true;
  }

  private skipSpace(): void {
    const space = /[ \t\r\n]*/y;
    space.lastIndex = this.at;
    this.at += space.exec(this.text)?.[0].length ?? 0;
  }

  private fail(detail: string, at = this.at): never {
    throw new SyntaxFault(detail, at);
  }
}

/** The place a fault points at; for a member that is missing, the nearest thing round it that is there. */
export function placeOfPointer(places: ReadonlyMap<string, Place>, pointer: string): Place | null {
  let nearest = pointer;
  while (!places.has(nearest) && nearest !== "") nearest = nearest.slice(0, nearest.lastIndexOf("/"));
  return places.get(nearest) ?? null;
}

/** Line and column of a character, both from 1. */
export function lineAndColumn(text: string, at: number): { line: number; column: number } {
  const before = text.slice(0, at);
  return { line: before.split("\n").length, column: at - before.lastIndexOf("\n") };
}
