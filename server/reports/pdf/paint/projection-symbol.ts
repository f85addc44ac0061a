import type { Point } from "../../../../shared/figures/shape.ts";
import type { Canvas } from "./canvas.ts";

/** The symbol of first-angle projection, ISO 5456-2: a truncated cone from the side, and its view to the right of it. */
export function drawProjectionSymbol(canvas: Canvas, { x, y }: Point): void {
  const [small, large, length] = [1.6, 3.2, 7];
  canvas.shape({
    kind: "path",
    pen: "narrow",
    closed: true,
    points: [
      { x, y: y - small },
      { x: x + length, y: y - large },
      { x: x + length, y: y + large },
      { x, y: y + small },
    ],
  });
  const centre = { x: x + length + 7, y };
  canvas.shape({ kind: "circle", pen: "narrow", centre, radius: small });
  canvas.shape({ kind: "circle", pen: "narrow", centre, radius: large });
  for (const [from, to] of [
    [
      { x: x - 1.5, y },
      { x: centre.x + large + 1.5, y },
    ],
    [
      { x: centre.x, y: y - large - 1.5 },
      { x: centre.x, y: y + large + 1.5 },
    ],
  ] as const)
    canvas.line(from, to, 0.18, "muted");
}
