import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { Frame } from "../compute/confirmation/frame.ts";
import type { ReferenceJudgement } from "../compute/confirmation/judge-reference.ts";
import { achievedRatio } from "../compute/confirmation/planned-move.ts";
import type { ChangeTest } from "../compute/confirmation/test-change.ts";
import type { PlaneVector } from "../compute/plane.ts";
import type { Plan } from "./confirmation-input.ts";
import { writeDeviation } from "./write-deviation.ts";
import { writeCovariance, writeVector } from "./write-plane.ts";

type Converters = Record<Dimension, Converter>;

const unchanged: PlaneVector = { hMm: 0, vMm: 0 };

/** What every station of a confirmation is looked at with. */
export interface Look {
  readonly convert: Converters;
  readonly comparedAt: ReadonlyMap<string, number>;
  readonly frame: Frame;
  readonly level: number;
}

/** How much of its planned move a station made. */
export function movedAnswer(
  id: string,
  { plannedOf }: Plan,
  { convert: { offset }, comparedAt, frame, level }: Look,
): ConfirmationResult["moved"][number] {
  const plannedMm = plannedOf.get(id) ?? null;
  const index = comparedAt.get(id);
  const planned = plannedMm && writeVector(plannedMm, offset);
  if (index === undefined) {
    return {
      id,
      planned,
      achieved: null,
      ratio: null,
      difference: null,
      covariance: null,
      ...writeTest(null),
      agrees: null,
    };
  }
  const achievedMm = frame.changeOf(index);
  const test = plannedMm && frame.test(index, plannedMm, level);
  return {
    id,
    planned,
    achieved: writeVector(achievedMm, offset),
    ratio: plannedMm && achievedRatio(achievedMm, plannedMm),
    difference:
      plannedMm &&
      writeVector({ hMm: achievedMm.hMm - plannedMm.hMm, vMm: achievedMm.vMm - plannedMm.vMm }, offset),
    covariance: covarianceAt(frame, index, offset),
    ...writeTest(test),
    agrees: test?.within ?? null,
  };
}

/** Whether a station that nobody moved changed. */
export function unmovedAnswer(
  id: string,
  { convert: { offset }, comparedAt, frame, level }: Look,
): ConfirmationResult["unmoved"][number] {
  const index = comparedAt.get(id)!;
  const test = frame.test(index, unchanged, level);
  return {
    id,
    change: writeDeviation(frame.changeOf(index), offset),
    covariance: covarianceAt(frame, index, offset),
    ...writeTest(test),
    changed: test && !test.within,
  };
}

/** Whether the reference stations repeat, and what they share. */
export function referenceAnswer(
  { repeats, cause, shared, perStation }: ReferenceJudgement,
  ids: readonly string[],
  toldApart: readonly string[],
  { axial, offset }: Converters,
): ConfirmationResult["reference"] {
  const perAxial = axial.toMm(1);
  const [only] = perStation.length === 1 ? perStation : [];
  const shift = shared ? { hMm: shared.h.at0Mm, vMm: shared.v.at0Mm } : (only?.change ?? null);
  return {
    repeats,
    cause,
    moved: [...toldApart],
    shift: shift && writeVector(shift, offset),
    tilt: shared && writeVector({ hMm: shared.h.slope * perAxial, vMm: shared.v.slope * perAxial }, offset),
    perStation: perStation.map(({ change, deviation, test }, i) => ({
      id: ids[i]!,
      change: writeVector(change, offset),
      deviation: writeVector(deviation, offset),
      ...writeTest(test),
      repeats: test?.within ?? null,
    })),
  };
}

function writeTest(test: ChangeTest | null): {
  statistic: number | null;
  limit: number | null;
  dof: number | null;
} {
  return { statistic: test?.statistic ?? null, limit: test?.limit ?? null, dof: test?.dof ?? null };
}

function covarianceAt(frame: Frame, index: number, offset: Converter): number[][] | null {
  const covariance = frame.covarianceOf(index);
  return covariance && writeCovariance(covariance, offset);
}
