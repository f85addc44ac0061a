import { spawnSync } from "node:child_process";

/** One word of a page and its box, in millimetres from the page's top left. */
export interface PdfWord {
  readonly text: string;
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** A PDF as Poppler's programs read it: readers that share nothing with what wrote it. */
export interface ReadPdf {
  /** As `pdfinfo` names them: Pages, Tagged, Title, … */
  readonly info: Readonly<Record<string, string>>;
  /** The text of each page, laid out as it stands there. */
  readonly pages: readonly string[];
  readonly words: readonly (readonly PdfWord[])[];
  /** The tagged structure as `pdfinfo -struct` prints it. */
  readonly structure: string;
  /** The words that stand for each figure, in the order of the file. */
  readonly alternatives: readonly string[];
  /** One line a font: name, type, encoding, embedded, subset, with Unicode. */
  readonly fonts: readonly string[];
}

export function readPdf(bytes: Uint8Array): ReadPdf {
  return {
    info: Object.fromEntries(
      run("pdfinfo", ["-isodates", "-"], bytes)
        .split("\n")
        .flatMap((line) => {
          const [, name, value] = /^([^:]+):\s*(.*)$/.exec(line) ?? [];
          return name === undefined ? [] : [[name, value ?? ""]];
        }),
    ),
    pages: run("pdftotext", ["-layout", "-", "-"], bytes).split("\f").slice(0, -1),
    words: run("pdftotext", ["-bbox", "-", "-"], bytes).split("<page ").slice(1).map(wordsOf),
    structure: run("pdfinfo", ["-struct", "-"], bytes),
    alternatives: alternativesOf(Buffer.from(bytes).toString("latin1")),
    fonts: run("pdffonts", ["-"], bytes).trim().split("\n").slice(2),
  };
}

/** Texts under /Alt of dictionaries that are not packed: ISO 32000-1, 7.3.4.2 (escapes) and 7.9.2.2 (UTF-16). */
function alternativesOf(file: string): string[] {
  return [...file.matchAll(/\/Alt \(((?:\\[^]|[^\\)])*)\)/g)].map(([, escaped = ""]) => {
    const plain = escaped.replaceAll(
      /\\([^])/g,
      (_, one: string) => ({ n: "\n", r: "\r", t: "\t", b: "\b", f: "\f" })[one] ?? one,
    );
    return plain.startsWith("\u00fe\u00ff")
      ? Buffer.from(plain, "latin1").subarray(2).swap16().toString("utf16le")
      : plain;
  });
}

const millimetresPerPoint = 25.4 / 72;

function wordsOf(page: string): PdfWord[] {
  return [
    ...page.matchAll(
      /<word xMin="([\d.-]+)" yMin="([\d.-]+)" xMax="([\d.-]+)" yMax="([\d.-]+)">(.*)<\/word>/g,
    ),
  ].map(([, left, top, right, bottom, text]) => {
    const [x1 = NaN, y1 = NaN, x2 = NaN, y2 = NaN] = [left, top, right, bottom].map(
      (value) => Number(value) * millimetresPerPoint,
    );
    return { text: text ?? "", left: x1, top: y1, right: x2, bottom: y2 };
  });
}

/** @throws Error with what the program said, where it said anything against the file */
function run(program: string, args: readonly string[], input: Uint8Array): string {
  const { status, stdout, stderr } = spawnSync(program, args, {
    input,
    encoding: "utf8",
    maxBuffer: 1 << 28,
  });
  if (status !== 0 || stderr !== "") throw new Error(`${program} ${args.join(" ")}: ${status} ${stderr}`);
  return stdout;
}
