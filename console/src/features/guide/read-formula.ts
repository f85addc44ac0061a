export interface FormulaPart {
  readonly set: "plain" | "low" | "high";
  readonly text: string;
}

/** Letters and figures that a mark without braces takes. */
const bare = "[A-Za-z0-9]+";
const marked = new RegExp(`([_^])(?:\\{([^}]*)\\}|(${bare}))`, "g");

/** Parts a formula's line: `u_i` and `u_{max}` low, `x^2` and `W^{−1}` high. */
export function readFormula(line: string): FormulaPart[] {
  const parts: FormulaPart[] = [];
  let end = 0;
  for (const match of line.matchAll(marked)) {
    if (match.index > end) parts.push({ set: "plain", text: line.slice(end, match.index) });
    parts.push({ set: match[1] === "_" ? "low" : "high", text: match[2] ?? match[3] ?? "" });
    end = match.index + match[0].length;
  }
  if (end < line.length) parts.push({ set: "plain", text: line.slice(end) });
  return parts;
}
