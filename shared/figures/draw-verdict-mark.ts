import { onClock, type Pen, type Point, type Shape, type Tone } from "./shape.ts";

export type Verdict = "conforms" | "undecided" | "exceeds";

/**
 * A verdict as a mark that is told apart without colour: a ring conforms, a half-filled ring is undecided, a filled
 * lozenge exceeds; a dot was not judged. What does not conform is a person's to look at, so it is drawn in the signal tone unless it
 * belongs to a state that has been replaced.
 */
export function drawVerdictMark(
  verdict: Verdict | null,
  at: Point,
  radius: number,
  replaced = false,
): Shape[] {
  const passes = verdict === "conforms" || verdict === null;
  const tone: Tone = replaced ? "muted" : passes ? "ink" : "signal";
  const pen: Pen = replaced ? "quiet" : passes ? "wide" : "signal";
  switch (verdict) {
    case null:
      return [{ kind: "circle", pen: null, centre: at, radius: radius * 0.6, fill: tone }];
    case "conforms":
      return [{ kind: "circle", pen, centre: at, radius, fill: "paper" }];
    case "undecided":
      return [
        { kind: "circle", pen, centre: at, radius, fill: "paper" },
        { kind: "path", pen: null, points: lowerHalf(at, radius), closed: true, fill: tone },
      ];
    case "exceeds":
      return [
        {
          kind: "path",
          pen,
          points: [0, 90, 180, 270].map((clockDeg) => onClock(at, radius * 1.25, clockDeg)),
          closed: true,
          fill: tone,
        },
      ];
  }
}

function lowerHalf(at: Point, radius: number): Point[] {
  return Array.from({ length: 13 }, (_, index) => onClock(at, radius, 90 + index * 15));
}
