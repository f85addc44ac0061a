import type { PlaneCovariance, PlaneVector } from "../plane.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import type { CommonLine } from "./common-line.ts";
import { applyCovariance, isDefinite, varianceAlong, type StationChange } from "./survey-change.ts";
import { changeStatistic, testChange, type ChangeTest, type VariancesAlong } from "./test-change.ts";

/** What the changes of stations are taken from: fixed space, or the line that the reference stations share. */
export interface Frame {
  /** Null: fixed in space. */
  readonly line: CommonLine | null;
  /** A station's change in the frame, mm. */
  readonly changeOf: (index: number) => PlaneVector;
  /** Its covariance, mm²; null where it is not known. */
  readonly covarianceOf: (index: number) => PlaneCovariance | null;
  /**
   * Whether the change less `planned` can be chance; null where nothing is known of its error, or where the station
   * itself sets the frame so much that no change of it could show.
   */
  readonly test: (index: number, planned: PlaneVector, level: number) => ChangeTest | null;
  /** The statistic of that test for no change at all. */
  readonly statisticOf: (index: number) => number | null;
}

const unchanged: PlaneVector = { hMm: 0, vMm: 0 };
/** Below this share of its own variance a reference station's deviation is only rounding: the line follows it. */
const controlMin = 1e-9;

/** Changes as read: the set-up was not touched. */
export function fixedFrame(changes: readonly StationChange[]): Frame {
  return frameOf(changes, null, {
    changeOf: (index) => changes[index]!.change,
    covarianceOf: (index) => changes[index]!.error?.total ?? null,
    variancesOf: (index) => {
      const parts = changes[index]!.error?.parts ?? [];
      const dof = parts.map((part) => part.dof);
      if (dof.every((each) => each === Infinity)) return null;
      return (direction) => ({
        variances: parts.map(({ covariance }) => varianceAlong(covariance, direction)),
        dof,
      });
    },
  });
}

/**
 * Changes off the line that reference stations share: deviations from each survey's own axis, compared. For a station
 * that set the line, covariance Σᵢ − B·N⁻¹·Bᵀ; for another Σᵢ + B·N⁻¹·Bᵀ. O(reference stations) a test.
 */
export function lineFrame(changes: readonly StationChange[], line: CommonLine): Frame {
  const isReference = new Set(line.through);
  const { shareOf } = line;
  return frameOf(changes, line, {
    changeOf: (index) => {
      // Two stations lie on their line exactly, rounding aside.
      if (line.through.length === 2 && isReference.has(index)) return unchanged;
      const { zMm, change } = changes[index]!;
      const common = line.at(zMm);
      return { hMm: change.hMm - common.hMm, vMm: change.vMm - common.vMm };
    },
    covarianceOf: (index) => {
      const { zMm, error } = changes[index]!;
      if (!error || !shareOf) return null;
      const inH = line.vectorAt(zMm, shareOf(zMm, { hMm: 1, vMm: 0 }));
      const inV = line.vectorAt(zMm, shareOf(zMm, { hMm: 0, vMm: 1 }));
      const sign = isReference.has(index) ? -1 : 1;
      return {
        hhMm2: error.total.hhMm2 + sign * inH.hMm,
        hvMm2: error.total.hvMm2 + (sign * (inH.vMm + inV.hMm)) / 2,
        vvMm2: error.total.vvMm2 + sign * inV.vMm,
      };
    },
    variancesOf: variancesOffLine(changes, line),
  });
}

