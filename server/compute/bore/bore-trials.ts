import { ComputeError } from "../compute-error.ts";
import { confirmInterval, type TrialRules, type TrialSummary } from "../monte-carlo/confirm-interval.ts";
import type { TrialPlan } from "../monte-carlo/trial-plan.ts";
import { fillNormals, nextStudentScale } from "../monte-carlo/random-draws.ts";
import { streamOf, type StreamState } from "../monte-carlo/wichmann-hill.ts";
import type { BoreFit, WallFit } from "./bore-fit.ts";
import type { BoreInput, RotatingTargetInput, WallInput } from "./bore-input.ts";
import type { CircleMethod } from "./circle-method.ts";
import { beamOf, gatherSpots, turnsOf } from "./fit-rotating-target.ts";
import { indicesOf } from "./exclude-outliers.ts";
import { trialFitOf } from "./trial-fit.ts";
import { gatherWall, type WallReadings } from "./wall-readings.ts";

/** What the trials of one bore say, mm. */
export interface BoreTrials {
  readonly h: TrialSummary;
  readonly v: TrialSummary;
  /** Null where the diameter is not known. */
  readonly diameter: TrialSummary | null;
  /** How many trials could not be computed, by the code of their refusal. */
  readonly failures: ReadonlyMap<string, number>;
}

/** Results of one trial: written by a trial's function, h, v and diameter. */
type Trial = (result: Float64Array) => void;

/** How far the errors drawn reach: each is u · scale · normal · √(ν/w). */
interface ErrorScale {
  readonly scale: number;
  readonly dof: number | null;
}

/** Rounding of a fit, in number spacings of its largest coordinate. */
const roundingSpacings = 64;

/**
 * Propagates the distributions of a bore's readings through its own fit (JCGM 101:2008, clause 7) and holds the
 * first-order intervals of `fit` against the result (clause 8). Readings are normal with the standard uncertainties
 * stated: a wall point in h and in v alike, a gauge or wire along the line that was read, a spot in both coordinates;
 * z and clock angles are exact. Where nothing is stated, and where the scatter passes what is stated, all errors are
 * those of the fit's own scale, known with its degrees of freedom: then every trial draws that scale too (6.4.9).
 * Readings put aside stay aside. `name` and the seed alone set the stream. Null where the fit knows no uncertainty.
 * Work: trials times one fit.
 * @throws ComputeError what forbids the fit of `input`
 */
