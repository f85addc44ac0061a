import { coldTargetRequest, coldTargetResponse } from "../../shared/schemas/cold-targets.ts";
import { coldTargetKind } from "../calculations/cold-target.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

const createColdTarget = defineOperation({
  operationId: "createColdTarget",
  method: "post",
  path: "/v1/cold-targets",
  tag: "Calculations",
  summary: "Work out cold targets",
  description:
    "Says where every bore should lie cold, relative to the axis, so that it lies right when hot and running: a part round the rotor at the bent, running shaft, a bearing on its wanted line, each less thermal growth and closing. The contributions are kept apart. The shaft is a stepped beam under its own weight and what it carries, on supports at line + running journal, without shear. A stretched wire's sag below its level chord is answered beside it. The answer is kept as a record.",
  body: coldTargetRequest,
  faultsBesideSchema: coldTargetKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("cold-targets"),
  response: {
    status: 201,
    description: "Targets and what they are made of, as stored.",
    schema: coldTargetResponse,
    examples: () => exampleAnswers("cold-targets", coldTargetKind),
  },
  errors: [...computeErrors, "unknown_reference", "combination_invalid", "shaft_unsupported"],
  handle: (call) => runCalculation(coldTargetKind, call),
});

export const coldTargetOperations = [createColdTarget];
