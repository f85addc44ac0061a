import type { JobRecord } from "../../shared/schemas/jobs.ts";
import type { StoredReading } from "../../shared/schemas/job-surveys.ts";
import type { Author } from "../../shared/schemas/machines.ts";
import { draftMark } from "./report-format.ts";

/** Who signed and when, or that nobody did. */
export function signatureWords({ signature }: JobRecord): string {
  return signature ? `Signed by ${signature.name} on ${signature.createdAt.slice(0, 10)}` : draftMark;
}

export function authorName({ member, key }: Author): string {
  return member?.name ?? key?.name ?? "";
}

/** Whether a reading counts, and why not. */
export const countsWords = {
  in_use: "yes",
  superseded: "no, read again",
  withdrawn: "no, withdrawn",
} as const satisfies Record<StoredReading["standing"], string>;

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

/** What must be known of something made from a survey that has changed since. */
export const outdatedWords = {
  plan: "The survey was computed again, or read again, since: plan again.",
  confirmation: "A survey was computed again, or read again, since: confirm again.",
} as const;

/** Which way is positive, on every sheet of numbers. */
export const signWords = "h is positive to the right and v up, seen looking downstream.";

/** Concessions in one line; null where there is none. */
export function concessionWords({ concessions }: JobRecord): string | null {
  if (concessions.length === 0) return null;
  return `Concessions: ${concessions.map(({ station, name }) => `${station} by ${name}`).join("; ")}.`;
}

/** The axis that the job asks for: its method, and what it is laid through. */
export function axisWords({ details, machine }: JobRecord): string {
  const { axis } = details;
  const method = (axis?.method ?? "least_squares").replaceAll("_", " ");
  const through = axis ? (axis.through ?? []) : (machine.reference ?? []);
  return through.length === 0 ? method : `${method}, through ${through.join(", ")}`;
}
