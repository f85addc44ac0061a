import type { Pen, Point, Shape } from "./shape.ts";

/** A line with a filled head at its end, as ISO 129-1 draws dimension arrows. */
export function drawArrow(from: Point, to: Point, pen: Pen, headLength = 2): Shape[] {
  const length = Math.hypot(to.x - from.x, to.y - from.y);
  if (length === 0) return [];
  const along = { x: (to.x - from.x) / length, y: (to.y - from.y) / length };
  const head = Math.min(headLength, length);
  const foot = { x: to.x - along.x * head, y: to.y - along.y * head };
  const half = head * 0.22;
  return [
    { kind: "line", pen, from, to: foot },
    {
      kind: "path",
      pen: null,
      points: [
        to,
        { x: foot.x - along.y * half, y: foot.y + along.x * half },
        { x: foot.x + along.y * half, y: foot.y - along.x * half },
      ],
      closed: true,
      fill: pen === "signal" ? "signal" : pen === "quiet" ? "muted" : "ink",
    },
  ];
}
