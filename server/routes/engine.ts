import { selfTestSchema } from "../../shared/schemas/engine.ts";
import { defineOperation, reply } from "../http/operation.ts";

const readSelfTest = defineOperation({
  operationId: "readSelfTest",
  method: "get",
  path: "/v1/engine/self-test",
  tag: "Service",
  summary: "Run the engine's self-test",
  description:
    "Computes published worked examples anew with this very engine and holds every printed figure against what comes out, each with its source and its tolerance.",
  response: { status: 200, description: "Every figure, and how it came out.", schema: selfTestSchema },
  errors: [],
  handle: ({ deps }) => reply(200, deps.selfTest.run(), { "Cache-Control": "no-store" }),
});

export const engineOperations = [readSelfTest];
