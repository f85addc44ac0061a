import { inertText, writeCodePoint } from "../../../../shared/figures/inert-text.ts";
import { fontFor } from "../paint/fonts.ts";

/** An accent that no letter takes up: it would stand over its neighbour, without room of its own. */
const mark = /\p{M}/u;

/**
 * Text as the sheets can show it: line ends kept, what acts instead of being read and what the type has no letter for
 * written as code points. Every character then takes the same room.
 */
export function legibleText(text: string): string {
  return text
    .replaceAll(/\r\n?|[\u2028\u2029]/g, "\n")
    .replaceAll("\t", " ")
    .split("\n")
    .map((line) =>
      Array.from(inertText(line), (character) =>
        mark.test(character) || fontFor(character) === null ? writeCodePoint(character) : character,
      ).join(""),
    )
    .join("\n");
}

/** The same in one line. */
export function legibleLine(text: string): string {
  return legibleText(text).replaceAll(/ *\n+ */g, " ");
}
