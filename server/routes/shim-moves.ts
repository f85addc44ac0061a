import type { ProblemCode } from "../../shared/error-codes.ts";
import { shimMoveRequest, shimMoveResponse } from "../../shared/schemas/shim-moves.ts";
import { shimMoveKind } from "../calculations/shim-move.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

export const shimMoveErrors: readonly ProblemCode[] = [
  ...computeErrors,
  "unknown_reference",
  "combination_invalid",
  "covariance_not_positive",
  "tolerance_invalid",
  "supports_insufficient",
  "too_many_choices",
];

const createShimMove = defineOperation({
  operationId: "createShimMove",
  method: "post",
  path: "/v1/shim-moves",
  tag: "Calculations",
  summary: "Solve shim moves",
  description:
    "Turns deviations and supports into moves: what each support and shim stack changes, in which order, and where every station will lie afterwards. It computes; a qualified engineer decides. The answer is kept as a record.",
  body: shimMoveRequest,
  faultsBesideSchema: shimMoveKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("shim-moves"),
  response: {
    status: 201,
    description: "The moves, as stored.",
    schema: shimMoveResponse,
    examples: () => exampleAnswers("shim-moves", shimMoveKind),
  },
  errors: shimMoveErrors,
  handle: (call) => runCalculation(shimMoveKind, call),
});

export const shimMoveOperations = [createShimMove];
