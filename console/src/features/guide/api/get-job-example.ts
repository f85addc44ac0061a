import { queryOptions, useQuery } from "@tanstack/react-query";
import {
  confirmationRequest,
  confirmationResponse,
  type ConfirmationRequest,
} from "../../../../../shared/schemas/confirmations.ts";
import type { ConfirmationResult } from "../../../../../shared/schemas/confirmation-answers.ts";
import { computations } from "../../../config/paths.ts";
import { documentedCalls, readDocument, type ApiDocument } from "./read-document.ts";

export interface ConfirmationExample {
  readonly request: ConfirmationRequest;
  readonly result: ConfirmationResult;
}

/**
 * The first documented confirmation of a survey with moves, its set-up untouched, with the answer that the service
 * documents for it: computed by its own engine, not written for a page. Null when the document has none.
 */
export const jobExampleQuery = queryOptions({
  queryKey: ["job-example"],
  staleTime: Infinity,
  queryFn: async ({ signal }) => jobExampleOf(await readDocument(signal)),
});

export function useJobExample() {
  return useQuery(jobExampleQuery);
}

export function jobExampleOf(document: ApiDocument): ConfirmationExample | null {
  for (const { request: sent, response: answered } of documentedCalls(
    document,
    computations.confirmation.path,
  )) {
    const request = confirmationRequest.safeParse(sent);
    const response = confirmationResponse.safeParse(answered);
    if (!request.success || !response.success) continue;
    const { result } = response.data;
    if (result.frame === "fixed" && result.moved.some(({ planned, achieved }) => planned && achieved))
      return { request: request.data, result };
  }
  return null;
}
