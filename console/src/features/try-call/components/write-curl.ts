/** The variable that stands for the key: a key itself is never put on the clipboard with a command. */
export const keyPlaceholder = "$BOREWRIGHT_KEY";

/** A call as a curl line for a POSIX shell. */
export function writeCurl(origin: string, path: string, bodyText: string): string {
  return [
    `curl -sS ${quote(origin + path)}`,
    `  -H "Authorization: Bearer ${keyPlaceholder}"`,
    `  -H 'Content-Type: application/json'`,
    `  --data-binary ${quote(bodyText)}`,
  ].join(" \\\n");
}

function quote(text: string): string {
  return `'${text.replaceAll("'", `'\\''`)}'`;
}
