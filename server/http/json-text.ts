import type { Fault } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { HttpProblem } from "./http-problem.ts";

export interface ParsedJson {
  readonly value: unknown;
  /** What the text says that the value cannot hold: to be answered together with the faults of the schema. */
  readonly faults: readonly Fault[];
}

/**
 * Parses a JSON body and finds what `JSON.parse` lets pass in silence: a member twice in one object, nesting past the
 * limit, an integer too large to be exact, a number that overflows to Infinity or underflows to 0, NUL or lone
 * surrogates in text, a member named `__proto__`. Written here because libraries that tell where a member stands twice
 * are some ten times slower than `JSON.parse`, and a call may hold 4 MiB.
 * @throws HttpProblem invalid_json, duplicate_key, too_deep (400)
 */
export function parseJsonText(text: string): ParsedJson {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    throw new HttpProblem("invalid_json", error instanceof Error ? error.message : "The body is not JSON.");
  }
  return { value, faults: new JsonScan(text).check() };
}

/** Code units that steer the scan. */
const char = {
  quote: 34,
  comma: 44,
  minus: 45,
  zero: 48,
  nine: 57,
  openBracket: 91,
  backslash: 92,
  closeBracket: 93,
  openBrace: 123,
  closeBrace: 125,
} as const;

interface Frame {
  readonly names: Set<string> | null;
  step: string | number;
}

/** One pass over text that is known to be JSON. */
class JsonScan {
  private at = 0;
  private readonly frames: Frame[] = [];
  private readonly faults: Fault[] = [];

  constructor(private readonly text: string) {}

  check(): readonly Fault[] {
    let nameComes = false;
    while (this.at < this.text.length) {
      const unit = this.text.charCodeAt(this.at);
      const frame = this.frames.at(-1);
      if (unit === char.quote) {
        const start = this.at;
        const content = this.readString();
        if (nameComes && frame?.names) {
          this.nameMember(frame, frame.names, content, start);
          nameComes = false;
        }
      } else if (unit === char.openBrace || unit === char.openBracket) {
        this.open(unit === char.openBrace);
        nameComes = unit === char.openBrace;
      } else if (unit === char.closeBrace || unit === char.closeBracket) {
        this.frames.pop();
        nameComes = false;
        this.at += 1;
      } else if (unit === char.comma) {
        if (frame && typeof frame.step === "number") frame.step += 1;
        nameComes = frame !== undefined && frame.names !== null;
        this.at += 1;
      } else if (unit === char.minus || (unit >= char.zero && unit <= char.nine)) {
        this.readNumber();
      } else {
        this.at += 1;
      }
    }
    return this.faults;
  }

  private open(object: boolean): void {
    if (this.frames.length >= limits.jsonDepth) {
      throw new HttpProblem("too_deep", `The body is nested more than ${limits.jsonDepth} levels deep.`, {
        limit: limits.jsonDepth,
      });
    }
    this.frames.push({ names: object ? new Set() : null, step: object ? "" : 0 });
    this.at += 1;
  }

  private nameMember(frame: Frame, names: Set<string>, name: string, offset: number): void {
    frame.step = name;
    if (name === "__proto__") this.note("unknown_field", "A member of this name is never taken.");
    if (names.has(name)) {
      const pointer = this.pointer();
      throw new HttpProblem("duplicate_key", `${pointer} stands twice, again at character ${offset}.`, {
        errors: [{ pointer, code: "duplicate_key", detail: `Stands again at character ${offset}.` }],
      });
    }
    names.add(name);
  }

  private readString(): string {
    const start = this.at;
    let end = start + 1;
    let plain = true;
    for (let unit = this.text.charCodeAt(end); unit !== char.quote; unit = this.text.charCodeAt(end)) {
      if (unit === char.backslash) {
        plain = false;
        end += 1;
      } else if (unit >= 0xd800 && unit <= 0xdfff) {
        plain = false;
      }
      end += 1;
    }
    this.at = end + 1;
    if (plain) return this.text.slice(start + 1, end);
    const content = JSON.parse(this.text.slice(start, end + 1)) as string;
    if (content.includes("\0") || /\p{Surrogate}/u.test(content)) {
      this.note("text_invalid", "Text holds NUL or half of a surrogate pair.");
    }
    return content;
  }

  private readNumber(): void {
    const start = this.at;
    let end = start + 1;
    while (end < this.text.length && "0123456789+-.eE".includes(this.text.charAt(end))) end += 1;
    this.at = end;
    // Fifteen characters cannot overflow, underflow or lose a digit, unless an exponent is among them.
    const literal = this.text.slice(start, end);
    const scaled = literal.includes("e") || literal.includes("E");
    if (!scaled && literal.length <= 15) return;
    const value = Number(literal);
    if (!Number.isFinite(value))
      this.note("number_not_finite", `${shown(literal)} is too large for a 64-bit float.`);
    if (value === 0 && /[1-9]/.test(literal.split(/[eE]/)[0] ?? "")) {
      this.note("number_not_finite", `${shown(literal)} is too small for a 64-bit float and would become 0.`);
    }
    if (/^-?\d+$/.test(literal) && !Number.isSafeInteger(value)) {
      this.note("number_not_exact", `${shown(literal)} cannot be held exactly.`);
    }
  }

  private note(code: Fault["code"], detail: string): void {
    if (this.faults.length <= limits.faultsListed)
      this.faults.push({ pointer: this.pointer(), code, detail });
  }

  private pointer(): string {
    return pointerOf(this.frames.map((frame) => frame.step));
  }
}

const shown = (literal: string): string =>
  literal.length <= limits.echoedTextLength ? literal : `${literal.slice(0, limits.echoedTextLength)}…`;
