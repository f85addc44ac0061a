import type { Point, Shape } from "./shape.ts";

/** The shape at another place of the sheet. */
export function moveShape(shape: Shape, by: Point): Shape {
  const move = (point: Point): Point => ({ x: point.x + by.x, y: point.y + by.y });
  switch (shape.kind) {
    case "line":
      return { ...shape, from: move(shape.from), to: move(shape.to) };
    case "path":
      return { ...shape, points: shape.points.map(move) };
    case "circle":
    case "arc":
      return { ...shape, centre: move(shape.centre) };
    case "text":
      return { ...shape, at: move(shape.at) };
  }
}
