import { ComputeError } from "../compute-error.ts";
import { fitAlgebraicCircle } from "./algebraic-circle.ts";
import { farCurvature, nearReach, placeOf } from "./centre-charts.ts";
import type { CentreProblem, Place } from "./centre-problem.ts";
import type { LimitingMethod } from "./circle-method.ts";
import { circumscribedCentre } from "./circumscribed-circle.ts";
import { convexHull, hullEdges } from "./convex-hull.ts";
import type { Region } from "./descend-centre.ts";
import type { LocalFrame } from "./local-frame.ts";
import { searchCentre } from "./search-centre.ts";

/** A limiting circle's centre, in units of the problem, proved the best of all. */
export interface LimitingCentre {
  readonly centre: Place;
  /** Another centre as good within the tie asked for; null when there is none. */
  readonly tie: Place | null;
  /** Regions of centres examined, or rounds. */
  readonly cells: number;
}

/** Centres farther than this × the points' own extent: the circle cannot be told from a straight strip. */
const stripCurvature = 1e-8;
const farSectors = 8;
const noEdges = new Int32Array(0);

/**
 * The best centre by one of the three limiting criteria. Circumscribed: convex, one optimum. Inscribed: the largest
 * circle without a point inside, of all with their centre in the points' convex hull. Minimum zone: the narrowest of
 * all, centres far away and straight strips included.
 * @throws ComputeError arc_too_flat when no circular zone is narrower than a straight strip; not_converged
 */
export function limitingCentre(
  method: LimitingMethod,
  problem: CentreProblem,
  frame: LocalFrame,
  tieWithin: number,
  member: string,
): LimitingCentre {
  switch (method) {
    case "minimum_circumscribed":
      return { centre: circumscribedCentre(problem, member), tie: null, cells: 0 };
    case "maximum_inscribed":
      return inscribedCentre(problem, frame, tieWithin, member);
    case "minimum_zone":
      return zoneCentre(problem, frame, tieWithin, member);
  }
}

function inscribedCentre(
  problem: CentreProblem,
  frame: LocalFrame,
  tieWithin: number,
  member: string,
): LimitingCentre {
  const { count, x, y } = problem;
  const edges = hullEdges(x, y);
  const [left, right] = [Math.min(...x), Math.max(...x)];
  const [low, high] = [Math.min(...y), Math.max(...y)];
  const region: Region = {
    chart: "near",
    x: (left + right) / 2,
    y: (low + high) / 2,
    halfX: (right - left) / 2,
    halfY: (high - low) / 2,
    edges: Int32Array.from(edges.nx, (_, k) => k),
  };
  const inside = ({ x: a, y: b }: Place) =>
    edges.nx.every((nx, k) => nx * a + edges.ny[k]! * b <= edges.reach[k]!);
  // The centroid is the frame's origin, and inside.
  const guess = algebraicCentre(problem, frame);
  const start = inside(guess) ? guess : { x: 0, y: 0 };
  const rivals = { outer: Int32Array.of(count), inner: allOf(count) };
  const { best, tie, cells } = searchCentre(
    { problem, rivals, regions: [region], edges, start: { region, ...start }, tieWithin },
    member,
  );
  return { centre: placeOf(best.chart, best.x, best.y), tie, cells };
}

function zoneCentre(
  problem: CentreProblem,
  frame: LocalFrame,
  tieWithin: number,
  member: string,
): LimitingCentre {
  const near: Region = { chart: "near", x: 0, y: 0, halfX: nearReach, halfY: nearReach, edges: noEdges };
  const far = (fromRad: number, halfRad: number): Region => ({
    chart: "far",
    x: fromRad + halfRad,
    y: farCurvature / 2,
    halfX: halfRad,
    halfY: farCurvature / 2,
    edges: noEdges,
  });
  const sectors = Array.from({ length: farSectors }, (_, k) =>
    far((2 * Math.PI * k) / farSectors, Math.PI / farSectors),
  );
  const inner = allOf(problem.count);
  // Without a taper only corners of the hull can be outermost.
  const outer = problem.added === null ? Int32Array.from(convexHull(problem.x, problem.y)) : inner;
  const guess = algebraicCentre(problem, frame);
  const distance = Math.hypot(guess.x, guess.y);
  const direction = Math.atan2(guess.y, guess.x);
  const start =
    distance <= nearReach
      ? { region: near, ...guess }
      : { region: far(direction - Math.PI, Math.PI), x: direction, y: 1 / distance };
  const { best, tie, cells } = searchCentre(
    {
      problem,
      rivals: { outer, inner },
      regions: [...sectors, near],
      edges: null,
      start,
      tieWithin,
    },
    member,
  );
  if (best.chart === "far" && best.y <= stripCurvature) {
    const detail = "No circular zone holds the points that is narrower than a straight strip.";
    throw new ComputeError("arc_too_flat", detail, { at: [member] });
  }
  return { centre: placeOf(best.chart, best.x, best.y), tie, cells };
}

function algebraicCentre({ unit }: CentreProblem, frame: LocalFrame): Place {
  const { a, b } = fitAlgebraicCircle(frame);
  return Number.isFinite(a) && Number.isFinite(b) ? { x: a / unit, y: b / unit } : { x: 0, y: 0 };
}

function allOf(count: number): Int32Array {
  return Int32Array.from({ length: count }, (_, i) => i);
}
