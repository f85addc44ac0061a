import { queryOptions, useQuery } from "@tanstack/react-query";
import { z } from "zod";
import { calculationKinds } from "../../../../../shared/schemas/calculations.ts";
import { computations, serverPaths, type CalculationKind } from "../../../config/paths.ts";
import { readAnswer } from "../../../lib/call-api.ts";
import { writeJson } from "../../../lib/write-json.ts";
import { sendRequest } from "../../../lib/send-request.ts";

/** The parts of an OpenAPI document that a call is tried from. */
const documentSchema = z.object({
  paths: z.record(
    z.string(),
    z.object({
      post: z
        .object({
          summary: z.string().optional(),
          requestBody: z
            .object({
              content: z.record(
                z.string(),
                z.object({
                  examples: z
                    .record(z.string(), z.object({ summary: z.string().optional(), value: z.unknown() }))
                    .optional(),
                }),
              ),
            })
            .optional(),
        })
        .optional(),
    }),
  ),
});

export interface Example {
  readonly name: string;
  readonly summary: string;
  readonly text: string;
}

export interface Endpoint {
  readonly summary: string;
  readonly examples: readonly Example[];
}

/** The service's own document is where the examples come from, so that none here can be out of date. */
export const documentQuery = queryOptions({
  queryKey: ["document"],
  staleTime: Infinity,
  queryFn: async ({ signal }) => {
    const answer = await sendRequest({ method: "GET", path: serverPaths.document, signal });
    return readAnswer(documentSchema, answer);
  },
});

export function useExamples() {
  return useQuery({ ...documentQuery, select: endpointsOf });
}

type Document = z.infer<typeof documentSchema>;

/** The examples of what is posted to `path`. */
export function examplesAt(document: Document, path: string): Example[] {
  const post = document.paths[path]?.post;
  const examples = Object.entries(post?.requestBody?.content["application/json"]?.examples ?? {});
  return examples.map(([name, example]) => ({
    name,
    summary: example.summary ?? name,
    text: writeJson(example.value),
  }));
}

function endpointsOf(document: Document): ReadonlyMap<CalculationKind, Endpoint> {
  return new Map(
    calculationKinds.map((kind) => {
      const { path } = computations[kind];
      const summary = document.paths[path]?.post?.summary ?? "";
      return [kind, { summary, examples: examplesAt(document, path) }];
    }),
  );
}
