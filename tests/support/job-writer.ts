import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import { axisDeviationKind } from "../../server/calculations/axis-deviation.ts";
import { boreFitKind } from "../../server/calculations/bore-fit.ts";
import type { CalculationKind } from "../../server/calculations/calculation-kind.ts";
import { confirmationKind } from "../../server/calculations/confirmation.ts";
import { shimMoveKind } from "../../server/calculations/shim-move.ts";
import { engineVersion } from "../../server/compute/version.ts";
import {
  readJobLog,
  type EntryDocuments,
  type JobEntry,
  type JobEntryKind,
  type JobState,
  type SurveyState,
} from "../../server/jobs/job-log.ts";
import {
  axisRequestOf,
  boreFitRequestOf,
  confirmationRequestOf,
  moveRequestOf,
} from "../../server/jobs/job-requests.ts";
import { surveyDriftOf } from "../../server/jobs/survey-drift.ts";
import type { Job } from "../../server/models/job.ts";
import { presentJob } from "../../server/presenters/present-job.ts";
import type { ReportContext } from "../../server/reports/report-format.ts";
import type { CallerNames } from "../../server/services/caller-names.ts";
import type { StoredResults } from "../../server/services/job-results.ts";
import type { LoadedJob } from "../../server/services/job-store.ts";
import { hashOf } from "../../server/services/sign-job.ts";
import type { JobDetails, Reading, SurveyRequest } from "../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";

export const writerName = "Ines Alder";
const memberId = "01936f00-0000-7000-8000-00000000000a";
const jobId = "01936f00-0000-7000-8000-000000000001";
const machineId = "01936f00-0000-7000-8000-000000000002";
const startMs = Date.parse("2026-11-04T06:00:00Z");

const names: CallerNames = {
  member: (id) => (id === null ? null : { id, name: writerName }),
  key: () => null,
};

/**
 * Writes a job's log entry by entry and computes what it asks for, as the service does but without a database: the same
 * entries give the same record, to the last id. Ids and times are counted, not drawn.
 */
export class JobWriter {
  private readonly entries: JobEntry[] = [];
  private readonly results = new Map<string, unknown>();
  private count = 0;

  constructor(
    readonly machine: MachineDocument,
    readonly details: JobDetails,
  ) {
    this.add("details", details);
  }

  add<Kind extends JobEntryKind>(kind: Kind, document: EntryDocuments[Kind]): string {
    const id = this.newId();
    const createdAt = new Date(startMs + this.entries.length * 60_000);
    this.entries.push({ kind, id, createdAt, memberId, keyId: null, authorName: writerName, document });
    return id;
  }

  /** A survey with its readings, computed where asked. */
  survey(survey: SurveyRequest, readings: readonly Reading[], computed = true): string {
    const id = this.add("survey", survey);
    for (const reading of readings) this.add("reading", { survey: id, reading, sourceFile: null });
    if (computed) this.compute(id);
    return id;
  }

  compute(surveyId: string): void {
    const survey = this.surveyState(surveyId);
    const fits = this.run(boreFitKind, boreFitRequestOf(this, survey, "fixture"));
    const { bores } = fits.answer.result;
    const deviations = this.run(axisDeviationKind, axisRequestOf(this, bores, "fixture"));
    this.add("survey_result", {
      survey: surveyId,
      boreFit: fits.id,
      axisDeviation: deviations.id,
      engineVersion,
      readings: [...survey.counting],
      drift: surveyDriftOf(this, survey, bores),
    });
  }

  plan(surveyId: string): ShimMoveResult {
    const { stations } = this.resultOf(surveyId);
    const plan = this.run(shimMoveKind, moveRequestOf(this, stations, undefined, null));
    this.add("plan", { survey: surveyId, surveyResult: this.resultIdOf(surveyId), calculation: plan.id });
    return plan.answer.result;
  }

