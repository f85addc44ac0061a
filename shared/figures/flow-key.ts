import { lettering, textWidth, type Point, type Shape } from "./shape.ts";

/** One entry of a figure's key: a sample of the mark, then what it means. */
export interface KeyEntry {
  readonly words: string;
  /** Room that the sample takes before its words. */
  readonly sampleWidth: number;
  /** The sample, about a point half a capital above the baseline at the left of its room. */
  readonly sample: (at: Point) => readonly Shape[];
}

const gapBetween = 6;
const gapBeforeWords = 1.6;
export const keyRowHeight = lettering.height * 2.1;

/** Lays entries out in rows that fit `width`. Answers the shapes and the height taken. */
export function flowKey(
  entries: readonly KeyEntry[],
  topLeft: Point,
  width: number,
): { shapes: Shape[]; height: number } {
  const shapes: Shape[] = [];
  let x = topLeft.x;
  let row = 0;
  for (const entry of entries) {
    const wordsFrom = entry.sampleWidth + (entry.sampleWidth > 0 ? gapBeforeWords : 0);
    const entryWidth = wordsFrom + textWidth(entry.words);
    if (x > topLeft.x && x + entryWidth > topLeft.x + width) {
      x = topLeft.x;
      row += 1;
    }
    const baseline = topLeft.y + row * keyRowHeight + lettering.height;
    shapes.push(...entry.sample({ x, y: baseline - lettering.height / 2 }), {
      kind: "text",
      at: { x: x + wordsFrom, y: baseline },
      text: entry.words,
      height: lettering.height,
      anchor: "start",
      tone: "muted",
    });
    x += entryWidth + gapBetween;
  }
  return { shapes, height: entries.length === 0 ? 0 : (row + 1) * keyRowHeight };
}

/** Breaks a sentence into entries without a sample that fit `width`, word by word. */
export function wrapWords(sentence: string, width: number): KeyEntry[] {
  const lines: string[] = [];
  for (const word of sentence.split(" ")) {
    const line = lines.at(-1);
    if (line !== undefined && textWidth(`${line} ${word}`) <= width)
      lines[lines.length - 1] = `${line} ${word}`;
    else lines.push(word);
  }
  return lines.map((words) => ({ words, sampleWidth: 0, sample: () => [] }));
}
