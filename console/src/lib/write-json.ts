const indent = "  ";

/** JSON for a reader: what fits on one line stands on one line, as a point or a covariance does. */
export function writeJson(value: unknown, width = 88): string {
  return write(value, "", width);
}

/** `before` is the indentation of the line that the value begins on. */
function write(value: unknown, before: string, width: number): string {
  const onOneLine = writeOnOneLine(value);
  if (typeof value !== "object" || value === null || before.length + onOneLine.length <= width)
    return onOneLine;
  const inside = before + indent;
  if (Array.isArray(value)) {
    const items = value.map((item) => inside + write(item, inside, width));
    return `[\n${items.join(",\n")}\n${before}]`;
  }
  const members = entriesOf(value).map(
    ([name, member]) => `${inside}${JSON.stringify(name)}: ${write(member, inside, width - name.length - 4)}`,
  );
  return `{\n${members.join(",\n")}\n${before}}`;
}

function writeOnOneLine(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(writeOnOneLine).join(", ")}]`;
  if (typeof value !== "object" || value === null) return JSON.stringify(value) ?? "null";
  const members = entriesOf(value).map(
    ([name, member]) => `${JSON.stringify(name)}: ${writeOnOneLine(member)}`,
  );
  return members.length === 0 ? "{}" : `{ ${members.join(", ")} }`;
}

function entriesOf(value: object): [string, unknown][] {
  return Object.entries(value).filter(([, member]) => member !== undefined);
}
