import { randomBytes } from "node:crypto";
import { crc32 } from "node:zlib";

/**
 * `bw_live_<selector>_<secret><check>`: the selector finds the row, the secret proves it (190 random bits), the check
 * (CRC-32 of all before it) lets a mistyped or made-up key be refused without asking the database, and lets secret
 * scanners be sure of a find: /bw_live_[0-9A-Za-z]{12}_[0-9A-Za-z]{38}/.
 */
const ALPHABET = "0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz";
const SELECTOR_LENGTH = 12;
const SECRET_LENGTH = 32;
const CHECK_LENGTH = 6;
const FORM = new RegExp(
  `^bw_live_([0-9A-Za-z]{${SELECTOR_LENGTH}})_([0-9A-Za-z]{${SECRET_LENGTH}})([0-9A-Za-z]{${CHECK_LENGTH}})$`,
);

export interface KeyParts {
  readonly selector: string;
  readonly secret: string;
}

/** A new key: its parts, and the text to show once. */
export function makeKey(): KeyParts & { readonly text: string } {
  const parts = { selector: randomText(SELECTOR_LENGTH), secret: randomText(SECRET_LENGTH) };
  const head = `${keyPrefix(parts.selector)}_${parts.secret}`;
  return { ...parts, text: `${head}${checkOf(head)}` };
}

/** The part that may be shown and logged. */
export function keyPrefix(selector: string): string {
  return `bw_live_${selector}`;
}

/** The parts of a key whose check fits; null for anything else. */
export function parseKey(text: string): KeyParts | null {
  const [, selector, secret, check] = FORM.exec(text) ?? [];
  if (!selector || !secret || checkOf(text.slice(0, -CHECK_LENGTH)) !== check) return null;
  return { selector, secret };
}

/** Whether a text means to be one of our keys, whole or not. */
export function looksLikeKey(text: string): boolean {
  return text.startsWith("bw_");
}

/** Uniform characters: bytes past the last whole multiple of the alphabet are drawn again. */
export function randomText(length: number): string {
  const limit = 256 - (256 % ALPHABET.length);
  let text = "";
  while (text.length < length) {
    for (const byte of randomBytes(length)) {
      if (byte < limit && text.length < length) text += ALPHABET.charAt(byte % ALPHABET.length);
    }
  }
  return text;
}

function checkOf(head: string): string {
  let rest = crc32(head);
  let check = "";
  for (let digit = 0; digit < CHECK_LENGTH; digit += 1) {
    check = ALPHABET.charAt(rest % ALPHABET.length) + check;
    rest = Math.floor(rest / ALPHABET.length);
  }
  return check;
}
