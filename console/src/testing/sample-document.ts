import type { CalculationRecord } from "../../../shared/schemas/calculations.ts";
import type { Answer } from "./fake-service.ts";

/** An OpenAPI document that has one example of the whole chain, with its answer. */
export function documentWith({ request, response }: Pick<CalculationRecord, "request" | "response">): Answer {
  const media = (value: unknown) => ({
    content: { "application/json": { examples: { sample: { value } } } },
  });
  const post = { requestBody: media(request), responses: { "201": media(response) } };
  return { status: 200, body: { openapi: "3.1.0", paths: { "/v1/alignments": { post } } } };
}
