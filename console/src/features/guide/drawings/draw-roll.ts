import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import type { Figure, Point, Shape } from "../../../../../shared/figures/shape.ts";
import { layPanels, panelWidth, type Panel } from "./lay-panels.ts";
import { at, box, circle, dot, line, lines, path, turnArrow, words } from "./pencil.ts";

const middleX = panelWidth / 2;
const drawnRollDeg = 8;

/** A measured roll and how it is taken out; and which way an indicator reads. */
export function drawRoll(width: number): Figure {
  return layPanels([roll(), indicator("outside"), indicator("inside")], width, {
    title: "Roll and indicators, seen downstream",
    alternative:
      "A casing turned clockwise about its bore has a positive roll. It is taken out by thicker shims at the right foot and thinner ones at the left; the bore, which stands above the feet, then moves to the left by roll times its height. An indicator outside a part reads positive when the part moves toward it; one inside the bore reads the other way.",
  });
}

function roll(): Panel {
  const bore = at(middleX, 20);
  const angle = (drawnRollDeg * Math.PI) / 180;
  /** Clockwise on the sheet, about the bore. */
  const turned = (x: number, y: number): Point =>
    at(
      bore.x + x * Math.cos(angle) - y * Math.sin(angle),
      bore.y + x * Math.sin(angle) + y * Math.cos(angle),
    );
  const [left, right] = [turned(-18, 20), turned(18, 20)];
  return {
    title: "Roll, clockwise positive",
    height: 64,
    shapes: [
      line("centre", at(bore.x, 3), at(bore.x, 50)),
      line("quiet", turned(0, -16), turned(0, 24)),
      circle("wide", bore, 9),
      dot(bore),
      path("wide", [turned(-9, 0), left, right, turned(9, 0)], false),
      ...turnArrow(bore, 13.5, -20, 35),
      words(at(bore.x + 10, 6), "roll"),
      ...drawArrow(at(right.x + 3, right.y + 6), at(right.x + 3, right.y), "signal"),
      words(at(right.x + 5, right.y + 5), "+h·roll"),
      ...drawArrow(at(left.x - 3, left.y - 6), at(left.x - 3, left.y), "signal"),
      words(at(left.x - 3, left.y - 7.5), "+h·roll", "middle"),
      ...lines(at(0, 54), ["left foot: h is negative, thinner", "bore: roll · height, toward −h"]),
    ],
  };
}

function indicator(contact: "outside" | "inside"): Panel {
  const bore = at(middleX, 26);
  const tip = contact === "outside" ? at(bore.x, 14) : at(bore.x, 16);
  const dial: Shape[] =
    contact === "outside"
      ? [line("wide", tip, at(tip.x, 8)), circle("wide", at(tip.x, 5), 3, "paper")]
      : [line("wide", tip, at(tip.x, 22)), circle("wide", at(tip.x, 25), 3, "paper")];
  return {
    title: `Indicator at 0\u00b0, contact ${contact}`,
    height: 64,
    shapes: [
      circle("wide", bore, 12),
      circle("narrow", bore, 10),
      ...dial,
      ...drawArrow(at(bore.x + 13.6, 31), at(bore.x + 13.6, 19), "signal"),
      words(at(bore.x + 15, 26), "part goes up"),
      ...lines(
        at(0, 54),
        [contact === "outside" ? "it reads more: positive" : "it reads less: negative"],
        "start",
        "ink",
      ),
      box("narrow", at(bore.x - 30, 40), 60, 2, "shade"),
    ],
  };
}
