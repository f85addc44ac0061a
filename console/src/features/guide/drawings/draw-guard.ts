import { drawVerdictMark, type Verdict } from "../../../../../shared/figures/draw-verdict-mark.ts";
import type { Figure, Shape } from "../../../../../shared/figures/shape.ts";
import { at, line, lines, path, words } from "./pencil.ts";

const rows: readonly { verdict: Verdict; share: number; says: string }[] = [
  { verdict: "conforms", share: 0.42, says: "|d| + U ≤ T" },
  { verdict: "undecided", share: 0.72, says: "neither" },
  { verdict: "exceeds", share: 0.98, says: "|d| − U > T" },
];
/** Shares of the line's length. */
const toleranceAt = 0.76;
const uncertainty = 0.12;
const top = 12;
const rowHeight = 11;

/** Guarded acceptance: the deviation with its expanded uncertainty against the tolerance. */
export function drawGuard(width: number): Figure {
  const left = 2;
  const length = Math.min(width, 170) - 44;
  const placeX = (share: number): number => left + share * length;
  const bottom = top + rows.length * rowHeight;
  const shapes: Shape[] = [
    path(
      null,
      [
        at(left, top - 3),
        at(placeX(toleranceAt), top - 3),
        at(placeX(toleranceAt), bottom),
        at(left, bottom),
      ],
      true,
      "shade",
    ),
    line("wide", at(placeX(toleranceAt), top - 5), at(placeX(toleranceAt), bottom)),
    line("narrow", at(left, top - 5), at(left, bottom)),
    words(at(left, top - 6.5), "0", "middle"),
    words(at(placeX(toleranceAt), top - 6.5), "T", "middle"),
    ...rows.flatMap(({ verdict, share, says }, index) =>
      drawRow(verdict, share, says, top + (index + 0.5) * rowHeight),
    ),
    ...lines(at(0, bottom + 5), ["dot |d|, bar from |d| − U to |d| + U"]),
  ];
  return {
    width,
    height: bottom + 8,
    shapes,
    title: "Guarded verdicts",
    alternative:
      "Three deviations with their expanded uncertainty against a tolerance T. One whose whole bar lies inside conforms; one whose whole bar lies outside exceeds; one whose bar crosses T is undecided, though its deviation lies inside.",
  };

  function drawRow(verdict: Verdict, share: number, says: string, y: number): Shape[] {
    const [from, to] = [placeX(share - uncertainty), placeX(share + uncertainty)];
    return [
      line("wide", at(from, y), at(to, y)),
      line("wide", at(from, y - 1.2), at(from, y + 1.2)),
      line("wide", at(to, y - 1.2), at(to, y + 1.2)),
      ...drawVerdictMark(verdict, at(placeX(share), y), 1.5),
      ...lines(at(placeX(1.14), y - 0.6), [verdict, says], "start", "ink"),
    ];
  }
}
