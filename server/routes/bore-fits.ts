import type { ProblemCode } from "../../shared/error-codes.ts";
import { boreFitRequest, boreFitResponse } from "../../shared/schemas/bore-fits.ts";
import { boreFitKind } from "../calculations/bore-fit.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

export const boreFitErrors: readonly ProblemCode[] = [
  ...computeErrors,
  "too_few_points",
  "points_collinear",
  "points_coincident",
  "arc_too_flat",
  "no_inscribed_circle",
  "coverage_insufficient",
  "angles_insufficient",
  "uncertainty_incomplete",
  "radius_not_positive",
  "combination_invalid",
  "required",
  "out_of_range",
];

const createBoreFit = defineOperation({
  operationId: "createBoreFit",
  method: "post",
  path: "/v1/bore-fits",
  tag: "Calculations",
  summary: "Fit bore centres",
  description:
    "Turns readings of bore walls into centres, diameters and their uncertainties. A bore that states the temperature and the expansion of its gauge, its part or both also has its diameter at 20 °C (ISO 1:2016); what is not known of temperatures and coefficients is left out of its uncertainty, and centres are not touched. With monteCarlo each bore also answers whether its first-order uncertainty holds. All bores of a call are fitted, or none: a refusal names every fault of every bore. The answer is kept as a record.",
  body: boreFitRequest,
  faultsBesideSchema: boreFitKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("bore-fits"),
  response: {
    status: 201,
    description: "The fits, as stored.",
    schema: boreFitResponse,
    examples: () => exampleAnswers("bore-fits", boreFitKind),
  },
  errors: boreFitErrors,
  handle: (call) => runCalculation(boreFitKind, call),
});

export const boreFitOperations = [createBoreFit];
