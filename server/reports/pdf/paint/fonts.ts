import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import PDFDocument from "pdfkit";
import { unpackWoff } from "./unpack-woff.ts";

const require = createRequire(import.meta.url);

/** The files that IBM Plex Mono comes in, in the order in which a character is looked for. None of them has Greek. */
const scripts = ["latin", "latin-ext", "cyrillic", "cyrillic-ext", "vietnamese"] as const;
export type Script = (typeof scripts)[number];
export type Weight = 400 | 600;

export const fontName = (script: Script, weight: Weight): string => `${script}-${weight}`;

const files = new Map<string, Buffer>();

/** The font's bytes, read once. */
function fontFile(script: Script, weight: Weight): Buffer {
  const name = fontName(script, weight);
  const known = files.get(name);
  if (known) return known;
  const path = `@fontsource/ibm-plex-mono/files/ibm-plex-mono-${script}-${weight}-normal.woff`;
  const font = unpackWoff(readFileSync(require.resolve(path)));
  files.set(name, font);
  return font;
}

/** Makes every file known to a document; only those used are embedded, and of them only the letters used. */
export function registerFonts(document: PDFKit.PDFDocument): void {
  for (const script of scripts) {
    for (const weight of [400, 600] as const) {
      document.registerFont(fontName(script, weight), fontFile(script, weight));
    }
  }
}

/** What of an opened font is asked here: pdfkit keeps it on the document. */
interface OpenedFont {
  readonly _font: { readonly font: { hasGlyphForCodePoint(code: number): boolean } };
}

const opened = new Map<Script, OpenedFont["_font"]["font"]>();

function openedFont(script: Script): OpenedFont["_font"]["font"] {
  const known = opened.get(script);
  if (known) return known;
  const probe = new PDFDocument({ autoFirstPage: false }).font(fontFile(script, 400));
  const { font } = (probe as unknown as OpenedFont)._font;
  opened.set(script, font);
  return font;
}

const found = new Map<string, Script | null>();
/** More letters than any report has; what asks for more is looked up anew. */
const mostRemembered = 5_000;

/** The file that has a character; null where none has. */
export function fontFor(character: string): Script | null {
  const known = found.get(character);
  if (known !== undefined) return known;
  const code = character.codePointAt(0) ?? 0;
  const script = scripts.find((one) => openedFont(one).hasGlyphForCodePoint(code)) ?? null;
  if (found.size < mostRemembered) found.set(character, script);
  return script;
}
