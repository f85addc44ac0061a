import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import {
  alignmentRequest,
  alignmentResponse,
  type AlignmentRequest,
  type AlignmentResult,
} from "../../../../../shared/schemas/alignments.ts";
import { computations, serverPaths } from "../../../config/paths.ts";
import { readAnswer } from "../../../lib/call-api.ts";
import { sendRequest } from "../../../lib/send-request.ts";

const examplesSchema = z.object({
  content: z.object({
    "application/json": z.object({ examples: z.record(z.string(), z.object({ value: z.unknown() })) }),
  }),
});
/** The parts of an OpenAPI document that hold the whole chain's examples. */
const documentSchema = z.object({
  paths: z.object({
    [computations.alignment.path]: z.object({
      post: z.object({ requestBody: examplesSchema, responses: z.object({ "201": examplesSchema }) }),
    }),
  }),
});

export interface AlignmentExample {
  readonly request: AlignmentRequest;
  readonly result: AlignmentResult;
}

/**
 * The first documented call that goes from readings to moves, with the answer that the service documents for it: computed
 * by its own engine, not written for a page. Null when the document has none.
 */
export const workedExampleQuery = queryOptions({
  queryKey: ["worked-example"],
  staleTime: Infinity,
  queryFn: async ({ signal }): Promise<AlignmentExample | null> => {
    const answer = await sendRequest({ method: "GET", path: serverPaths.document, signal });
    return exampleOf(readAnswer(documentSchema, answer));
  },
});

export function useWorkedExample() {
  return useQuery(workedExampleQuery);
}

export function exampleOf({ paths }: z.infer<typeof documentSchema>): AlignmentExample | null {
  const post = paths[computations.alignment.path]?.post;
  const requests = post?.requestBody.content["application/json"].examples ?? {};
  const answers = post?.responses["201"].content["application/json"].examples ?? {};
  for (const [name, { value }] of Object.entries(requests)) {
    const request = alignmentRequest.safeParse(value);
    const response = alignmentResponse.safeParse(answers[name]?.value);
    if (request.success && response.success && response.data.result.moves !== null)
      return { request: request.data, result: response.data.result };
  }
  return null;
}
