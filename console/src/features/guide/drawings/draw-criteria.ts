import { onClock, type Figure, type Point, type Shape } from "../../../../../shared/figures/shape.ts";
import { layPanels, panelWidth, type Panel } from "./lay-panels.ts";
import { at, centreLines, circle, dot, lines, path } from "./pencil.ts";

const centre = at(panelWidth / 2, 27);
const half = { across: 22, up: 17 };
const count = 24;

/** An oval wall, its ovality far exaggerated, read at even angles. Its symmetry puts every criterion's centre in its middle. */
const wall: readonly Point[] = Array.from({ length: count }, (_, index) => {
  const turn = (index / count) * 2 * Math.PI;
  return at(centre.x + half.across * Math.sin(turn), centre.y - half.up * Math.cos(turn));
});
const radii = wall.map(({ x, y }) => Math.hypot(x - centre.x, y - centre.y));
const meanRadius = radii.reduce((sum, radius) => sum + radius, 0) / count;

/** The five criteria for one oval wall. */
export function drawCriteria(width: number): Figure {
  const panels = [
    panel("Least squares, LSCI", [circle("wide", centre, meanRadius)], ["least sum of squared distances"]),
    panel(
      "Minimum zone, MZCI",
      [
        circle("wide", centre, half.across),
        circle("wide", centre, half.up),
        circle("dashed", centre, (half.across + half.up) / 2),
        ...[0, 90, 180, 270].map((clockDeg) => contact(clockDeg)),
      ],
      ["two circles closest together", "contacts outer, inner, outer, inner"],
    ),
    panel(
      "Maximum inscribed, MICI",
      [circle("wide", centre, half.up), contact(0), contact(180)],
      ["largest with no reading inside"],
    ),
    panel(
      "Minimum circumscribed, MCCI",
      [circle("wide", centre, half.across), contact(90), contact(270)],
      ["smallest round all readings"],
    ),
    panel("Ellipse", [path("wide", smoothOval(), true)], ["ovality = major − minor diameter"]),
  ];
  return layPanels(panels, width, {
    title: "One oval wall, five criteria (ovality far exaggerated)",
    alternative:
      "The same oval wall five times. Least squares lies between wide and narrow places; minimum zone is two circles, one through the widest and one through the narrowest readings; the inscribed circle touches at top and bottom, the circumscribed one at the sides; the ellipse follows the wall.",
  });
}

function panel(title: string, fitted: readonly Shape[], says: readonly string[]): Panel {
  return {
    title,
    height: 62,
    shapes: [...centreLines(centre, 25), ...fitted, ...wall.map(dot), ...lines(at(0, 56), says)],
  };
}

function contact(clockDeg: number): Shape {
  const radius = clockDeg % 180 === 0 ? half.up : half.across;
  return circle("narrow", onClock(centre, radius, clockDeg), 1.9);
}

function smoothOval(): Point[] {
  return Array.from({ length: 72 }, (_, index) => {
    const turn = (index / 36) * Math.PI;
    return at(centre.x + half.across * Math.sin(turn), centre.y - half.up * Math.cos(turn));
  });
}
