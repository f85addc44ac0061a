import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import type { Figure, Shape } from "../../../../../shared/figures/shape.ts";
import { layPanels, panelWidth, type Panel } from "./lay-panels.ts";
import { at, circle, dot, line, lines, words } from "./pencil.ts";

const axisY = 10;

/** What a cold target is made of: for a part round the rotor, and for a bearing. */
export function drawColdTarget(width: number): Figure {
  const panels = [
    chain("A part round the rotor", "rotor", -12, "target = rotor − growth − closing"),
    chain("A bearing", "line", 0, "target = line − growth − closing"),
  ];
  return layPanels(panels, width, {
    title: "Cold targets, in v",
    alternative:
      "Two chains of arrows from the axis down to the target. Round the rotor: first the running shaft's place, lower than the axis by its sag, then down by as much as the bore will grow, then by what closing the machine will do. A bearing begins at its wanted hot place on the line instead.",
  });
}

function chain(title: string, base: "rotor" | "line", drop: number, says: string): Panel {
  const [growth, closing] = [14, 10];
  const baseY = axisY - drop;
  const grownY = baseY + growth;
  const targetY = grownY + closing;
  const shapes: Shape[] = [
    line("centre", at(0, axisY), at(panelWidth, axisY)),
    words(at(panelWidth, axisY - 1.5), "axis", "end", "muted"),
    line("narrow", at(12, baseY), at(40, baseY)),
    words(at(11, baseY + (drop === 0 ? 4.5 : 1)), base, "end"),
    ...(drop === 0 ? [] : drawArrow(at(16, axisY), at(16, baseY), "narrow")),
    ...drawArrow(at(24, baseY), at(24, grownY), "narrow"),
    words(at(27, (baseY + grownY) / 2 + 1), "less growth"),
    line("quiet", at(20, grownY), at(44, grownY)),
    ...drawArrow(at(32, grownY), at(32, targetY), "narrow"),
    words(at(35, (grownY + targetY) / 2 + 1.6), "less closing"),
    line("wide", at(20, targetY), at(44, targetY)),
    circle("wide", at(48, targetY), 1.4, "paper"),
    dot(at(48, targetY)),
    words(at(52, targetY + 1), "target"),
    ...lines(at(0, 54), [says]),
  ];
  return { title, height: 58, shapes };
}
