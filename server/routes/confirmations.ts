import { confirmationRequest, confirmationResponse } from "../../shared/schemas/confirmations.ts";
import { confirmationKind } from "../calculations/confirmation.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

const createConfirmation = defineOperation({
  operationId: "createConfirmation",
  method: "post",
  path: "/v1/confirmations",
  tag: "Calculations",
  summary: "Confirm moves by a later survey",
  description:
    "Compares a later survey with an earlier one: whether the reference stations repeat within their uncertainty, and if not, whether all share a shift and tilt or one of them moved; how much of each planned move was made; what changed that should not have; what has still to be re-measured; and every station's verdict as left. It computes; a qualified engineer decides. The answer is kept as a record.",
  body: confirmationRequest,
  faultsBesideSchema: confirmationKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("confirmations"),
  response: {
    status: 201,
    description: "What repeats, what moved and what is outstanding, as stored.",
    schema: confirmationResponse,
    examples: () => exampleAnswers("confirmations", confirmationKind),
  },
  errors: [
    ...computeErrors,
    "unknown_reference",
    "combination_invalid",
    "covariance_not_positive",
    "tolerance_invalid",
    "reference_count",
    "stations_coincident",
    "weights_incomplete",
  ],
  handle: (call) => runCalculation(confirmationKind, call),
});

export const confirmationOperations = [createConfirmation];
