import type { Request } from "express";
import { HttpProblem } from "./http-problem.ts";

/** The ETag of a row that changes: its version. */
export const versionTag = (version: number): string => `"${version}"`;

/**
 * The version that If-Match names. A weakened tag (`W/"3"`) is taken as well, since proxies that compress weaken it.
 * @throws HttpProblem precondition_required without the header, version_stale for one that is no version of ours
 */
export function matchedVersion(request: Request): number {
  const sent = request.get("If-Match");
  if (sent === undefined)
    throw new HttpProblem("precondition_required", "Send the ETag of the version you read as If-Match.");
  const [, version] = /^(?:W\/)?"(\d{1,9})"$/.exec(sent.trim()) ?? [];
  if (version === undefined) throw new HttpProblem("version_stale", "If-Match names no version of this.");
  return Number(version);
}
