import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import {
  lettering,
  onClock,
  type Fill,
  type Pen,
  type Point,
  type Shape,
  type Tone,
} from "../../../../../shared/figures/shape.ts";

/** Short names for the shapes that the guide's drawings are made of, in sheet millimetres. */
export const at = (x: number, y: number): Point => ({ x, y });

export function line(pen: Pen, from: Point, to: Point): Shape {
  return { kind: "line", pen, from, to };
}

export function circle(pen: Pen | null, centre: Point, radius: number, fill?: Fill): Shape {
  return { kind: "circle", pen, centre, radius, ...(fill === undefined ? {} : { fill }) };
}

export function path(pen: Pen | null, points: readonly Point[], closed: boolean, fill?: Fill): Shape {
  return { kind: "path", pen, points, closed, ...(fill === undefined ? {} : { fill }) };
}

export function box(pen: Pen, corner: Point, width: number, height: number, fill?: Fill): Shape {
  const { x, y } = corner;
  return path(pen, [corner, at(x + width, y), at(x + width, y + height), at(x, y + height)], true, fill);
}

export function dot(centre: Point): Shape {
  return circle(null, centre, 0.9, "ink");
}

/** Words on their baseline, or with `anchor` in the middle of it or at its end. */
export function words(
  place: Point,
  text: string,
  anchor: "start" | "middle" | "end" = "start",
  tone: Tone = "ink",
): Shape {
  return { kind: "text", at: place, text, height: lettering.height, anchor, tone };
}

/** Words one under the other. */
export function lines(
  place: Point,
  texts: readonly string[],
  anchor: "start" | "middle" | "end" = "start",
  tone: Tone = "muted",
): Shape[] {
  return texts.map((text, index) => words(at(place.x, place.y + index * lineHeight), text, anchor, tone));
}
export const lineHeight = lettering.height * 1.7;

/** A dimension line with a head at both ends and its words, if any, above the middle. */
export function dimension(from: Point, to: Point, text: string): Shape[] {
  const middle = at((from.x + to.x) / 2, (from.y + to.y) / 2);
  return [
    ...drawArrow(middle, to, "narrow", 1.6),
    ...drawArrow(middle, from, "narrow", 1.6),
    ...(text === "" ? [] : [words(at(middle.x, middle.y - 1.2), text, "middle", "muted")]),
  ];
}

/** Horizontal and vertical centre lines. */
export function centreLines(centre: Point, arm: number): Shape[] {
  return [
    line("centre", at(centre.x - arm, centre.y), at(centre.x + arm, centre.y)),
    line("centre", at(centre.x, centre.y - arm), at(centre.x, centre.y + arm)),
  ];
}

/** An arc clockwise with a head at its end. */
export function turnArrow(centre: Point, radius: number, startDeg: number, endDeg: number): Shape[] {
  const headDeg = (2 / radius) * (180 / Math.PI);
  return [
    { kind: "arc", pen: "narrow", centre, radius, startDeg, endDeg: endDeg - headDeg },
    ...drawArrow(onClock(centre, radius, endDeg - headDeg), onClock(centre, radius, endDeg), "narrow"),
  ];
}
