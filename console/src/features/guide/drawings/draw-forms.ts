import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import { onClock, type Figure, type Shape } from "../../../../../shared/figures/shape.ts";
import { layPanels, panelWidth, type Panel } from "./lay-panels.ts";
import { at, centreLines, circle, dot, line, lines, path, turnArrow, words } from "./pencil.ts";

const centre = at(panelWidth / 2, 27);
const radius = 20;
const wall: readonly Shape[] = [circle("wide", centre, radius), ...centreLines(centre, radius + 3)];

/** The four forms of reading, each with what was read. */
export function drawForms(width: number): Figure {
  return layPanels([points(), turnedGauge(), wire(), rotatingTarget()], width, {
    title: "Four forms of reading",
    alternative:
      "Points on the wall, each with h and v from any origin. A gauge turned about its own axis, which need not be the bore's centre, reading the distance to the wall at clock angles. A stretched wire with inside readings to the left, right, bottom and, where the upper half is on, top. A square target turned about the bore's own centre, and the fixed beam that strikes it off that centre.",
  });
}

function points(): Panel {
  const origin = at(centre.x - 9, centre.y + 8);
  const read = [20, 70, 130, 200, 260, 320].map((clockDeg) => onClock(centre, radius, clockDeg));
  const shown = onClock(centre, radius, 70);
  return panel(
    "points",
    [
      ...drawArrow(origin, at(shown.x, origin.y), "narrow"),
      ...drawArrow(at(shown.x, origin.y), shown, "narrow"),
      ...read.map(dot),
      circle("narrow", origin, 1.2, "paper"),
      words(at(centre.x + 2, origin.y + 4), "h"),
      words(at(shown.x + 2, shown.y + 4), "v"),
    ],
    ["centre from the points' origin"],
  );
}

function turnedGauge(): Panel {
  const axis = at(centre.x + 4, centre.y + 3);
  const reach = (clockDeg: number): Shape => {
    // Where the ray from the gauge's axis meets the wall.
    const far = onClock(axis, 1, clockDeg);
    const [dx, dy] = [far.x - axis.x, far.y - axis.y];
    const [ox, oy] = [axis.x - centre.x, axis.y - centre.y];
    const along =
      -(ox * dx + oy * dy) + Math.sqrt((ox * dx + oy * dy) ** 2 - (ox * ox + oy * oy - radius * radius));
    return dot(at(axis.x + along * dx, axis.y + along * dy));
  };
  const angles = [0, 60, 120, 180, 240, 300];
  return panel(
    "turned_gauge",
    [
      ...angles.map(reach),
      ...drawArrow(axis, onClock(axis, 18.4, 60), "narrow"),
      ...turnArrow(axis, 6, 0, 60),
      line("quiet", axis, at(axis.x, axis.y - 8)),
      circle("narrow", axis, 1.2, "paper"),
      ...lines(at(axis.x - 2, axis.y + 5), ["gauge's axis"], "middle"),
    ],
    ["distance = nominal radius ± reading"],
  );
}

function wire(): Panel {
  const place = at(centre.x - 3, centre.y - 2);
  const half = (offset: number): number => Math.sqrt(radius * radius - offset * offset);
  const [dx, dy] = [place.x - centre.x, place.y - centre.y];
  return panel(
    "wire",
    [
      ...drawArrow(place, at(centre.x - half(dy), place.y), "narrow"),
      ...drawArrow(place, at(centre.x + half(dy), place.y), "narrow"),
      ...drawArrow(place, at(place.x, centre.y + half(dx)), "narrow"),
      ...drawArrow(place, at(place.x, centre.y - half(dx)), "narrow"),
      circle("wide", place, 1.1, "paper"),
      words(at(place.x - 5, place.y - 1.5), "left", "end"),
      words(at(place.x + 5, place.y - 1.5), "right"),
      words(at(place.x - 1.5, place.y + 12), "bottom", "end"),
      words(at(place.x - 1.5, place.y - 10), "top", "end"),
    ],
    ["then lowered by the wire's sag here"],
  );
}

function rotatingTarget(): Panel {
  const turnedDeg = 30;
  const [half, beam] = [9, at(centre.x + 4, centre.y - 3)];
  const corners = [45, 135, 225, 315].map((clockDeg) => onClock(centre, half, clockDeg + turnedDeg));
  return panel(
    "rotating_target",
    [
      path("wide", corners, true, "shade"),
      line("narrow", centre, onClock(centre, half * 0.7, turnedDeg)),
      line("narrow", centre, onClock(centre, half * 0.7, turnedDeg + 90)),
      ...turnArrow(centre, 13, 0, turnedDeg),
      dot(beam),
      words(at(beam.x + 9, beam.y - 5), "beam", "start"),
      line("quiet", at(beam.x + 8.4, beam.y - 5), beam),
      words(at(centre.x - 2, centre.y + 14), "target", "end", "muted"),
    ],
    ["turned about the bore's own centre:", "centre from the beam, no diameter"],
  );
}

function panel(title: string, shapes: readonly Shape[], says: readonly string[]): Panel {
  return { title, height: 64, shapes: [...wall, ...shapes, ...lines(at(0, 56), says)] };
}
