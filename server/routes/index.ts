import type { Operation } from "../http/operation.ts";
import { alignmentOperations } from "./alignments.ts";
import { axisDeviationOperations } from "./axis-deviations.ts";
import { boreFitOperations } from "./bore-fits.ts";
import { calculationOperations } from "./calculations.ts";
import { documentOperation } from "./document.ts";
import { healthOperations } from "./health.ts";
import { keyOperations } from "./keys.ts";
import { memberOperations } from "./members.ts";
import { metaOperations } from "./meta.ts";
import { sessionOperations } from "./sessions.ts";
import { shimMoveOperations } from "./shim-moves.ts";
import { usageOperations } from "./usage.ts";

/** Every operation of the service, in the order of the document. */
export const operations: readonly Operation[] = [
  ...boreFitOperations,
  ...axisDeviationOperations,
  ...shimMoveOperations,
  ...alignmentOperations,
  ...calculationOperations,
  ...keyOperations,
  ...memberOperations,
  ...usageOperations,
  ...sessionOperations,
  ...metaOperations,
  ...healthOperations,
  documentOperation(() => operations),
];