  confirm(before: string, after: string): void {
    const { state } = this;
    const planned = state.plans.at(-1)?.document.calculation;
    const confirmed = this.run(
      confirmationKind,
      confirmationRequestOf(
        this,
        state,
        {
          before: this.surveyState(before),
          after: this.surveyState(after),
          fitsOf: ({ result }) => (result ? this.stored.fits(result.document.boreFit) : []),
        },
        planned === undefined ? null : this.stored.moves(planned),
        null,
      ),
    );
    this.add("confirmation", {
      before,
      beforeResult: this.resultIdOf(before),
      after,
      afterResult: this.resultIdOf(after),
      calculation: confirmed.id,
    });
  }

  /** Signs as the service would: only what nothing stands in the way of. */
  sign(meaning = "As left, reviewed."): void {
    const { obstacles } = this.record().signOff;
    if (obstacles.length > 0) throw new Error(JSON.stringify(obstacles));
    this.add("signature", { name: writerName, meaning, recordHash: this.context().recordHash });
  }

  resultOf(surveyId: string) {
    const id = this.surveyState(surveyId).result?.document.axisDeviation ?? "";
    const deviations = this.stored.deviations(id);
    if (!deviations) throw new Error("The survey is not computed.");
    return deviations;
  }

  private resultIdOf(surveyId: string): string {
    return this.surveyState(surveyId).result?.id ?? "";
  }

  record(): JobRecord {
    const { signature } = this.state;
    const record = presentJob({
      loaded: this.loaded,
      results: this.stored,
      names,
      revisions: [{ revision: 1, reason: null, signedAt: signature?.createdAt.toISOString() ?? null }],
    });
    // As it is answered and read back: without what JSON leaves out.
    return JSON.parse(JSON.stringify(record)) as JobRecord;
  }

  context(): ReportContext {
    return { engineVersion, recordHash: hashOf(this.loaded, this.stored) };
  }

  private get state(): JobState {
    return readJobLog(this.entries);
  }

  private surveyState(id: string): SurveyState {
    const survey = this.state.surveys.find(({ entry }) => entry.id === id);
    if (!survey) throw new Error("The job has no such survey.");
    return survey;
  }

  private get loaded(): LoadedJob {
    const { state, machine } = this;
    const machineHash = sha256(machine);
    const row = {
      id: jobId,
      machineId,
      machineRevision: 1,
      title: this.details.title,
      revision: 1,
      state: state.signature ? "signed" : "open",
      createdAt: new Date(startMs),
      signedAt: state.signature?.createdAt ?? null,
      version: this.entries.length,
    } as unknown as Job;
    return { row, revision: 1, machine, machineHash, rows: [], entries: this.entries, state };
  }

  private get stored(): StoredResults {
    const read = <Result>(id: string) => (this.results.get(id) ?? null) as Result | null;
    return {
      fits: (id) => read<{ bores: ReturnType<StoredResults["fits"]> }>(id)?.bores ?? [],
      deviations: read,
      moves: read,
      confirmation: read,
      hashes: [...this.results].map(([id, result]) => ({ id, resultHash: sha256(result) })),
    };
  }

  private run<Request, Answer extends { readonly result: unknown }>(
    kind: CalculationKind<Request, Answer>,
    request: unknown,
  ): { id: string; answer: Answer } {
    const sent: unknown = JSON.parse(JSON.stringify(request));
    const answer = JSON.parse(JSON.stringify(kind.answer(kind.request.parse(sent)))) as Answer;
    const id = this.newId();
    this.results.set(id, answer.result);
    return { id, answer };
  }

  private newId(): string {
    this.count += 1;
    return `01936f00-0000-7000-8000-${(0x1000 + this.count).toString(16).padStart(12, "0")}`;
  }
}

const sha256 = (value: unknown): string =>
  `sha256:${createHash("sha256")
    .update(canonicalize(value) ?? "")
    .digest("hex")}`;
