import { alignmentRequest, alignmentResponse } from "../../shared/schemas/alignments.ts";
import { alignmentKind } from "../calculations/alignment.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { axisDeviationErrors } from "./axis-deviations.ts";
import { boreFitErrors } from "./bore-fits.ts";
import { shimMoveErrors } from "./shim-moves.ts";

const createAlignment = defineOperation({
  operationId: "createAlignment",
  method: "post",
  path: "/v1/alignments",
  tag: "Calculations",
  summary: "Fit, measure and solve in one call",
  description:
    "Bore fits, deviations from the reference axis and shim moves, each from the part before it as the single endpoints would serve it: the answers are the same to the last bit. It computes; a qualified engineer decides. The answer is kept as one record.",
  body: alignmentRequest,
  faultsBesideSchema: alignmentKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("alignments"),
  response: {
    status: 201,
    description: "Fits, axis, deviations and moves, as stored.",
    schema: alignmentResponse,
    examples: () => exampleAnswers("alignments", alignmentKind),
  },
  errors: [...new Set([...boreFitErrors, ...axisDeviationErrors, ...shimMoveErrors])],
  handle: (call) => runCalculation(alignmentKind, call),
});

export const alignmentOperations = [createAlignment];
