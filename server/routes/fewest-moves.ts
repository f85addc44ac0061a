import { fewestMovesRequest, fewestMovesResponse } from "../../shared/schemas/fewest-moves.ts";
import { fewestMovesKind } from "../calculations/fewest-moves.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

const createFewestMoves = defineOperation({
  operationId: "createFewestMoves",
  method: "post",
  path: "/v1/fewest-moves",
  tag: "Calculations",
  summary: "Choose the fewest moves",
  description:
    "Chooses the axis, inside limits at the reference stations, and the parts to move together, so that the cost of the parts moved is least and every station conforms; and gives the body of the call that then chooses the shims. It computes; a qualified engineer decides. The answer is kept as a record.",
  body: fewestMovesRequest,
  faultsBesideSchema: fewestMovesKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("fewest-moves"),
  response: {
    status: 201,
    description: "The choice, as stored.",
    schema: fewestMovesResponse,
    examples: () => exampleAnswers("fewest-moves", fewestMovesKind),
  },
  errors: [
    ...computeErrors,
    "unknown_reference",
    "combination_invalid",
    "covariance_not_positive",
    "tolerance_invalid",
    "supports_insufficient",
    "reference_count",
    "stations_coincident",
  ],
  handle: (call) => runCalculation(fewestMovesKind, call),
});

export const fewestMovesOperations = [createFewestMoves];
