import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import type { Figure, Shape } from "../../../../../shared/figures/shape.ts";
import { layPanels, panelWidth, type Panel } from "./lay-panels.ts";
import { at, box, line, lines, words } from "./pencil.ts";

const before = [
  { name: "machine", says: "one revision" },
  { name: "job", says: "checks answered" },
  { name: "as found", says: "readings, centres" },
  { name: "plan", says: "moves, shims" },
] as const;
const after = [
  { name: "move", says: "indications" },
  { name: "as left", says: "measured again" },
  { name: "confirmation", says: "as planned?" },
  { name: "signature", says: "nothing is open" },
] as const;
const boxWidth = 32;
const boxHeight = 9;
const pitch = 16;
/** Of the way back, right of everything that is written beside the boxes. */
const backX = panelWidth - 3;

/** A job from the machine to the signature, and the way back where a station does not conform. */
export function drawJobOrder(width: number): Figure {
  const height = after.length * pitch;
  const panels: Panel[] = [
    { title: "Before anything is moved", height, shapes: drawChain(before) },
    { title: "Until nothing is open", height, shapes: [...drawChain(after), ...drawWayBack(2, 0)] },
  ];
  return layPanels(panels, width, {
    title: "The order of a job",
    alternative:
      "Two rows of boxes, each leading to the next. Before anything is moved: machine, job with its checks, survey as found, plan. Then: move with its indications, survey as left, confirmation, signature. From the confirmation a way leads back to the move for what is not as planned.",
  });
}

function drawChain(steps: readonly { readonly name: string; readonly says: string }[]): Shape[] {
  return steps.flatMap(({ name, says }, index) => {
    const top = index * pitch;
    const middle = at(boxWidth / 2, top);
    return [
      box("wide", at(0, top), boxWidth, boxHeight, "paper"),
      words(at(boxWidth / 2, top + boxHeight / 2 + 1.2), name, "middle"),
      ...lines(at(boxWidth + 3, top + boxHeight / 2 + 1.2), [says]),
      ...(index === 0 ? [] : drawArrow(at(middle.x, top - pitch + boxHeight), middle, "narrow")),
    ];
  });
}

/** From the side of one box to that of an earlier one. */
function drawWayBack(from: number, to: number): Shape[] {
  const [low, high] = [from * pitch + boxHeight - 1.5, to * pitch + boxHeight - 1.5];
  return [
    line("narrow", at(boxWidth, low), at(backX, low)),
    line("narrow", at(backX, low), at(backX, high)),
    ...drawArrow(at(backX, high), at(boxWidth, high), "narrow"),
    words(at(backX, low + 4), "if not, again", "end", "muted"),
  ];
}
