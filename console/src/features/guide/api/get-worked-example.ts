import { queryOptions, useQuery } from "@tanstack/react-query";
import {
  alignmentRequest,
  alignmentResponse,
  type AlignmentRequest,
  type AlignmentResult,
} from "../../../../../shared/schemas/alignments.ts";
import { computations } from "../../../config/paths.ts";
import { documentedCalls, readDocument, type ApiDocument } from "./read-document.ts";

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
  queryFn: async ({ signal }) => exampleOf(await readDocument(signal)),
});

export function useWorkedExample() {
  return useQuery(workedExampleQuery);
}

export function exampleOf(document: ApiDocument): AlignmentExample | null {
  for (const { request: sent, response: answered } of documentedCalls(
    document,
    computations.alignment.path,
  )) {
    const request = alignmentRequest.safeParse(sent);
    const response = alignmentResponse.safeParse(answered);
    if (request.success && response.success && response.data.result.moves !== null)
      return { request: request.data, result: response.data.result };
  }
  return null;
}
