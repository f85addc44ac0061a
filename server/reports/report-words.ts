import type { JobRecord } from "../../shared/schemas/jobs.ts";
import type { Author } from "../../shared/schemas/machines.ts";
import { draftMark } from "./report-format.ts";

/** Who signed and when, or that nobody did. */
export function signatureWords({ signature }: JobRecord): string {
  return signature ? `Signed by ${signature.name} on ${signature.createdAt.slice(0, 10)}` : draftMark;
}

export function authorName({ member, key }: Author): string {
  return member?.name ?? key?.name ?? "";
}

/** The title block's owner: the job's, or the machine's. */
export function ownerOf({ details, machine }: JobRecord): string | null {
  return details.owner ?? machine.owner ?? null;
}

/** What the job's title block names as maker: who signed, or the first person on the job. */
export function creatorOf({ signature, details }: JobRecord): string | null {
  return signature?.name ?? details.people?.[0]?.name ?? null;
}

/** The rule by which verdicts were given, in words. */
export function verdictWords({ details }: JobRecord): string {
  const level = details.level ?? 0.95;
  return details.verdict?.rule === "simple"
    ? "Simple rule: the deviation alone against the tolerance."
    : `Guarded rule (JCGM 106): conforms when |d| + U is within the tolerance, exceeds when |d| - U is beyond it, else undecided. U at level ${level}.`;
}
