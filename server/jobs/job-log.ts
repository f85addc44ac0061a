import type {
  AxisAcceptanceRequest,
  CheckRequest,
  ConcessionRequest,
  JobDetails,
  LoggedMove,
  Reading,
  SurveyRequest,
} from "../../shared/schemas/job-entries.ts";
import type { StoredReading, SurveyDrift } from "../../shared/schemas/job-surveys.ts";

/** The file that a reading was taken from. */
export interface SourceFile {
  /** Id of the stored file. */
  readonly id: string;
  readonly name: string;
  readonly sha256: string;
}

/** What each kind of entry holds. A job is nothing but its entries, in order. */
export interface EntryDocuments {
  readonly details: JobDetails;
  readonly check: CheckRequest;
  readonly survey: SurveyRequest;
  readonly reading: {
    readonly survey: string;
    readonly reading: Reading;
    readonly sourceFile: SourceFile | null;
  };
  readonly survey_result: {
    readonly survey: string;
    readonly boreFit: string;
    readonly axisDeviation: string;
    readonly engineVersion: string;
    /** Ids of the readings it was computed from. */
    readonly readings: readonly string[];
    readonly drift: SurveyDrift | null;
  };
  readonly plan: {
    readonly survey: string;
    /** Id of the entry with the survey's result that it was made from. */
    readonly surveyResult: string;
    readonly calculation: string;
  };
  readonly move: LoggedMove;
  readonly confirmation: {
    readonly before: string;
    readonly after: string;
    /** Ids of the entries with the surveys' results that were compared. */
    readonly beforeResult: string;
    readonly afterResult: string;
    readonly calculation: string;
  };
  readonly concession: ConcessionRequest;
  readonly axis_acceptance: AxisAcceptanceRequest & {
    /** Id of the entry with the survey's result whose axis was accepted. */
    readonly surveyResult: string;
  };
  readonly comment: { readonly text: string };
  readonly attachment: {
    /** Id of the stored file. */
    readonly file: string;
    readonly name: string;
    readonly mediaType: "image/jpeg" | "image/png" | "application/pdf";
    readonly bytes: number;
    readonly sha256: string;
    readonly caption: string | null;
  };
  readonly withdrawal: { readonly entry: string; readonly reason: string };
  readonly revision: { readonly reason: string };
  readonly signature: { readonly name: string; readonly meaning: string; readonly recordHash: string };
}

export type JobEntryKind = keyof EntryDocuments;

/** One entry: who added what, when. */
export interface JobEntry<Kind extends JobEntryKind = JobEntryKind> {
  readonly kind: Kind;
  readonly id: string;
  readonly createdAt: Date;
  readonly memberId: string | null;
  readonly keyId: string | null;
  /** The member's or key's name at that time. */
  readonly authorName: string;
  readonly document: EntryDocuments[Kind];
}

/** Kinds that can be taken back by a withdrawal: what people enter, not what was computed or signed from it. */
export const withdrawable: readonly JobEntryKind[] = [
  "reading",
  "move",
  "concession",
  "axis_acceptance",
  "attachment",
];

export interface SurveyState {
  readonly entry: JobEntry<"survey">;
  readonly readings: readonly JobEntry<"reading">[];
  /** Ids of the readings that count: of each station the latest taken, and the closing one. */
  readonly counting: ReadonlySet<string>;
  /** Ids of the readings that were taken back. */
  readonly withdrawn: ReadonlySet<string>;
  /** The newest of `results`. */
  readonly result: JobEntry<"survey_result"> | null;
  /** In the order in which they were computed. */
  readonly results: readonly JobEntry<"survey_result">[];
  /** Whether the result was computed from the readings that count now. */
  readonly isCurrent: boolean;
}

/** What the entries say, taken in order. Withdrawn entries are absent, but for readings, which then do not count. */
export interface JobState {
  readonly details: JobDetails;
  readonly checks: ReadonlyMap<CheckRequest["check"], JobEntry<"check">>;
  readonly surveys: readonly SurveyState[];
  readonly plans: readonly JobEntry<"plan">[];
  readonly moves: readonly JobEntry<"move">[];
  readonly confirmations: readonly JobEntry<"confirmation">[];
  readonly concessions: readonly JobEntry<"concession">[];
  readonly axisAcceptances: readonly JobEntry<"axis_acceptance">[];
  readonly comments: readonly JobEntry<"comment">[];
  readonly attachments: readonly JobEntry<"attachment">[];
  readonly signature: JobEntry<"signature"> | null;
}

