import { ComputeError } from "../compute-error.ts";
import { leastSquaresGains, type LineGains } from "./line-gains.ts";
import { gainsOfParts, type GainPart, type LineOptimum, type LineProblem } from "./line-problem.ts";
import { problemAt } from "./minimax-problem.ts";
import type { Caution } from "./minimax-contacts.ts";
import { cautions, solveMinimax, type MinimaxOptimum } from "./solve-minimax.ts";

/** Stations nearer than this, in half spans, stand at one z. */
const sameAlong = 1e-12;
/** A radius within this share of another is the same. */
const sameRadius = 1e-9;

/**
 * The line whose largest weight × distance from the stations is least: in one plane the strip, in two the cylinder of
 * least diameter that holds them, the straightness zone of ISO 1101. Its multipliers prove it: for any line, the
 * largest weight × distance is at least Σ multiplier·offset, since they are orthogonal to every line and
 * Σ |multiplier|/weight = 1.
 *
 * Where all contacts stand at one z the slope is open. Then, of the lines through the centre found there, the one is
 * taken whose largest weight × distance from the other stations is least; it is not unique unless they touch as well.
 * @throws ComputeError not_converged
 */
export function smallestZone(problem: LineProblem): LineOptimum {
  const { along, offsets, weights } = problem;
  if (problem.straight) return zoneWithoutWidth(problem);
  const level = new Float64Array(along.length).fill(1);
  for (const caution of cautions) {
    const found = solveMinimax({ design: [level, along], offsets, weights }, 0, caution);
    if (found.kind === "straight") return zoneWithoutWidth(problem);
    const zone =
      found.kind === "optimum"
        ? zoneOf(problem, found)
        : found.kind === "open"
          ? zoneOpenInSlope(problem, found.place, caution)
          : null;
    if (zone) return zone;
  }
  throw new ComputeError("not_converged", "The contacts of the smallest zone could not be settled.");
}

function zoneOf(problem: LineProblem, found: MinimaxOptimum): LineOptimum {
  const { along, offsets } = problem;
  return {
    gains: offsets.map((_, a) =>
      offsets.map((__, b) =>
        gainsOfParts(
          problem,
          0,
          found.places.map((place, c) => {
            const [share, moment] = found.sensitivities[c]![b]!.slice(2 * a) as [number, number];
            return { place, share, moment };
          }),
        ),
      ),
    ),
    multipliers: spread(found, found.places, along.length),
    setBy: found.places,
    unique: true,
  };
}

/**
 * The centre at one z first, from the stations there; then the slope, from all others. Null when no slope keeps those
 * within the distance that the centre leaves, so that the slope was not open.
 */
function zoneOpenInSlope(problem: LineProblem, at: number, caution: Caution): LineOptimum | null {
  const { along, offsets, weights, resolution } = problem;
  const centreAlong = along[at]!;
  const all = [...along.keys()];
  const here = all.filter((j) => Math.abs(along[j]! - centreAlong) <= sameAlong);
  const elsewhere = all.filter((j) => !here.includes(j));
  const level = new Float64Array(along.length).fill(1);
  const centre = solveMinimax(problemAt({ design: [level], offsets, weights }, here), 0, caution);
  if (centre.kind !== "optimum") return null;
  const fromCentre = along.map((z) => z - centreAlong);
  const left = offsets.map((plane, d) => plane.map((offset) => offset - centre.x[d]!));
  const slopeProblem = problemAt({ design: [fromCentre], offsets: left, weights }, elsewhere);
  const slope = solveMinimax(slopeProblem, resolution, caution);
  const slopeRadius = slope.kind === "optimum" ? slope.largest : 0;
  if (slope.kind === "unsettled" || slopeRadius > centre.largest * (1 + sameRadius)) return null;
  const turn = slope.kind === "optimum" ? slope : turnTo(slopeProblem.design[0]!);
  const parts = (a: number, b: number): GainPart[] => [
    ...centre.places.map((place, c) => {
      const share = centre.sensitivities[c]![b]![a]!;
      // What moves the centre moves the other stations the other way, as seen from it.
      const total = offsets.reduce(
        (sum, _, d) =>
          sum +
          turn.sensitivities.reduce((all, of) => all + of[d]![a]!, 0) * centre.sensitivities[c]![b]![d]!,
        0,
      );
      return { place: here[place]!, share, moment: -total };
    }),
    ...turn.places.map((place, c) => ({
      place: elsewhere[place]!,
      share: 0,
      moment: turn.sensitivities[c]![b]![a]!,
    })),
  ];
  return {
    gains: offsets.map((_, a) => offsets.map((__, b) => gainsOfParts(problem, centreAlong, parts(a, b)))),
    multipliers: spread(
      centre,
      centre.places.map((place) => here[place]!),
      along.length,
    ),
    setBy: [...centre.places.map((place) => here[place]!), ...turn.places.map((place) => elsewhere[place]!)],
    unique: slopeRadius >= centre.largest * (1 - sameRadius),
  };
}

/** Stations that a turned line meets all: the farthest from the centre sets it. */
function turnTo(fromCentre: Float64Array): Pick<MinimaxOptimum, "places" | "sensitivities"> {
  const farthest = fromCentre.reduce(
    (most, distance, j) => (Math.abs(distance) > Math.abs(fromCentre[most]!) ? j : most),
    0,
  );
  const per = 1 / fromCentre[farthest]!;
  return {
    places: [farthest],
    sensitivities: [
      [
        [per, 0],
        [0, per],
      ],
    ],
  };
}

/**
 * Stations on a straight line: every one touches, and which three set the zone is open. Those are taken that would if
 * the line bent by the least: as the zone of z². Stations at two z alone leave only the least-squares line.
 */
function zoneWithoutWidth(problem: LineProblem): LineOptimum {
  const { along, offsets, weights, middleMm, halfSpanMm } = problem;
  const level = new Float64Array(along.length).fill(1);
  const bent = solveMinimax(
    { design: [level, along], offsets: [along.map((z) => z * z)], weights },
    problem.resolution,
  );
  const own: LineGains =
    bent.kind === "optimum"
      ? gainsOfParts(
          problem,
          0,
          bent.places.map((place, c) => {
            const [share, moment] = bent.sensitivities[c]![0] as [number, number];
            return { place, share, moment };
          }),
        )
      : leastSquaresGains(
          [...along].map((z) => middleMm + z * halfSpanMm),
          [...weights].map((weight) => 1 / weight ** 2),
        );
  const none = gainsOfParts(problem, 0, []);
  return {
    gains: offsets.map((_, a) => offsets.map((__, b) => (a === b ? own : none))),
    multipliers: offsets.map(() => new Float64Array(along.length)),
    setBy: bent.kind === "optimum" ? bent.places : [...along.keys()],
    unique: true,
  };
}

/** Multipliers of the contacts at their places among all stations, one array for each plane. */
function spread({ multipliers }: MinimaxOptimum, places: readonly number[], count: number): Float64Array[] {
  const planes = multipliers[0]?.length ?? 0;
  return Array.from({ length: planes }, (_, plane) => {
    const all = new Float64Array(count);
    for (const [c, place] of places.entries()) all[place] = multipliers[c]![plane]!;
    return all;
  });
}
