import { ComputeError } from "../compute-error.ts";
import type { AxisInput } from "./axis-input.ts";
import type { AxisOptimum, LineEvidence } from "./axis-result.ts";
import { fitCoupledPlanes, fitPlane, type PlaneFits } from "./fit-plane.ts";
import { leastRadialSum, leastSumInPlane } from "./least-radial-sum.ts";
import type { LineGains } from "./line-gains.ts";
import { lineProblem, type LineOptimum, type LineProblem, type PlaneObservations } from "./line-problem.ts";
import { smallestZone } from "./smallest-zone.ts";
import { verifyLine, type LineAim } from "./verify-line.ts";

/** Stations within this share of the largest weight × distance touch the zone. */
const touchingShare = 1e-9;
/** Stations within this share of the largest distance are passed through. */
const passedShare = 1e-11;

/** An axis that is the best of all by its criterion, with the evidence. */
export interface OptimalAxis {
  readonly fits: PlaneFits;
  readonly optimum: AxisOptimum;
}

/**
 * The axis whose largest weight × distance from the reference stations is least (minimum_zone), or whose sum of them
 * is (least_absolute): in each plane for itself, or by radial distance in both at once (zone cylinder). Weights are 1
 * unless stated; covariances weigh nothing. Every axis is proved the best before it is answered, by a bound that no
 * axis comes below. Work bounded: some hundred passes over the reference stations.
 * @throws ComputeError not_converged, rank_deficient, result_overflow
 */
export function fitOptimalAxis(input: AxisInput): OptimalAxis {
  const { method, zone = "planes", reference, stations } = input;
  const aim: LineAim = method === "minimum_zone" ? "largest" : "sum";
  const at = reference.map((index) => stations[index]!);
  const weights = at.map(({ weight }) => weight ?? 1);
  const zMm = at.map((station) => station.zMm);
  const observed = (member: "hMm" | "vMm"): PlaneObservations => ({
    observedMm: at.map(({ centre, target }) => centre[member] - target[member]),
    magnitudesMm: at.map(({ centre, target }) => Math.abs(centre[member]) + Math.abs(target[member])),
  });
  const [h, v] = [observed("hMm"), observed("vMm")];
  const solve = (problem: LineProblem) =>
    aim === "largest"
      ? smallestZone(problem)
      : problem.offsets.length === 1
        ? leastSumInPlane(problem, zMm)
        : leastRadialSum(problem, zMm);
  const pose = (...planes: PlaneObservations[]) => requireFinite(lineProblem(zMm, planes, weights));
  const evidenceOf = (
    problem: LineProblem,
    found: LineOptimum,
    planes: readonly PlaneObservations[],
    deviationsMm: readonly Float64Array[],
  ) =>
    evidence({
      aim,
      problem,
      found,
      weights,
      deviationsMm: deviationsMm.map((plane) => Float64Array.from(reference, (index) => plane[index]!)),
      roundingsMm: weights.map(
        (weight, j) =>
          4 * Number.EPSILON * weight * planes.reduce((sum, plane) => sum + plane.magnitudesMm[j]!, 0),
      ),
    });

  if (zone === "planes") {
    const problems = { h: pose(h), v: pose(v) };
    const found = { h: solve(problems.h), v: solve(problems.v) };
    const fits = fitApart(input, found.h.gains[0]![0]!, found.v.gains[0]![0]!);
    return {
      fits,
      optimum: {
        zone,
        h: evidenceOf(problems.h, found.h, [h], [fits.h.deviationsMm]),
        v: inV(evidenceOf(problems.v, found.v, [v], [fits.v.deviationsMm])),
      },
    };
  }
  const problem = pose(h, v);
  const found = solve(problem);
  const fits = fitTogether(input, found);
  const both = evidenceOf(problem, found, [h, v], [fits.h.deviationsMm, fits.v.deviationsMm]);
  return { fits, optimum: { zone, both } };
}

function requireFinite(problem: LineProblem): LineProblem {
  const { along, offsets, sizeMm } = problem;
  if (Number.isFinite(sizeMm) && [along, ...offsets].every((values) => values.every(Number.isFinite))) {
    return problem;
  }
  throw new ComputeError("result_overflow", "A distance from the axis is not a finite number.");
}

function fitApart({ reference, stations }: AxisInput, h: LineGains, v: LineGains): PlaneFits {
  const zMm = stations.map((station) => station.zMm);
  const observed = (member: "hMm" | "vMm") =>
    stations.map(({ centre, target }) => centre[member] - target[member]);
  return { h: fitPlane(h, reference, zMm, observed("hMm")), v: fitPlane(v, reference, zMm, observed("vMm")) };
}

function fitTogether(input: AxisInput, { gains }: LineOptimum): PlaneFits {
  const [[hh, hv], [vh, vv]] = gains as [[LineGains, LineGains], [LineGains, LineGains]];
  const none = ({ shares, moments }: LineGains) => [...shares, ...moments].every((gain) => gain === 0);
  if (none(hv) && none(vh)) return fitApart(input, hh, vv);
  const { reference, stations } = input;
  return fitCoupledPlanes(
    { h: { own: hh, cross: hv }, v: { own: vv, cross: vh } },
    reference,
    stations.map((station) => station.zMm),
    {
      h: stations.map(({ centre, target }) => centre.hMm - target.hMm),
      v: stations.map(({ centre, target }) => centre.vMm - target.vMm),
    },
  );
}

interface Claimed {
  readonly aim: LineAim;
  readonly problem: LineProblem;
  readonly found: LineOptimum;
  readonly weights: readonly number[];
  readonly deviationsMm: readonly Float64Array[];
  /** Of weight × distance, for the numbers sent alone. */
  readonly roundingsMm: readonly number[];
}

/** Proves the axis best, and says how: in one plane the multipliers are given as of h. */
function evidence({ aim, problem, found, weights, deviationsMm, roundingsMm }: Claimed): LineEvidence {
  const roundingMm =
    aim === "largest" ? Math.max(...roundingsMm) : roundingsMm.reduce((sum, value) => sum + value, 0);
  const { along } = problem;
  const { multipliers } = found;
  const proof = verifyLine({ aim, along, deviationsMm, weights, multipliers, roundingMm });
  const distances = weights.map((_, j) => Math.hypot(...deviationsMm.map((plane) => plane[j]!)));
  const farthest = Math.max(...distances);
  const contacts = [...along.keys()].filter((j) => {
    const own = roundingsMm[j]!;
    return aim === "largest"
      ? weights[j]! * distances[j]! >= proof.objectiveMm * (1 - touchingShare) - own
      : distances[j]! <= passedShare * farthest + own / weights[j]!;
  });
  const [h, v] = proof.multipliers;
  return {
    objectiveMm: proof.objectiveMm,
    lowerBoundMm: proof.lowerBoundMm,
    extentMm: aim === "largest" ? 2 * farthest : distances.reduce((sum, distance) => sum + distance, 0),
    contacts,
    multipliers: contacts
      .map((place) => ({ place, h: h![place]!, v: v?.[place] ?? 0 }))
      .filter((one) => one.h !== 0 || one.v !== 0),
    unique: found.unique,
    spareContacts: contacts.some((place) => !found.setBy.includes(place)),
  };
}

const inV = (one: LineEvidence): LineEvidence => ({
  ...one,
  multipliers: one.multipliers.map(({ place, h }) => ({ place, h: 0, v: h })),
});
