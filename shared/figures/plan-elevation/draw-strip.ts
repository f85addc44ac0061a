import { drawVerdictMark } from "../draw-verdict-mark.ts";
import { ticksBetween } from "../pick-step.ts";
import { lettering, type Pen, type Point, type Shape } from "../shape.ts";
import { writeTick } from "../write-number.ts";
import type { PlanElevationModel, Survey, SurveyedStation } from "./plan-elevation-model.ts";
import type { PlanElevationScale, Strip } from "./scale-plan-elevation.ts";

/** One plane over z: grid, tolerance gates about the targets, the axis, every survey with its uncertainty bars. */
export function drawStrip(model: PlanElevationModel, scale: PlanElevationScale, strip: Strip): Shape[] {
  return [
    ...drawGrid(scale, strip),
    ...model.stations.map((station) => stationLine(scale.placeX(station.z), strip)),
    ...drawGates(model, scale, strip),
    {
      kind: "line",
      pen: "centre",
      from: { x: scale.left, y: strip.placeY(0) },
      to: { x: scale.right, y: strip.placeY(0) },
    },
    ...model.surveys.flatMap((survey, index) => {
      const replaced = index < model.surveys.length - 1;
      return drawSurvey(model, survey, replaced, scale, strip);
    }),
    frame(scale, strip),
  ];
}

function drawGrid(scale: PlanElevationScale, strip: Strip): Shape[] {
  const count = (strip.high - strip.low) / scale.step;
  const ticks = ticksBetween(strip.low, strip.high, count * 1.25);
  return ticks.flatMap((tick): Shape[] => {
    const y = strip.placeY(tick);
    const text = writeTick(tick, scale.step);
    return [
      { kind: "line", pen: "grid", from: { x: scale.left, y }, to: { x: scale.right, y } },
      {
        kind: "text",
        at: { x: scale.left - 1.8, y: y + lettering.height / 2 },
        text: tick > 0 ? `+${text}` : text,
        height: lettering.height,
        anchor: "end",
        tone: "muted",
      },
    ];
  });
}

function stationLine(x: number, strip: Strip): Shape {
  return { kind: "line", pen: "grid", from: { x, y: strip.top }, to: { x, y: strip.bottom } };
}

function frame(scale: PlanElevationScale, strip: Strip): Shape {
  return {
    kind: "path",
    pen: "narrow",
    points: [
      { x: scale.left, y: strip.top },
      { x: scale.right, y: strip.top },
      { x: scale.right, y: strip.bottom },
      { x: scale.left, y: strip.bottom },
    ],
    closed: true,
  };
}

/** A gate at each station: as high as the tolerance, about the target, which is the tick through its middle. */
function drawGates(model: PlanElevationModel, scale: PlanElevationScale, strip: Strip): Shape[] {
  return model.stations.flatMap((station): Shape[] => {
    const x = scale.placeX(station.z);
    const target = station.target[strip.plane];
    const half = scale.gateHalfWidth;
    const tick: Shape = {
      kind: "line",
      pen: "quiet",
      from: { x: x - half - 0.8, y: strip.placeY(target) },
      to: { x: x + half + 0.8, y: strip.placeY(target) },
    };
    const allowed = station.allowed?.[strip.plane];
    if (!allowed) return [tick];
    const [low, high] = allowed.map((bound) => strip.placeY(target + bound)) as [number, number];
    const corners = [
      { x: x - half, y: low },
      { x: x + half, y: low },
      { x: x + half, y: high },
      { x: x - half, y: high },
    ];
    return [{ kind: "path", pen: "quiet", points: corners, closed: true, fill: "shade" }, tick];
  });
}

function drawSurvey(
  model: PlanElevationModel,
  survey: Survey,
  replaced: boolean,
  scale: PlanElevationScale,
  strip: Strip,
): Shape[] {
  const planned = new Map(model.stations.map((station) => [station.id, station]));
  const placed = survey.stations
    .flatMap((station) => {
      const plan = planned.get(station.id);
      if (!plan) return [];
      const offset = station.deviation[strip.plane] + plan.target[strip.plane];
      return [{ station, offset, at: { x: scale.placeX(plan.z), y: strip.placeY(offset) } }];
    })
    .sort((a, b) => a.at.x - b.at.x);
  const line: Shape = {
    kind: "path",
    pen: replaced ? "dashed" : "narrow",
    points: placed.map(({ at }) => at),
    closed: false,
  };
  return [
    ...(placed.length > 1 ? [line] : []),
    ...placed.flatMap(({ station, offset, at }) => drawBar(station, offset, at.x, strip, replaced)),
    ...placed.flatMap(({ station, at }) =>
      drawVerdictMark(station.verdict, at, replaced ? 1.1 : 1.35, replaced),
    ),
  ];
}

function drawBar(
  station: SurveyedStation,
  offset: number,
  x: number,
  strip: Strip,
  replaced: boolean,
): Shape[] {
  if (station.uncertainty === null) return [];
  const pen: Pen = replaced ? "quiet" : "wide";
  const half = station.uncertainty[strip.plane];
  const [from, to] = [offset - half, offset + half].map((end): Point => ({ x, y: strip.placeY(end) })) as [
    Point,
    Point,
  ];
  const cap = (at: Point): Shape => ({
    kind: "line",
    pen,
    from: { x: at.x - 0.9, y: at.y },
    to: { x: at.x + 0.9, y: at.y },
  });
  return [{ kind: "line", pen, from, to }, cap(from), cap(to)];
}
