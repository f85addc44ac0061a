import { useMutation, useQueryClient, type QueryKey } from "@tanstack/react-query";
import type { z } from "zod";
import { callAsMember, readAnswer } from "./call-api.ts";
import type { SentFile } from "./send-request.ts";
import { useAttemptKey } from "./use-attempt-key.ts";

export interface Change {
  readonly path: string;
  readonly method?: "POST" | "PATCH";
  readonly body?: unknown;
  /** The body as written, in place of `body`. */
  readonly bodyText?: string;
  readonly file?: SentFile & { readonly name: string };
  /** The version that the change was made from. */
  readonly version?: number;
}

/**
 * Sends a change under one Idempotency-Key for each attempt, then reads anew what it may have changed: also after a
 * refusal, since that often means that somebody else was there first.
 */
export function useChange<Schema extends z.ZodType>(schema: Schema, changed: readonly QueryKey[]) {
  const attempt = useAttemptKey();
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async ({ path, method = "POST", body, bodyText, file, version }: Change) => {
      const text = bodyText ?? (body === undefined ? undefined : JSON.stringify(body));
      const answer = await callAsMember({
        method,
        path,
        idempotencyKey: attempt.keyFor(`${path}\n${file ? markOf(file) : (text ?? "")}`),
        ...(file ? { file } : text === undefined ? {} : { bodyText: text }),
        ...(version === undefined ? {} : { ifMatch: `"${version}"` }),
      });
      return readAnswer(schema, answer);
    },
    onSettled: async (_, error) => {
      attempt.settle(error ?? undefined);
      await Promise.all(changed.map((queryKey) => queryClient.invalidateQueries({ queryKey })));
    },
  });
}

/** Tells one file from another without reading it. */
function markOf({ name, content }: SentFile & { readonly name: string }): string {
  return `${name} ${content.size} ${content instanceof File ? content.lastModified : ""}`;
}
