import { createHash } from "node:crypto";
import { readdirSync, readFileSync } from "node:fs";
import canonicalize from "canonicalize";
import type { CalculationKind } from "../../server/calculations/calculation-kind.ts";
import { calculationKinds } from "../../server/calculations/index.ts";

const requests = new URL("../../examples/requests/", import.meta.url);

/** The file that holds what a version of the engine answers. */
export const goldenFile = (version: string): URL => new URL(`${version}.json`, import.meta.url);

/** By example request, the hash of what the engine answers to it now. */
export function currentResults(): Record<string, string> {
  const kinds = Object.values(calculationKinds) as CalculationKind<unknown, object>[];
  return Object.fromEntries(
    kinds.flatMap((kind) => {
      const folder = new URL(`${resourceOf(kind.kind)}/`, requests);
      return readdirSync(folder)
        .sort()
        .map((file) => {
          const body: unknown = JSON.parse(readFileSync(new URL(file, folder), "utf8"));
          const answer = JSON.parse(JSON.stringify(kind.answer(kind.request.parse(body)))) as object;
          const hash = createHash("sha256")
            .update(canonicalize(answer) ?? "")
            .digest("hex");
          return [`${resourceOf(kind.kind)}/${file}`, `sha256:${hash}`] as const;
        });
    }),
  );
}

/** A kind's requests stand in the folder of its resource: its name in the plural. */
function resourceOf(kind: string): string {
  if (kind.endsWith("s")) return kind;
  return kind.endsWith("y") ? `${kind.slice(0, -1)}ies` : `${kind}s`;
}
