import { lineSpacing } from "./drawing.ts";
import type { DrawnMachine } from "./drawn-machine.ts";
import { endViewWords } from "./end-view-words.ts";

/** Every station's own end view, in rows; what lies across is drawn `exaggeration` times as large. */
export interface EndViewScale {
  readonly left: number;
  readonly top: number;
  readonly columns: number;
  readonly exaggeration: number;
  /** Width of a view with its words, half the width of what is drawn in it, height of a row. */
  readonly cell: number;
  readonly half: number;
  readonly row: number;
}

/** Views in a row of the sheet. */
const columns = 8;
/** Of a view's width: half of what is drawn. */
const halfShare = 0.34;

/** Room for every station, its words included, under the two strips. */
export function scaleEndViews(
  machine: DrawnMachine,
  corner: { readonly left: number; readonly top: number },
  width: number,
  letter: number,
): EndViewScale {
  const cell = width / columns;
  const half = halfShare * cell;
  const lines = machine.stations.map((station) => {
    const { name, under } = endViewWords(machine, station, cell, letter);
    return name.length + under.length;
  });
  const largest = machine.stations.reduce((most, { allowedMm }) => {
    const limits = allowedMm?.radius
      ? [allowedMm.radius]
      : [...(allowedMm?.h ?? []), ...(allowedMm?.v ?? [])];
    return Math.max(most, ...limits.map(Math.abs));
  }, 0);
  const farthest = machine.surveys
    .flatMap(({ bores }) => bores.map(({ deviationMm: { h, v } }) => Math.hypot(h, v)))
    .reduce((most, one) => Math.max(most, one), largest);
  return {
    ...corner,
    // Under their heading.
    top: corner.top - 5 * letter,
    columns,
    exaggeration: twoFiguresOf(half / (farthest || 0.1)),
    cell,
    half,
    row: 2 * half + (Math.max(1, ...lines) + 2) * lineSpacing * letter,
  };
}

/** Cut to two figures: never larger. */
function twoFiguresOf(factor: number): number {
  const step = 10 ** (Math.floor(Math.log10(factor)) - 1);
  return Number((Math.floor(factor / step) * step).toPrecision(2));
}
