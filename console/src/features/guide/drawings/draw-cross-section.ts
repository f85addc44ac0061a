import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import { onClock, type Figure, type Shape } from "../../../../../shared/figures/shape.ts";
import { layPanels, panelWidth, type Panel } from "./lay-panels.ts";
import { at, centreLines, circle, dot, line, lines, turnArrow, words } from "./pencil.ts";

const centre = at(panelWidth / 2, 36);
const radius = 22;
const shownDeg = 60;

/** How a cross-section is read: h, v and clock angle; and the same mark seen from the two ends. */
export function drawCrossSection(width: number): Figure {
  return layPanels([axes(), seen("downstream"), seen("upstream")], width, {
    title: "A cross-section, and the end it is seen from",
    alternative: `Three circles. Looking downstream, h points right, v points up, and the clock angle runs clockwise from the top: a wall point at ${shownDeg} degrees lies up and to the right. A mark at ${shownDeg} degrees seen downstream stands at ${360 - shownDeg} degrees seen upstream, where h points to the reader's left.`,
  });
}

function axes(): Panel {
  const tip = onClock(centre, radius, shownDeg);
  return {
    title: "Seen looking downstream",
    height: 76,
    shapes: [
      ...bore(),
      ...drawArrow(centre, at(centre.x + radius + 11, centre.y), "wide"),
      ...drawArrow(centre, at(centre.x, centre.y - radius - 7), "wide"),
      words(at(centre.x + radius + 1, centre.y - 1.8), "h, right"),
      words(at(centre.x + 2, centre.y - radius - 4), "v, up"),
      line("narrow", centre, tip),
      dot(tip),
      words(at(centre.x + 10.5, centre.y - 4), "r"),
      ...turnArrow(centre, 9, 0, shownDeg),
      words(at(centre.x - 1.5, centre.y - 8), "clockDeg", "end"),
      ...lines(at(0, 70), ["h = r · sin(clockDeg)", "v = r · cos(clockDeg)"], "start", "ink"),
    ],
  };
}

function seen(from: "downstream" | "upstream"): Panel {
  const isDownstream = from === "downstream";
  const readDeg = isDownstream ? shownDeg : 360 - shownDeg;
  const mark = onClock(centre, radius, readDeg);
  const side = isDownstream ? 1 : -1;
  return {
    title: `One mark, seen ${from}`,
    height: 76,
    shapes: [
      ...bore(),
      ...drawArrow(centre, at(centre.x + side * (radius + 11), centre.y), "wide"),
      words(at(centre.x + side * (radius + 4), centre.y - 1.8), "h", "middle"),
      ...turnArrow(centre, 9, 0, readDeg),
      line("narrow", centre, mark),
      circle("wide", mark, 1.6, "paper"),
      words(onClock(centre, radius + 5, readDeg), `${readDeg}\u00b0`, isDownstream ? "start" : "end"),
      ...lines(
        at(0, 70),
        isDownstream
          ? ["seen: downstream", `sent as clockDeg ${readDeg}`]
          : ["seen: upstream", `sent ${readDeg}, turned to 360 − ${readDeg} = ${360 - readDeg}`],
        "start",
        "ink",
      ),
    ],
  };
}

function bore(): Shape[] {
  return [
    ...centreLines(centre, radius + 4),
    circle("wide", centre, radius),
    words(at(centre.x - 1.5, centre.y - radius + 3.6), "0\u00b0", "end", "muted"),
    words(at(centre.x + radius - 1, centre.y + 4), "90\u00b0", "end", "muted"),
    words(at(centre.x - 1.5, centre.y + radius - 4), "180\u00b0", "end", "muted"),
    words(at(centre.x - radius + 1, centre.y + 4), "270\u00b0", "start", "muted"),
  ];
}
