export interface Run {
  readonly kind: "plain" | "strong" | "code";
  readonly text: string;
}

export type Block =
  | { readonly kind: "heading"; readonly level: number; readonly runs: readonly Run[] }
  | { readonly kind: "paragraph"; readonly runs: readonly Run[] }
  | { readonly kind: "list"; readonly items: readonly (readonly Run[])[] };

/** Reads the Markdown that a changelog is written in: headings, paragraphs, flat lists, `**strong**` and code. */
export function readMarkdown(text: string): Block[] {
  const blocks: Block[] = [];
  for (const lines of splitBlocks(text)) {
    const [first = ""] = lines;
    const heading = /^(#+) (.*)$/.exec(first);
    if (heading) {
      blocks.push({ kind: "heading", level: (heading[1] ?? "").length, runs: readRuns(heading[2] ?? "") });
      const rest = lines.slice(1);
      if (rest.length > 0) blocks.push({ kind: "paragraph", runs: readRuns(joined(rest)) });
    } else if (/^[-*] /.test(first)) {
      blocks.push({ kind: "list", items: itemsOf(lines).map(readRuns) });
    } else {
      blocks.push({ kind: "paragraph", runs: readRuns(joined(lines)) });
    }
  }
  return blocks;
}

function splitBlocks(text: string): string[][] {
  return text
    .split(/\n\s*\n/)
    .map((block) => block.split("\n").filter((line) => line.trim() !== ""))
    .filter((lines) => lines.length > 0);
}

/** A line that begins no item goes on with the one before. */
function itemsOf(lines: readonly string[]): string[] {
  return lines.reduce<string[]>((items, line) => {
    const item = /^[-*] (.*)$/.exec(line);
    return item ? [...items, item[1] ?? ""] : [...items.slice(0, -1), `${items.at(-1) ?? ""} ${line.trim()}`];
  }, []);
}

function joined(lines: readonly string[]): string {
  return lines.map((line) => line.trim()).join(" ");
}

/** Parts a line into plain words, `**strong**` ones and code in backticks. */
export function readRuns(text: string): Run[] {
  return text
    .split(/(\*\*[^*]+\*\*|`[^`]+`)/)
    .filter((part) => part !== "")
    .map((part) => {
      if (part.startsWith("**") && part.length > 4) return { kind: "strong", text: part.slice(2, -2) };
      if (part.startsWith("`") && part.length > 2) return { kind: "code", text: part.slice(1, -1) };
      return { kind: "plain", text: part };
    });
}
