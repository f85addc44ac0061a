import { z } from "zod";
import { serverPaths } from "../../../config/paths.ts";
import { readAnswer } from "../../../lib/call-api.ts";
import { sendRequest } from "../../../lib/send-request.ts";

const examples = z.object({
  content: z
    .object({
      "application/json": z.object({ examples: z.record(z.string(), z.object({ value: z.unknown() })) }),
    })
    .partial(),
});
const operation = z.object({ requestBody: examples, responses: z.record(z.string(), z.unknown()) });
/** The parts of an OpenAPI document that hold the examples of its calls. */
const documentSchema = z.object({ paths: z.record(z.string(), z.record(z.string(), z.unknown())) });

export type ApiDocument = z.infer<typeof documentSchema>;

/** The document that the service serves of itself. Anyone may read it. */
export async function readDocument(signal: AbortSignal): Promise<ApiDocument> {
  return readAnswer(documentSchema, await sendRequest({ method: "GET", path: serverPaths.document, signal }));
}

/** The documented calls of a computing operation, each with the answer that the engine gave to it. */
export function documentedCalls(
  { paths }: ApiDocument,
  path: string,
): { readonly request: unknown; readonly response: unknown }[] {
  const post = operation.safeParse(paths[path]?.["post"]).data;
  const made = examples.safeParse(post?.responses["201"]).data;
  const answers = made?.content["application/json"]?.examples ?? {};
  const requests = post?.requestBody.content["application/json"]?.examples ?? {};
  return Object.entries(requests).map(([name, { value }]) => ({
    request: value,
    response: answers[name]?.value,
  }));
}
