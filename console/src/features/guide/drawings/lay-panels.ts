import { moveShape } from "../../../../../shared/figures/move-shape.ts";
import type { Figure, Shape } from "../../../../../shared/figures/shape.ts";
import { at, words } from "./pencil.ts";

/** A part of a drawing with its own name, laid beside the others where there is room and under them where not. */
export interface Panel {
  readonly title: string;
  readonly height: number;
  readonly shapes: readonly Shape[];
}

/** As wide as the narrowest sheet that a figure is drawn for. */
export const panelWidth = 78;
const gap = 8;
const titleHeight = 7;

/** Lays panels in rows on a sheet `width` millimetres wide. */
export function layPanels(
  panels: readonly Panel[],
  width: number,
  about: Pick<Figure, "title" | "alternative">,
): Figure {
  const perRow = Math.max(1, Math.floor((width + gap) / (panelWidth + gap)));
  const shapes: Shape[] = [];
  let top = 0;
  for (let first = 0; first < panels.length; first += perRow) {
    const row = panels.slice(first, first + perRow);
    row.forEach((panel, place) => {
      const x = place * (panelWidth + gap);
      shapes.push(words(at(x, top + 3.5), panel.title));
      shapes.push(...panel.shapes.map((shape) => moveShape(shape, at(x, top + titleHeight))));
    });
    top += titleHeight + Math.max(...row.map(({ height }) => height)) + gap / 2;
  }
  return { width, height: top, shapes, ...about };
}