/** What every survey of every reference station, and of the station itself, adds to the variance of its deviation. */
function variancesOffLine(
  changes: readonly StationChange[],
  { through, shareOf, vectorAt }: CommonLine,
): Measures["variancesOf"] {
  const isReference = new Set(through);
  const parts = through.flatMap((index) => changes[index]!.error?.parts ?? []);
  const variances = new Float64Array(parts.length + 2);
  const dof = Float64Array.from([...parts.map((part) => part.dof), Infinity, Infinity]);
  return (index) => {
    const station = changes[index]!;
    const own = isReference.has(index) ? [] : (station.error?.parts ?? []);
    for (const k of [0, 1]) dof[parts.length + k] = own[k]?.dof ?? Infinity;
    if (!shareOf || dof.every((each) => each === Infinity)) return null;
    return (direction) => {
      const share = shareOf(station.zMm, direction);
      let place = 0;
      for (const reference of through) {
        const { zMm, error } = changes[reference]!;
        // How the deviation answers to this station's change: Σⱼ⁻¹·B·p by the line, and by itself where it is the same.
        const pulled = applyCovariance(error!.inverse, vectorAt(zMm, share));
        const isOwn = reference === index;
        const hMm = (isOwn ? direction.hMm : 0) - pulled.hMm;
        const vMm = (isOwn ? direction.vMm : 0) - pulled.vMm;
        for (const { covariance } of error!.parts) {
          variances[place] = varianceAlong(covariance, { hMm, vMm });
          place += 1;
        }
      }
      for (const k of [0, 1]) variances[place + k] = own[k] ? varianceAlong(own[k].covariance, direction) : 0;
      return { variances, dof };
    };
  };
}

interface Measures {
  readonly changeOf: Frame["changeOf"];
  readonly covarianceOf: Frame["covarianceOf"];
  readonly variancesOf: (index: number) => VariancesAlong;
}

function frameOf(
  changes: readonly StationChange[],
  line: CommonLine | null,
  { changeOf, covarianceOf, variancesOf }: Measures,
): Frame {
  const testable = (index: number): PlaneCovariance | null => {
    const covariance = covarianceOf(index);
    const own = changes[index]!.error?.total;
    return covariance && own && isControlled(covariance, own) ? covariance : null;
  };
  return {
    line,
    changeOf,
    covarianceOf,
    test: (index, planned, level) => {
      const covariance = testable(index);
      if (!covariance) return null;
      const change = changeOf(index);
      const off = { hMm: change.hMm - planned.hMm, vMm: change.vMm - planned.vMm };
      return testChange(off, covariance, variancesOf(index), level);
    },
    statisticOf: (index) => {
      const covariance = testable(index);
      return covariance && changeStatistic(changeOf(index), covariance);
    },
  };
}

/** Whether enough of a station's own error is left in its deviation for a change to show, in every direction. */
function isControlled(covariance: PlaneCovariance, own: PlaneCovariance): boolean {
  if (!isDefinite(covariance)) return false;
  // Smaller root of det(covariance − λ·own) = 0: the share of the error that the line leaves in its worst direction.
  const ownDeterminant = own.hhMm2 * own.vvMm2 - own.hvMm2 * own.hvMm2;
  const determinant = covariance.hhMm2 * covariance.vvMm2 - covariance.hvMm2 * covariance.hvMm2;
  const trace =
    (covariance.hhMm2 * own.vvMm2 - 2 * covariance.hvMm2 * own.hvMm2 + covariance.vvMm2 * own.hhMm2) /
    ownDeterminant;
  const product = determinant / ownDeterminant;
  const larger = trace / 2 + Math.sqrt(Math.max(0, (trace * trace) / 4 - product));
  return product / larger > controlMin;
}

/** Tests whether stations did not change in a frame, one by one; null where it cannot be told. */
export function testUnchanged(
  frame: Frame,
  stations: readonly number[],
  level: number,
): (ChangeTest | null)[] {
  return stations.map((index) => frame.test(index, unchanged, level));
}

/** Whether every station that can be told is unchanged in the frame, and one at least can be. */
export function allUnchanged(frame: Frame, stations: readonly number[], level: number): boolean {
  // What passes for infinite degrees of freedom passes for fewer.
  const least = radialFactor(level, null) ** 2;
  let told = 0;
  const unchangedAll = stations.every((index) => {
    const statistic = frame.statisticOf(index);
    if (statistic === null) return true;
    told += 1;
    return statistic <= least || frame.test(index, unchanged, level)?.within === true;
  });
  return unchangedAll && told > 0;
}
