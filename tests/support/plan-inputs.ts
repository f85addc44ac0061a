import type { PlanInput } from "../../server/compute/planning/plan-input.ts";
import { planMeasurement, type MeasurementPlan } from "../../server/compute/planning/plan-measurement.ts";

export const plainPlan: PlanInput = {
  form: "wall",
  taken: [],
  places: [],
  uMm: 0.005,
  wanted: { form: "radial", radialMm: 0.01 },
  level: 0.95,
  addedMax: 1000,
  exchangesMax: 200_000,
};

export const planOf = (input: Partial<PlanInput>): MeasurementPlan =>
  planMeasurement({ ...plainPlan, ...input });

/** One reading at each angle. */
export const takenAt = (angles: readonly number[], uMm = plainPlan.uMm) =>
  angles.map((clockDeg) => ({ clockDeg, uMm, times: 1 }));

export const placesAt = (angles: readonly number[], readingsMax = 1) =>
  angles.map((clockDeg) => ({ clockDeg, readingsMax }));

export const radial = (radialMm: number) => ({ form: "radial", radialMm }) as const;

/** The clock angle of every reading added. */
export const spreadOf = ({ added }: MeasurementPlan): number[] =>
  added.flatMap(({ clockDeg, readings }) => Array.from({ length: readings }, () => clockDeg));
