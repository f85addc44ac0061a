import { textWidth } from "../../../../shared/figures/shape.ts";
import { letterHeights } from "./sheet-geometry.ts";
import { wrapText } from "../../wrap-text.ts";

/** Between baselines of running text. */
export const lineHeight = letterHeights.text * 1.65;
export const paragraphGap = 1.4;
export const headingHeight = 6.4;
export const gapBeforeHeading = 4;
/** The name of a field stands in a column of its own. */
export const fieldNameWidth = 42;
export const listIndent = textWidth("0") * 2;

/** What paragraphs, one under the other, take of a column's height. */
export function heightOfTexts(texts: readonly string[], width: number): number {
  return texts.reduce(
    (total, text) =>
      total + wrapText(text, charactersIn(width - listIndent)).length * lineHeight + paragraphGap,
    0,
  );
}

/** Characters of running text that fit a width. */
export const charactersIn = (width: number): number => Math.floor(width / textWidth("0") + 1e-9);
