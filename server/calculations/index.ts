import type { z } from "zod";
import type { CalculationKind, CalculationKindName } from "./calculation-kind.ts";
import { alignmentKind } from "./alignment.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { boreFitKind } from "./bore-fit.ts";
import { coldTargetKind } from "./cold-target.ts";
import { confirmationKind } from "./confirmation.ts";
import { fewestMovesKind } from "./fewest-moves.ts";
import { measurementPlanKind } from "./measurement-plan.ts";
import { repeatabilityStudyKind } from "./repeatability-study.ts";
import { shimMoveKind } from "./shim-move.ts";
import { sightLineSetupKind } from "./sight-line-setup.ts";

/** A kind whose request type is known to itself alone: what its schema lets through is what it answers to. */
export type AnyKind = Omit<CalculationKind<never, object>, "request"> & { readonly request: z.ZodType };

/** Every kind of stored calculation, by name: what replays a record. */
export const calculationKinds: Readonly<Record<CalculationKindName, AnyKind>> = {
  "bore-fit": boreFitKind,
  "axis-deviation": axisDeviationKind,
  "shim-move": shimMoveKind,
  "fewest-moves": fewestMovesKind,
  alignment: alignmentKind,
  "cold-target": coldTargetKind,
  confirmation: confirmationKind,
  "repeatability-study": repeatabilityStudyKind,
  "measurement-plan": measurementPlanKind,
  "sight-line-setup": sightLineSetupKind,
};
