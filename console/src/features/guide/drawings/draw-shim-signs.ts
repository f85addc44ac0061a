import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import { onClock, type Figure, type Shape } from "../../../../../shared/figures/shape.ts";
import { writeSigned } from "../../../../../shared/figures/write-number.ts";
import { layPanels, panelWidth, type Panel } from "./lay-panels.ts";
import { at, box, centreLines, circle, lines, path, words } from "./pencil.ts";

const centre = at(panelWidth / 2, 28);
const moved = 0.1;
const decimals = 4;

/** What a move of the bore changes the stacks by: pads round a bearing, feet and side keys, joint keys. */
export function drawShimSigns(width: number): Figure {
  const panels = [
    pads("Pads, bore up by 0.1", { h: 0, v: moved }),
    pads("Pads, bore right by 0.1", { h: moved, v: 0 }),
    feet("outside"),
    feet("inside"),
    jointKeys(),
  ];
  return layPanels(panels, width, {
    title: "Shims: what a move of the bore changes, seen downstream, thicker positive",
    alternative: `Two pads at 135 and 225 degrees: to lift the bore by 0.1 each stack is changed by ${writeSigned(padChange(135, { h: 0, v: moved }), decimals)}; to move it right by 0.1 the right one by ${writeSigned(padChange(135, { h: moved, v: 0 }), decimals)} and the left one by ${writeSigned(padChange(225, { h: moved, v: 0 }), decimals)}. Feet: left and right change by v; side keys outside the feet by h at the left and minus h at the right, inside the feet the other way round. Joint keys: left and right by v, the stack at the left cheek of the bottom key by h.`,
  });
}

/** −(h·sin + v·cos) of the pad's clock angle. */
export function padChange(clockDeg: number, { h, v }: { h: number; v: number }): number {
  const angleRad = (clockDeg * Math.PI) / 180;
  return -(h * Math.sin(angleRad) + v * Math.cos(angleRad));
}

function pads(title: string, move: { h: number; v: number }): Panel {
  const inner = 15;
  const pad = (clockDeg: number): Shape[] => {
    const corners = [
      onClock(centre, inner, clockDeg - 18),
      onClock(centre, inner, clockDeg),
      onClock(centre, inner, clockDeg + 18),
      onClock(centre, inner + 4, clockDeg + 16),
      onClock(centre, inner + 4.6, clockDeg),
      onClock(centre, inner + 4, clockDeg - 16),
    ];
    const isRight = clockDeg < 180;
    const label = onClock(centre, inner + 7, clockDeg);
    return [
      path("wide", corners, true, "shade"),
      ...lines(
        at(label.x, label.y + 1),
        [`${clockDeg}\u00b0`, writeSigned(padChange(clockDeg, move), decimals)],
        isRight ? "start" : "end",
        "ink",
      ),
    ];
  };
  const arrow = at(centre.x + (move.h / moved) * 10, centre.y - (move.v / moved) * 10);
  return {
    title,
    height: 62,
    shapes: [
      ...centreLines(centre, inner + 4),
      circle("wide", centre, inner),
      ...drawArrow(centre, arrow, "signal", 2.6),
      ...pad(135),
      ...pad(225),
      ...lines(at(0, 56), ["−(h·sin + v·cos) of clockDeg"]),
    ],
  };
}

function feet(keys: "outside" | "inside"): Panel {
  const [floor, half] = [46, keys === "outside" ? 12 : 16];
  const foot = (side: -1 | 1): Shape[] => {
    const x = centre.x + side * half;
    const keyX = keys === "outside" ? x + side * 6 : x - side * 6;
    const isLeft = side < 0;
    const keySign = isLeft === (keys === "outside") ? "+h" : "−h";
    const outward = isLeft ? "end" : "start";
    return [
      box("wide", at(x - 4, 34), 8, 8, "paper"),
      box("wide", at(x - 4, 42), 8, 2, "shade"),
      box("wide", at(keyX - 1.2, 36), 2.4, 6, "shade"),
      words(at(x, 50), isLeft ? "left +v" : "right +v", "middle"),
      ...(keys === "outside"
        ? lines(at(keyX + side * 2.6, 36), [isLeft ? "key-left" : "key-right", keySign], outward, "ink")
        : [words(at(centre.x + side * 1, 41), keySign, outward)]),
    ];
  };
  return {
    title: `Feet, side keys ${keys}`,
    height: 62,
    shapes: [
      ...centreLines(at(centre.x, 16), 13),
      circle("wide", at(centre.x, 16), 10),
      path(
        "wide",
        [
          at(centre.x - 10, 16),
          at(centre.x - half - 4, 34),
          at(centre.x + half + 4, 34),
          at(centre.x + 10, 16),
        ],
        false,
      ),
      ...foot(-1),
      ...foot(1),
      { kind: "line", pen: "narrow", from: at(centre.x - 26, floor), to: at(centre.x + 26, floor) },
      ...lines(at(0, 56), [keys === "outside" ? "key-left +h, key-right −h" : "key-left −h, key-right +h"]),
    ],
  };
}

function jointKeys(): Panel {
  const ring = 15;
  return {
    title: "Joint keys",
    height: 62,
    shapes: [
      ...centreLines(centre, ring + 4),
      circle("wide", centre, ring),
      circle("narrow", centre, ring - 4),
      box("wide", at(centre.x - ring - 5, centre.y), 5, 2.4, "shade"),
      box("wide", at(centre.x + ring, centre.y), 5, 2.4, "shade"),
      ...lines(at(centre.x - ring - 1, centre.y + 7), ["key-left", "+v"], "end", "ink"),
      ...lines(at(centre.x + ring + 1, centre.y + 7), ["key-right", "+v"], "start", "ink"),
      box("wide", at(centre.x - 1.6, centre.y + ring), 3.2, 5, "paper"),
      box("wide", at(centre.x - 3.4, centre.y + ring), 1.8, 5, "shade"),
      words(at(centre.x - 5, centre.y + ring + 6), "key-bottom +h", "end"),
      ...lines(at(0, 56), ["its stack stands at the left cheek"]),
    ],
  };
}