export function runBoreTrials(
  input: BoreInput,
  method: CircleMethod,
  fit: BoreFit,
  name: string,
  plan: TrialPlan,
): BoreTrials | null {
  const { covariance, expandedUncertainty } = fit;
  if (covariance === null || expandedUncertainty === null) return null;
  const errors = errorScaleOf(fit, method);
  const stream = streamOf(plan.seed, `bore ${name}`);
  const trial =
    input.form === "rotating_target"
      ? spotTrial(input, errors, stream)
      : wallTrial(input, method, fit as WallFit, errors, stream);
  const columns = [0, 1, 2].map(() => new Float64Array(plan.trials));
  const failures = new Map<string, number>();
  const result = new Float64Array(3);
  let computed = 0;
  for (let t = 0; t < plan.trials; t++) {
    const refusal = attemptTrial(trial, result);
    if (refusal === null) {
      for (let k = 0; k < 3; k++) columns[k]![computed] = result[k]!;
      computed++;
    } else failures.set(refusal, (failures.get(refusal) ?? 0) + 1);
  }
  const [h, v, diameter] = columns.map((column) => column.subarray(0, computed)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  const { centre, diameterMm } = { diameterMm: null, ...fit };
  const { factor, hMm, vMm, diameterMm: expandedDiameterMm, level, dof } = expandedUncertainty;
  const reachMm = Math.abs(centre.hMm) + Math.abs(centre.vMm) + Math.abs(diameterMm ?? 0);
  const rules: TrialRules = {
    level,
    digits: plan.digits,
    unit: plan.unitMm,
    dof,
    rounding: roundingSpacings * Number.EPSILON * reachMm,
  };
  const confirm = (values: Float64Array, value: number, standard: number, expanded: number) =>
    confirmInterval(values, plan.trials - computed, { value, standard, expanded }, rules);
  return {
    h: confirm(h, centre.hMm, Math.sqrt(covariance.hhMm2), hMm),
    v: confirm(v, centre.vMm, Math.sqrt(covariance.vvMm2), vMm),
    diameter:
      diameterMm === null || expandedDiameterMm === null
        ? null
        : confirm(diameter, diameterMm, expandedDiameterMm / factor, expandedDiameterMm),
    failures,
  };
}

/** The code of the refusal of a trial that cannot be computed; null of one that can. */
function attemptTrial(trial: Trial, result: Float64Array): string | null {
  try {
    trial(result);
  } catch (error) {
    if (error instanceof ComputeError) return error.code;
    throw error;
  }
  return Number.isFinite(result[0]! + result[1]! + result[2]!) ? null : "result_overflow";
}

/** The scale of the covariance that `fit` was answered with: F of stated uncertainties, else the scatter itself. */
function errorScaleOf(fit: BoreFit, method: CircleMethod): ErrorScale {
  const { statistics, expandedUncertainty } = fit;
  const { varianceInflation, rmsMm, readingsUsed, parameters } = statistics;
  const dof = expandedUncertainty?.dof ?? null;
  if (varianceInflation !== null) return { scale: Math.sqrt(varianceInflation), dof };
  // A limiting circle has a covariance only where uncertainties are stated, and these stand as they are.
  if (method !== "least_squares" && method !== "ellipse") return { scale: 1, dof };
  const observations = fit.form === "rotating_target" ? 2 * readingsUsed : readingsUsed;
  return { scale: rmsMm * Math.sqrt(readingsUsed / (observations - parameters)), dof };
}

function wallTrial(
  input: WallInput,
  method: CircleMethod,
  fit: WallFit,
  { scale, dof }: ErrorScale,
  stream: StreamState,
): Trial {
  const sent = inUse(gatherWall(input).readings, fit.used);
  const n = sent.hMm.length;
  const fitTrial = trialFitOf(input, method, sent);
  const along = input.form === "points" ? null : linesRead(input, sent);
  const normals = new Float64Array(along === null ? 2 * n : n);
  const hMm = [...sent.hMm];
  const vMm = [...sent.vMm];
  const readings = { ...sent, hMm, vMm };
  return (result) => {
    const wide = scale * nextStudentScale(stream, dof);
    fillNormals(stream, normals);
    for (let i = 0; i < n; i++) {
      const u = wide * (sent.uMm?.[i] ?? 1);
      if (along === null) {
        hMm[i] = sent.hMm[i]! + u * normals[2 * i]!;
        vMm[i] = sent.vMm[i]! + u * normals[2 * i + 1]!;
      } else {
        const errorMm = u * normals[i]!;
        if (along.distanceMm[i]! + errorMm <= 0) throw atAxis();
        hMm[i] = sent.hMm[i]! + errorMm * along.h[i]!;
        vMm[i] = sent.vMm[i]! + errorMm * along.v[i]!;
      }
    }
    const { hMm: h, vMm: v, diameterMm } = fitTrial(readings);
    result[0] = h;
    result[1] = v;
    result[2] = diameterMm;
  };
}

/** The readings that were not put aside. */
function inUse(readings: WallReadings, used: readonly boolean[]): WallReadings {
  if (used.every((one) => one)) return readings;
  const indices = [...indicesOf(used)];
  const pick = (column: readonly number[]) => indices.map((index) => column[index]!);
  return {
    hMm: pick(readings.hMm),
    vMm: pick(readings.vMm),
    zMm: readings.zMm && pick(readings.zMm),
    uMm: readings.uMm && pick(readings.uMm),
  };
}

/** The lines from the gauge's axis or the wire to the wall: unit vectors and lengths, mm. */
function linesRead(input: Exclude<WallInput, { form: "points" }>, { hMm, vMm }: WallReadings) {
  const sagMm = input.form === "wire" ? input.sagMm : input.gaugeSagMm;
  const distanceMm = hMm.map((h, i) => Math.hypot(h, vMm[i]! + sagMm));
  return {
    h: hMm.map((h, i) => h / distanceMm[i]!),
    v: vMm.map((v, i) => (v + sagMm) / distanceMm[i]!),
    distanceMm,
  };
}

function atAxis(): ComputeError {
  return new ComputeError("radius_not_positive", "The wall would lie at or beyond the axis.");
}

function spotTrial(input: RotatingTargetInput, { scale, dof }: ErrorScale, stream: StreamState): Trial {
  const { readings } = gatherSpots(input);
  const turns = turnsOf(readings);
  const n = readings.spotH.length;
  const normals = new Float64Array(2 * n);
  const spotH = new Float64Array(n);
  const spotV = new Float64Array(n);
  return (result) => {
    const wide = scale * nextStudentScale(stream, dof);
    fillNormals(stream, normals);
    for (let i = 0; i < n; i++) {
      const u = wide * (readings.uMm?.[i] ?? 1);
      spotH[i] = readings.spotH[i]! + u * normals[2 * i]!;
      spotV[i] = readings.spotV[i]! + u * normals[2 * i + 1]!;
    }
    const { beamH, beamV } = beamOf(spotH, spotV, readings, turns);
    result[0] = -beamH;
    result[1] = -beamV;
    result[2] = 0;
  };
}
