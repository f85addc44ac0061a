import { drawArrow } from "../draw-arrow.ts";
import type { Point, Shape } from "../shape.ts";
import type { BoreSectionModel } from "./bore-section-model.ts";
import type { BoreSectionScale } from "./scale-bore-section.ts";

/** Centre lines, the way from the origin to the centre, and the centre's uncertainty, at the centre's own scale. */
export function drawCentre(model: BoreSectionModel, scale: BoreSectionScale): Shape[] {
  const { centre } = scale;
  const arm = scale.circleRadius * 1.06 + scale.reach;
  const lines: Shape[] = [
    {
      kind: "line",
      pen: "centre",
      from: { x: centre.x - arm, y: centre.y },
      to: { x: centre.x + arm, y: centre.y },
    },
    {
      kind: "line",
      pen: "centre",
      from: { x: centre.x, y: centre.y - arm },
      to: { x: centre.x, y: centre.y + arm },
    },
  ];
  if (scale.centreScale === null) return lines;
  const origin = {
    x: centre.x - model.centre.h * scale.centreScale,
    y: centre.y + model.centre.v * scale.centreScale,
  };
  return [
    ...lines,
    ...drawOrigin(origin),
    ...drawArrow(origin, centre, "wide", 2.4),
    ...drawUncertainty(model, scale, scale.centreScale),
  ];
}

function drawOrigin(at: Point): Shape[] {
  const arm = 1.8;
  return [
    { kind: "circle", pen: "narrow", centre: at, radius: 1.1, fill: "paper" },
    { kind: "line", pen: "narrow", from: { x: at.x - arm, y: at.y }, to: { x: at.x + arm, y: at.y } },
    { kind: "line", pen: "narrow", from: { x: at.x, y: at.y - arm }, to: { x: at.x, y: at.y + arm } },
  ];
}

/** A bar each way, with caps; left out where it would be wider than the room inside the circle. */
function drawUncertainty(model: BoreSectionModel, scale: BoreSectionScale, centreScale: number): Shape[] {
  if (model.uncertainty === null) return [];
  const half = { x: model.uncertainty.h * centreScale, y: model.uncertainty.v * centreScale };
  const room = scale.circleRadius - scale.reach;
  if (Math.max(half.x, half.y) > room) return [];
  const { x, y } = scale.centre;
  const cap = 1.2;
  const bar = (from: Point, to: Point): Shape => ({ kind: "line", pen: "wide", from, to });
  return [
    bar({ x: x - half.x, y }, { x: x + half.x, y }),
    bar({ x: x - half.x, y: y - cap }, { x: x - half.x, y: y + cap }),
    bar({ x: x + half.x, y: y - cap }, { x: x + half.x, y: y + cap }),
    bar({ x, y: y - half.y }, { x, y: y + half.y }),
    bar({ x: x - cap, y: y - half.y }, { x: x + cap, y: y - half.y }),
    bar({ x: x - cap, y: y + half.y }, { x: x + cap, y: y + half.y }),
  ];
}
