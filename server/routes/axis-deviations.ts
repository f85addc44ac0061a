import type { ProblemCode } from "../../shared/error-codes.ts";
import { axisDeviationRequest, axisDeviationResponse } from "../../shared/schemas/axis-deviations.ts";
import { axisDeviationKind } from "../calculations/axis-deviation.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

export const axisDeviationErrors: readonly ProblemCode[] = [
  ...computeErrors,
  "reference_count",
  "stations_coincident",
  "unknown_reference",
  "covariance_not_positive",
  "tolerance_invalid",
  "weights_incomplete",
  "out_of_range",
];

const createAxisDeviation = defineOperation({
  operationId: "createAxisDeviation",
  method: "post",
  path: "/v1/axis-deviations",
  tag: "Calculations",
  summary: "Measure deviations from the reference axis",
  description:
    "Lays the reference axis through the reference stations and answers how far every station's centre lies from where it should, with uncertainty and verdict; by Monte Carlo too, where it is asked for. The answer is kept as a record.",
  body: axisDeviationRequest,
  faultsBesideSchema: axisDeviationKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("axis-deviations"),
  response: {
    status: 201,
    description: "Axis and deviations, as stored.",
    schema: axisDeviationResponse,
    examples: () => exampleAnswers("axis-deviations", axisDeviationKind),
  },
  errors: axisDeviationErrors,
  handle: (call) => runCalculation(axisDeviationKind, call),
});

export const axisDeviationOperations = [createAxisDeviation];
