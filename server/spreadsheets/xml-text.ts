/** Text as XML holds it: what it cannot hold is replaced, what would be markup escaped. */
export function xmlText(text: string): string {
  return [...text]
    .map((sign) => (isPossible(sign.codePointAt(0) ?? 0) ? (escapes[sign] ?? sign) : "\ufffd"))
    .join("");
}

const escapes: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "\r": "&#13;",
};

/** XML 1.0 (fifth edition), production 2. */
function isPossible(code: number): boolean {
  if (code < 0x20) return code === 0x09 || code === 0x0a || code === 0x0d;
  return !(code >= 0xd800 && code <= 0xdfff) && code !== 0xfffe && code !== 0xffff;
}

/**
 * Text as a cell holds it: ECMA-376 part 1, 22.4.2.4 (bstr) writes what XML cannot hold, and a carriage return, as
 * _xHHHH_, and an underscore before what looks like that as _x005F_. Readers turn it back.
 */
export function cellText(text: string): string {
  return text
    .replaceAll(/_(?=x[0-9A-Fa-f]{4}_)/g, "_x005F_")
    .replaceAll(/[^\t\n\u0020-\u{10ffff}]|[\ud800-\udfff\ufffe\uffff]/gu, (sign) => {
      const code = sign.charCodeAt(0);
      // Half of a pair is no character at all.
      return code >= 0xd800 && code <= 0xdfff
        ? "\ufffd"
        : `_x${code.toString(16).toUpperCase().padStart(4, "0")}_`;
    });
}
