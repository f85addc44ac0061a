import { sightLineSetupRequest, sightLineSetupResponse } from "../../shared/schemas/sight-line-setups.ts";
import { sightLineSetupKind } from "../calculations/sight-line-setup.ts";
import { exampleAnswers, exampleRequests } from "../http/example-calls.ts";
import { defineOperation } from "../http/operation.ts";
import { runCalculation } from "../services/run-calculation.ts";
import { computeErrors } from "./compute-errors.ts";

const createSightLineSetup = defineOperation({
  operationId: "createSightLineSetup",
  method: "post",
  path: "/v1/sight-line-setups",
  tag: "Calculations",
  summary: "Set up a line of sight",
  description:
    "From the beam's spot at a near and a far bore, how far to shift and tilt the source so that the beam passes both where it should, what to move at each support of it, and whether to read again. Also how far the beam drifted while it was read, and how far air of uneven temperature bends it. Read, move and read again until `next` is go_on. It computes; a qualified engineer decides. The answer is kept as a record.",
  body: sightLineSetupRequest,
  faultsBesideSchema: sightLineSetupKind.faultsBesideSchema,
  requestExamples: () => exampleRequests("sight-line-setups"),
  response: {
    status: 201,
    description: "The set-up, as stored.",
    schema: sightLineSetupResponse,
    examples: () => exampleAnswers("sight-line-setups", sightLineSetupKind),
  },
  errors: [...computeErrors, "stations_coincident", "combination_invalid"],
  handle: (call) => runCalculation(sightLineSetupKind, call),
});

export const sightLineSetupOperations = [createSightLineSetup];
