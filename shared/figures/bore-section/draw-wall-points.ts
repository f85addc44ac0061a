import { onClock, type Point, type Shape } from "../shape.ts";
import type { BoreSectionModel, WallPoint } from "./bore-section-model.ts";
import type { BoreSectionScale } from "./scale-bore-section.ts";

/** Above this the points are drawn as a trace of the extremes of each sector, and only marks of note are kept. */
const markedPoints = 240;
/** Neighbours farther apart than this are not joined: nothing was read between them. */
const joinedWithinDeg = 40;

/** Residual stems, trace and marks: dots for points in use, rings for contacts, crosses for excluded ones. */
export function drawWallPoints(model: BoreSectionModel, scale: BoreSectionScale): Shape[] {
  const used = model.points.filter((point) => point.used).sort((a, b) => a.clockDeg - b.clockDeg);
  const excluded = model.points.filter((point) => !point.used);
  const contacts = model.points.filter((point) => point.contact);
  const few = used.length <= markedPoints;
  const trace = few ? used : extremesOfSectors(used);
  return [
    ...(few ? used.map((point) => stem(point, scale)) : []),
    ...drawTrace(trace, scale),
    ...(few ? used.map((point) => dot(point, scale)) : []),
    ...contacts.map((point) => contactRing(point, scale)),
    ...excluded.flatMap((point) => strike(point, scale)),
  ];
}

/** Where a point is drawn; one beyond the band stops at its edge, which the strike's arrow then says. */
export function placeWallPoint(point: WallPoint, scale: BoreSectionScale): { at: Point; offScale: boolean } {
  const drawn = point.residual * scale.residualScale;
  const limit = scale.reach * 1.25;
  const offScale = Math.abs(drawn) > limit;
  const held = Math.max(-limit, Math.min(limit, drawn));
  return { at: onClock(scale.centre, scale.circleRadius + held, point.clockDeg), offScale };
}

function stem(point: WallPoint, scale: BoreSectionScale): Shape {
  const from = onClock(scale.centre, scale.circleRadius, point.clockDeg);
  return { kind: "line", pen: "quiet", from, to: placeWallPoint(point, scale).at };
}

function dot(point: WallPoint, scale: BoreSectionScale): Shape {
  return { kind: "circle", pen: null, centre: placeWallPoint(point, scale).at, radius: 0.75, fill: "ink" };
}

function contactRing(point: WallPoint, scale: BoreSectionScale): Shape {
  return { kind: "circle", pen: "wide", centre: placeWallPoint(point, scale).at, radius: 1.9 };
}

function strike(point: WallPoint, scale: BoreSectionScale): Shape[] {
  const { at, offScale } = placeWallPoint(point, scale);
  const arm = 1.3;
  const outward = point.residual < 0 ? -1 : 1;
  const beyond = onClock(at, outward * 3.2, point.clockDeg);
  const cross: Shape[] = [
    { kind: "circle", pen: "quiet", centre: at, radius: 0.75, fill: "paper" },
    {
      kind: "line",
      pen: "signal",
      from: { x: at.x - arm, y: at.y - arm },
      to: { x: at.x + arm, y: at.y + arm },
    },
    {
      kind: "line",
      pen: "signal",
      from: { x: at.x - arm, y: at.y + arm },
      to: { x: at.x + arm, y: at.y - arm },
    },
  ];
  return offScale ? [...cross, { kind: "line", pen: "signal", from: at, to: beyond }] : cross;
}

function drawTrace(points: readonly WallPoint[], scale: BoreSectionScale): Shape[] {
  const runs = runsOfNeighbours(points);
  return runs
    .filter((run) => run.points.length > 1)
    .map((run) => ({
      kind: "path",
      pen: "narrow",
      points: run.points.map((point) => placeWallPoint(point, scale).at),
      closed: run.closed,
    }));
}

/** Cuts the round of points where a gap is wider than `joinedWithinDeg`; one run without a gap closes. */
function runsOfNeighbours(points: readonly WallPoint[]): { points: WallPoint[]; closed: boolean }[] {
  const runs: WallPoint[][] = [];
  let previous: WallPoint | undefined;
  for (const point of points) {
    const joined = previous !== undefined && point.clockDeg - previous.clockDeg <= joinedWithinDeg;
    if (joined) runs.at(-1)?.push(point);
    else runs.push([point]);
    previous = point;
  }
  const first = points[0];
  const roundTheTop =
    first !== undefined &&
    previous !== undefined &&
    first.clockDeg + 360 - previous.clockDeg <= joinedWithinDeg;
  const [head, ...rest] = runs;
  const tail = rest.pop();
  if (!head || !roundTheTop) return runs.map((run) => ({ points: run, closed: false }));
  if (!tail) return [{ points: head, closed: points.length > 2 }];
  return [...rest, [...tail, ...head]].map((run) => ({ points: run, closed: false }));
}

/** The innermost and outermost point of every half degree: the shape of a dense scan in at most 1,440 points. */
function extremesOfSectors(sorted: readonly WallPoint[]): WallPoint[] {
  const sectors = new Map<number, [WallPoint, WallPoint]>();
  for (const point of sorted) {
    const sector = Math.floor(point.clockDeg * 2);
    const [inner, outer] = sectors.get(sector) ?? [point, point];
    sectors.set(sector, [
      point.residual < inner.residual ? point : inner,
      point.residual > outer.residual ? point : outer,
    ]);
  }
  return [...sectors.values()].flatMap(([inner, outer]) =>
    inner === outer ? [inner] : inner.clockDeg <= outer.clockDeg ? [inner, outer] : [outer, inner],
  );
}
