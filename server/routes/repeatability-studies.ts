import {
  repeatabilityStudyRequest,
  repeatabilityStudyResponse,
} from "../../shared/schemas/repeatability-studies.ts";
import { repeatabilityStudyKind } from "../calculations/repeatability-study.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

const createRepeatabilityStudy = defineOperation({
  operationId: "createRepeatabilityStudy",
  method: "post",
  path: "/v1/repeatability-studies",
  tag: "Calculations",
  summary: "Study how readings repeat",
  description:
    "Repeat readings of one station: mean, standard deviation, Type A uncertainty and drift. Or several people at several stations, several times each: repeatability, reproducibility and interaction by analysis of variance, and the share of a tolerance that readings take. The answer is kept as a record.",
  body: repeatabilityStudyRequest,
  faultsBesideSchema: repeatabilityStudyKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("repeatability-studies"),
  response: {
    status: 201,
    description: "The study, as stored.",
    schema: repeatabilityStudyResponse,
    examples: () => exampleAnswers("repeatability-studies", repeatabilityStudyKind),
  },
  errors: [...computeErrors, "combination_invalid", "tolerance_invalid", "too_few_points"],
  handle: (call) => runCalculation(repeatabilityStudyKind, call),
});

export const repeatabilityStudyOperations = [createRepeatabilityStudy];
