import type { JobFlag } from "../../schemas/job-surveys.ts";
import { flowKey, wrapWords } from "../flow-key.ts";
import type { Figure, Shape } from "../shape.ts";

/** Flags named on a figure; the record and the report hold all of them. */
const flagsNamed = 8;

/** A job's flags as sentences, the same one said once. The rest of more than `most` are listed elsewhere: `where`. */
export function flagSentences(
  flags: readonly Pick<JobFlag, "code" | "detail">[],
  most = Infinity,
  where = "in the job's report",
): string[] {
  const said = [...new Set(flags.map(({ code, detail }) => `${code}: ${detail}`))];
  const rest = said.length - most;
  return rest > 0 ? [...said.slice(0, most), `and ${rest} more, listed ${where}.`] : said;
}

/** A figure with what a reader must know of it written underneath, and said in its text alternative. */
export function withNotes(
  figure: Figure,
  { flags, words }: { readonly flags: readonly JobFlag[]; readonly words: string },
): Figure {
  const sentences = flagSentences(flags, flagsNamed);
  let { height } = figure;
  const shapes: Shape[] = [...figure.shapes];
  for (const [sentence, tone] of [
    ...sentences.map((flag) => [`Flag: ${flag}`, "signal"] as const),
    [words, "muted"] as const,
  ]) {
    for (const line of wrapWords(sentence, figure.width)) {
      const placed = flowKey([line], { x: 0, y: height }, figure.width);
      shapes.push(...placed.shapes.map((shape) => (shape.kind === "text" ? { ...shape, tone } : shape)));
      height += placed.height;
    }
  }
  return {
    ...figure,
    height: height + 1,
    shapes,
    alternative: [figure.alternative, ...sentences.map((flag) => `Flag: ${flag}`), words].join(" "),
  };
}
