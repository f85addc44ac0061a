/**
 * Ranges of what draws nothing, reorders what stands beside it or ends a line: control characters, bidirectional controls
 * (Unicode Standard Annex 9), invisible, private and unassigned-for-good characters, halves of surrogate pairs.
 */
const activeRanges: readonly (readonly [first: number, last: number])[] = [
  [0x00, 0x1f],
  [0x7f, 0x9f],
  [0xad, 0xad],
  [0x61c, 0x61c],
  [0x180e, 0x180e],
  [0x200b, 0x200f],
  [0x2028, 0x202e],
  [0x2060, 0x206f],
  [0xd800, 0xdfff],
  [0xe000, 0xf8ff],
  [0xfeff, 0xfeff],
  [0xfff0, 0xffff],
  [0xe0000, 0x10ffff],
];

/** Text as a reader may see it: what would act instead of being read stands as its code point, "[U+202E]". */
export function inertText(text: string): string {
  return Array.from(text.normalize("NFC"), (character) =>
    isActive(character.codePointAt(0) ?? 0) ? writeCodePoint(character) : character,
  ).join("");
}

/** A character by its number, as the Unicode Standard writes it. */
export function writeCodePoint(character: string): string {
  const code = character.codePointAt(0) ?? 0;
  return `[U+${code.toString(16).toUpperCase().padStart(4, "0")}]`;
}

function isActive(code: number): boolean {
  return activeRanges.some(([first, last]) => code >= first && code <= last);
}
