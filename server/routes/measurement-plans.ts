import { measurementPlanRequest, measurementPlanResponse } from "../../shared/schemas/measurement-plans.ts";
import { measurementPlanKind } from "../calculations/measurement-plan.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

const createMeasurementPlan = defineOperation({
  operationId: "createMeasurementPlan",
  method: "post",
  path: "/v1/measurement-plans",
  tag: "Calculations",
  summary: "Plan where to read a bore",
  description:
    "How certain the readings taken make a bore's centre, and which and how many of the clock angles that can be reached to add so that it becomes as certain as wanted. The choice is a heuristic: readings are added one by one where each lowers the largest variance most, then moved and dropped while that helps. `least` is a proved lower bound of their number, by the even ring or the continuous (E-optimal) relaxation; where `proved` is true none is better. Predictions are first-order, and hold if readings scatter as stated. The answer is kept as a record.",
  body: measurementPlanRequest,
  faultsBesideSchema: measurementPlanKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("measurement-plans"),
  response: {
    status: 201,
    description: "The plans, as stored.",
    schema: measurementPlanResponse,
    examples: () => exampleAnswers("measurement-plans", measurementPlanKind),
  },
  errors: [
    ...computeErrors,
    "required",
    "call_too_large",
    "too_few_points",
    "too_many_items",
    "angles_insufficient",
    "tolerance_invalid",
  ],
  handle: (call) => runCalculation(measurementPlanKind, call),
});

export const measurementPlanOperations = [createMeasurementPlan];
