import { cautions } from "../../shared/cautions.ts";
import type { JobRecord, JobSummary } from "../../shared/schemas/jobs.ts";
import type { JobSurvey, SurveyResult } from "../../shared/schemas/job-surveys.ts";
import { setUpChecks } from "../../shared/set-up-checks.ts";
import { axisStations } from "../jobs/job-requests.ts";
import {
  isNewestResult,
  isOfNewestResults,
  resultOf,
  standingOf,
  type JobEntry,
  type JobEntryKind,
  type JobState,
  type SurveyState,
} from "../jobs/job-log.ts";
import { moveEffectFlags, moveOrderFlags } from "../jobs/move-order.ts";
import { signOffObstacles } from "../jobs/sign-off.ts";
import { surveyFlags } from "../jobs/survey-flags.ts";
import type { Job } from "../models/job.ts";
import { presentAuthor } from "../services/author.ts";
import type { CallerNames } from "../services/caller-names.ts";
import type { StoredResults } from "../services/job-results.ts";
import type { LoadedJob } from "../services/job-store.ts";
import { isoTime, isoTimeOrNull } from "./time.ts";

export function presentJobSummary(row: Job & { machine?: { name: string } }): JobSummary {
  return {
    id: row.id,
    title: row.title,
    machineId: row.machineId,
    machineName: row.machine?.name ?? "",
    machineRevision: row.machineRevision,
    revision: row.revision,
    state: row.state,
    createdAt: isoTime(row.createdAt),
    signedAt: isoTimeOrNull(row.signedAt),
    version: row.version,
  };
}

/** What the record of a job is made from, all of it read before. */
export interface JobParts {
  readonly loaded: LoadedJob;
  readonly results: StoredResults;
  readonly names: CallerNames;
  readonly revisions: JobRecord["revisions"];
}

/** The whole record. Pure: the same log and the same calculations give the same bytes. */
export function presentJob({ loaded, results, names, revisions }: JobParts): JobRecord {
  const { row, machine, machineHash, state, revision } = loaded;
  const head = entryHead(names);
  const surveys = state.surveys.map((survey) => presentSurvey(state, survey, results, head));
  const moves = presentMoves(loaded, results, head);
  const obstacles = state.signature
    ? []
    : signOffObstacles(machine, state, {
        deviationsOf: ({ result }) => (result ? results.deviations(result.document.axisDeviation) : null),
        confirmationOf: results.confirmation,
      });
  const signedAt = state.signature ? isoTime(state.signature.createdAt) : null;
  return {
    ...presentJobSummary(row),
    title: state.details.title,
    machineName: machine.name,
    revision,
    state: state.signature ? "signed" : "open",
    signedAt,
    machine,
    machineHash,
    details: state.details,
    checks: setUpChecks.map(({ id, text }) => presentCheck(id, text, state, names)),
    surveys,
    plans: presentPlans(state, results, head),
    moves,
    confirmations: state.confirmations.flatMap((entry) => {
      const result = results.confirmation(entry.document.calculation);
      const current = isOfNewestResults(state, entry);
      return result ? [{ ...head(entry), ...entry.document, current, result }] : [];
    }),
    concessions: state.concessions.map((entry) => ({ ...head(entry), ...entry.document })),
    axisAcceptances: state.axisAcceptances.map((entry) => ({
      ...head(entry),
      ...entry.document,
      current: isNewestResult(state, entry.document.survey, entry.document.surveyResult),
    })),
    comments: state.comments.map((entry) => ({ ...head(entry), ...entry.document })),
    attachments: state.attachments.map((entry) => ({ ...head(entry), ...entry.document })),
    flags: [...surveys.flatMap(({ flags }) => flags), ...moves.flatMap(({ flags }) => flags)],
    signOff: { ready: obstacles.length === 0 && !state.signature, obstacles },
    signature: state.signature ? { ...head(state.signature), ...state.signature.document } : null,
    revisions,
    cautions: [...cautions, ...(machine.cautions ?? []).map((text) => ({ code: "maker", text }))],
  };
}

type Head = <Kind extends JobEntryKind>(
  entry: JobEntry<Kind>,
) => { id: string; createdAt: string; author: ReturnType<typeof presentAuthor> };

function entryHead(names: CallerNames): Head {
  return (entry) => ({
    id: entry.id,
    createdAt: isoTime(entry.createdAt),
    author: presentAuthor(entry, names),
  });
}

function presentCheck(
  check: (typeof setUpChecks)[number]["id"],
  text: string,
  { checks }: JobState,
  names: CallerNames,
): JobRecord["checks"][number] {
  const entry = checks.get(check);
  if (!entry) return { check, text, answer: null, by: null, at: null, remark: null };
  const { member, key } = presentAuthor(entry, names);
  const { answer, by, at, remark } = entry.document;
  return {
    check,
    text,
    answer,
    by: by ?? member?.name ?? key?.name ?? null,
    at: at ? new Date(at).toISOString() : isoTime(entry.createdAt),
    remark: remark ?? null,
  };
}

function presentSurvey(state: JobState, survey: SurveyState, results: StoredResults, head: Head): JobSurvey {
  return {
    ...head(survey.entry),
    survey: survey.entry.document,
    flags: surveyFlags(state, survey),
    readings: survey.readings.map((entry) => ({
      ...head(entry),
      reading: entry.document.reading,
      counts: survey.counting.has(entry.id),
      standing: standingOf(survey, entry.id),
      sourceFile: entry.document.sourceFile,
    })),
    result: presentResult(survey, results, head),
  };
}

function presentResult(survey: SurveyState, results: StoredResults, head: Head): SurveyResult | null {
  if (!survey.result) return null;
  const { boreFit, axisDeviation, engineVersion, drift } = survey.result.document;
  const deviations = results.deviations(axisDeviation);
  if (!deviations) return null;
  return {
    ...head(survey.result),
    boreFit,
    axisDeviation,
    engineVersion,
    current: survey.isCurrent,
    fits: [...results.fits(boreFit)],
    axis: deviations.axis,
    stations: deviations.stations,
    summary: deviations.summary,
    drift,
  };
}

/** Each beside the survey result that it was made from, whatever that survey's newest one says. */
function presentPlans(state: JobState, results: StoredResults, head: Head): JobRecord["plans"] {
  return state.plans.flatMap((entry) => {
    const { survey, surveyResult, calculation } = entry.document;
    const basis = resultOf(state, surveyResult);
    const deviations = basis && results.deviations(basis.document.axisDeviation);
    const result = results.moves(calculation);
    if (!deviations || !result) return [];
    return [
      {
        ...head(entry),
        ...entry.document,
        current: isNewestResult(state, survey, surveyResult),
        from: {
          reference: deviations.axis.through,
          stations: deviations.stations.map(({ id, z, deviation }) => ({ id, z, deviation })),
        },
        result,
      },
    ];
  });
}

function presentMoves({ machine, state }: LoadedJob, results: StoredResults, head: Head): JobRecord["moves"] {
  const reference = axisStations({ machine, details: state.details });
  return state.moves.map((entry, index) => {
    const plan = state.plans.filter(({ createdAt }) => createdAt <= entry.createdAt).at(-1);
    const earlier = state.moves.slice(0, index).map(({ document }) => document);
    return {
      ...head(entry),
      ...entry.document,
      flags: [
        ...moveOrderFlags(
          machine,
          plan ? results.moves(plan.document.calculation) : null,
          earlier,
          entry.document,
        ),
        ...moveEffectFlags(machine, reference, entry.document),
      ],
    };
  });
}
