import type { Operation } from "../http/operation.ts";
import { alignmentOperations } from "./alignments.ts";
import { axisDeviationOperations } from "./axis-deviations.ts";
import { boreFitOperations } from "./bore-fits.ts";
import { calculationOperations } from "./calculations.ts";
import { coldTargetOperations } from "./cold-targets.ts";
import { confirmationOperations } from "./confirmations.ts";
import { documentOperation } from "./document.ts";
import { engineOperations } from "./engine.ts";
import { healthOperations } from "./health.ts";
import { keyOperations } from "./keys.ts";
import { memberOperations } from "./members.ts";
import { measurementPlanOperations } from "./measurement-plans.ts";
import { metaOperations } from "./meta.ts";
import { repeatabilityStudyOperations } from "./repeatability-studies.ts";
import { sessionOperations } from "./sessions.ts";
import { shimMoveOperations } from "./shim-moves.ts";
import { usageOperations } from "./usage.ts";

/** Every operation of the service, in the order of the document. */
export const operations: readonly Operation[] = [
  ...boreFitOperations,
  ...axisDeviationOperations,
  ...shimMoveOperations,
  ...alignmentOperations,
  ...coldTargetOperations,
  ...confirmationOperations,
  ...repeatabilityStudyOperations,
  ...measurementPlanOperations,
  ...calculationOperations,
  ...keyOperations,
  ...memberOperations,
  ...usageOperations,
  ...sessionOperations,
  ...metaOperations,
  ...engineOperations,
  ...healthOperations,
  documentOperation(() => operations),
];
