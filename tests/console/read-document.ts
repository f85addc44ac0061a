import { readFileSync } from "node:fs";
import { join } from "node:path";

interface Media {
  readonly content: {
    readonly "application/json": {
      readonly examples?: Readonly<Record<string, { readonly value: unknown }>>;
    };
  };
}
interface Operation {
  readonly post?: { readonly requestBody: Media; readonly responses: Readonly<Record<string, Media>> };
}

export interface DocumentedCall {
  readonly name: string;
  readonly request: unknown;
  readonly response: unknown;
}

/** The document as it is committed: a test of its own holds it against what is served. */
export const document = JSON.parse(
  readFileSync(join(import.meta.dirname, "../../openapi/openapi.json"), "utf8"),
) as { readonly paths: Readonly<Record<string, Operation>> };

/** The documented calls of a computing operation, each with the answer that the engine gives to it. */
export function documentedCalls(path: string): DocumentedCall[] {
  const post = document.paths[path]?.post;
  const requests = post?.requestBody.content["application/json"].examples ?? {};
  const answers = post?.responses["201"]?.content["application/json"].examples ?? {};
  return Object.entries(requests).map(([name, { value }]) => ({
    name,
    request: value,
    response: answers[name]?.value,
  }));
}