/**
 * Reads a job from its log. Pure: the same entries give the same job.
 * @throws Error where a log does not begin with its details, which no call can bring about
 */
export function readJobLog(entries: readonly JobEntry[]): JobState {
  const withdrawn = new Set(ofKind(entries, "withdrawal").map(({ document }) => document.entry));
  const standing = <Kind extends JobEntryKind>(kind: Kind) =>
    ofKind(entries, kind).filter(({ id }) => !withdrawn.has(id));
  const details = ofKind(entries, "details").at(-1);
  if (!details) throw new Error("A job's log begins with its details.");
  const readings = ofKind(entries, "reading");
  const results = ofKind(entries, "survey_result");
  return {
    details: details.document,
    checks: new Map(standing("check").map((entry) => [entry.document.check, entry])),
    surveys: ofKind(entries, "survey").map((entry) =>
      surveyState(
        entry,
        readings.filter(({ document }) => document.survey === entry.id),
        withdrawn,
        results.filter(({ document }) => document.survey === entry.id),
      ),
    ),
    plans: standing("plan"),
    moves: standing("move"),
    confirmations: standing("confirmation"),
    concessions: standing("concession"),
    axisAcceptances: standing("axis_acceptance"),
    comments: standing("comment"),
    attachments: standing("attachment"),
    signature: standing("signature").at(-1) ?? null,
  };
}

function ofKind<Kind extends JobEntryKind>(entries: readonly JobEntry[], kind: Kind): JobEntry<Kind>[] {
  return entries.filter((entry): entry is JobEntry<Kind> => entry.kind === kind);
}

function surveyState(
  entry: JobEntry<"survey">,
  readings: readonly JobEntry<"reading">[],
  withdrawn: ReadonlySet<string>,
  results: readonly JobEntry<"survey_result">[],
): SurveyState {
  const latest = new Map<string, JobEntry<"reading">>();
  for (const reading of readings) {
    if (withdrawn.has(reading.id)) continue;
    const { station, closing, takenAt } = reading.document.reading;
    const place = JSON.stringify([station, closing === true]);
    const before = latest.get(place);
    if (!before || Date.parse(takenAt) >= Date.parse(before.document.reading.takenAt))
      latest.set(place, reading);
  }
  const counting = new Set([...latest.values()].map(({ id }) => id));
  const result = results.at(-1) ?? null;
  const computed = result?.document.readings ?? [];
  const isCurrent =
    result !== null && computed.length === counting.size && computed.every((id) => counting.has(id));
  const own = new Set(readings.filter(({ id }) => withdrawn.has(id)).map(({ id }) => id));
  return { entry, readings, counting, withdrawn: own, result, results, isCurrent };
}

/** Why a reading counts or does not. */
export function standingOf(
  { counting, withdrawn }: Pick<SurveyState, "counting" | "withdrawn">,
  reading: string,
): StoredReading["standing"] {
  if (counting.has(reading)) return "in_use";
  return withdrawn.has(reading) ? "withdrawn" : "superseded";
}

/** A result of any survey, the newest or an earlier one, by the id of its entry. */
export function resultOf(
  { surveys }: Pick<JobState, "surveys">,
  id: string,
): JobEntry<"survey_result"> | null {
  return surveys.flatMap(({ results }) => results).find((entry) => entry.id === id) ?? null;
}

/** Whether a survey's newest result is this one, of the readings that count now. */
export function isNewestResult(
  { surveys }: Pick<JobState, "surveys">,
  survey: string,
  result: string,
): boolean {
  const state = surveys.find(({ entry }) => entry.id === survey);
  return state?.result?.id === result && state.isCurrent;
}

/** Whether a confirmation compared what its surveys say now. */
export function isOfNewestResults(
  state: Pick<JobState, "surveys">,
  { document: { before, beforeResult, after, afterResult } }: JobEntry<"confirmation">,
): boolean {
  return isNewestResult(state, before, beforeResult) && isNewestResult(state, after, afterResult);
}

/** The readings that count, opening ones first, each in the order in which they were taken. */
export function countingReadings(survey: SurveyState): {
  readonly opening: readonly JobEntry<"reading">[];
  readonly closing: readonly JobEntry<"reading">[];
} {
  const counting = survey.readings
    .filter(({ id }) => survey.counting.has(id))
    .sort((one, other) => takenMs(one) - takenMs(other));
  return {
    opening: counting.filter(({ document }) => document.reading.closing !== true),
    closing: counting.filter(({ document }) => document.reading.closing === true),
  };
}

export const takenMs = ({ document }: JobEntry<"reading">): number => Date.parse(document.reading.takenAt);
