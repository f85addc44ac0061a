import { Op, type WhereOptions } from "sequelize";
import {
  createJobRequest,
  jobPage,
  jobRecord,
  listJobsQuery,
  reviseJobRequest,
  signatureRequest,
  updateJobRequest,
} from "../../shared/schemas/jobs.ts";
import { jobLog } from "../../shared/schemas/job-log.ts";
import { revisionParam } from "../../shared/schemas/machines.ts";
import { versionTag } from "../http/entity-tag.ts";
import { byOf, readOf } from "../http/call-parts.ts";
import { callerOf, defineOperation, reply, type Call } from "../http/operation.ts";
import { presentJobSummary } from "../presenters/present-job.ts";
import { presentJobLog } from "../presenters/present-job-log.ts";
import { readCallerNames } from "../services/caller-names.ts";
import { changeOnce } from "../services/change-once.ts";
import { loadResults } from "../services/job-results.ts";
import { loadJob } from "../services/job-store.ts";
import { createJob, readJobRecord, recordOf, updateJob } from "../services/jobs.ts";
import { checkSigner, reviseJob, signJob } from "../services/sign-job.ts";
import { readPage } from "../services/read-page.ts";
import { matchesText } from "../services/text-search.ts";

const tag = "Jobs";
const exampleDetails = {
  title: "Unit 2, major outage",
  orderNumber: "WO-1180",
  site: "Fellgate",
  startsOn: "2026-11-02",
  endsOn: "2026-11-20",
  people: [{ name: "Ines Alder", role: "Alignment engineer" }],
  instruments: [
    {
      id: "gauge-1",
      description: "Turned bore gauge",
      calibratedOn: "2026-06-01",
      calibrationDueOn: "2027-06-01",
      readingUncertainty: 0.008,
    },
  ],
  seen: "downstream",
  level: 0.95,
  axis: { method: "least_squares", through: ["brg-1", "shr-3"] },
};

const listJobs = defineOperation({
  operationId: "listJobs",
  method: "get",
  path: "/v1/jobs",
  tag,
  summary: "List jobs",
  description: "Jobs of the organisation, newest first.",
  query: listJobsQuery,
  response: { status: 200, description: "One page.", schema: jobPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { cursor, limit, ...filters } = call.query;
    const { machineId, state, q } = filters;
    const conditions: WhereOptions[] = [
      ...(machineId ? [{ machineId }] : []),
      ...(state ? [{ state }] : []),
      ...(q === undefined ? [] : [matchesText("title", q)]),
    ];
    const page = await readPage(
      call.deps,
      call.deps.database.models.jobs,
      { list: "jobs", organisationId: callerOf(call).organisation.id, filters },
      { cursor, limit },
      { where: { [Op.and]: conditions }, include: "machine" },
    );
    return reply(200, {
      data: page.rows.map(presentJobSummary),
      nextCursor: page.nextCursor,
      limit: page.limit,
    });
  },
});

const createJobOperation = defineOperation({
  operationId: "createJob",
  method: "post",
  path: "/v1/jobs",
  tag,
  summary: "Start a job",
  description: "One outage on one revision of a machine: later revisions of the machine leave it alone.",
  body: createJobRequest,
  requestExamples: () => ({
    outage: {
      summary: "A major outage",
      value: { machineId: "0193a5e0-7c00-7000-8000-000000000002", details: exampleDetails },
    },
  }),
  response: { status: 201, description: "The job.", schema: jobRecord },
  errors: ["machine_archived", "duplicate_id", "unknown_reference", "reference_count", "not_found"],
  handle: (call) =>
    changeOnce(call.deps, call, 201, async (transaction) => {
      const { id } = await createJob(call.deps, transaction, call.body, byOf(call));
      const loaded = await loadJob(call.deps, callerOf(call).organisation.id, id, { transaction });
      const body = await recordOf(call.deps, loaded, transaction);
      return { body, headers: { ETag: versionTag(loaded.row.version), Location: `/v1/jobs/${id}` } };
    }),
});

const readJob = defineOperation({
  operationId: "readJob",
  method: "get",
  path: "/v1/jobs/{id}",
  tag,
  summary: "Read a job",
  description:
    "Its whole record: machine, conditions, surveys with their fits and deviations, plans, moves, confirmations, flags, and what still stands in the way of a signature.",
  response: { status: 200, description: "The record.", schema: jobRecord },
  errors: [],
  handle: async (call) => {
    const body = await readJobRecord(call.deps, callerOf(call).organisation.id, call.params.id ?? "");
    return reply(200, body, { ETag: versionTag(body.version) });
  },
});

const readJobRevision = defineOperation({
  operationId: "readJobRevision",
  method: "get",
  path: "/v1/jobs/{id}/revisions/{revision}",
  tag,
  summary: "Read a revision of a job",
  description: "The record as that revision has it. A signed revision never changes.",
  params: { revision: revisionParam },
  response: { status: 200, description: "The record.", schema: jobRecord },
  errors: [],
  handle: async (call) => {
    const organisationId = callerOf(call).organisation.id;
    return reply(
      200,
      await readJobRecord(call.deps, organisationId, call.params.id ?? "", Number(call.params.revision)),
    );
  },
});

const updateJobOperation = defineOperation({
  operationId: "updateJob",
  method: "patch",
  path: "/v1/jobs/{id}",
  tag,
  summary: "Change a job's details",
  description: "People, dates, instruments, how the axis is set. What they were stays in the log.",
  body: updateJobRequest,
  requestExamples: () => ({ details: { summary: "All of the details", value: { details: exampleDetails } } }),
  response: { status: 200, description: "The job.", schema: jobRecord },
  errors: ["job_signed", "duplicate_id", "unknown_reference", "reference_count"],
  conditional: true,
  handle: (call) => {
    const read = readOf(call);
    return changeOnce(call.deps, call, 200, async (transaction) => {
      await updateJob(call.deps, transaction, read, call.body.details, byOf(call));
      return changed(call, transaction);
    });
  },
});

const readJobLogOperation = defineOperation({
  operationId: "readJobLog",
  method: "get",
  path: "/v1/jobs/{id}/log",
  tag,
  summary: "Read a job's log",
  description:
    "Every entry in the order in which it was made, withdrawn ones too. `hashed` in its RFC 8785 form is what the signature's recordHash is over.",
  response: { status: 200, description: "The log.", schema: jobLog },
  errors: [],
  handle: async (call) => {
    const { deps } = call;
    const loaded = await loadJob(deps, callerOf(call).organisation.id, call.params.id ?? "");
    const [results, names] = await Promise.all([
      loadResults(deps, loaded),
      readCallerNames(deps.database, loaded.row.organisationId, loaded.rows),
    ]);
    return reply(200, presentJobLog(loaded, results, names));
  },
});

const signJobOperation = defineOperation({
  operationId: "signJob",
  method: "post",
  path: "/v1/jobs/{id}/signature",
  tag,
  summary: "Sign a job",
  description:
    "A member signs with the password again; a wrong one is kept in the audit as job.signature_refused. Refused while anything stands in the way (`obstacles`); afterwards the revision changes no more.",
  body: signatureRequest,
  requestExamples: () => ({
    sign: {
      summary: "Sign the record",
      value: { password: "the member's own password", meaning: "As-left condition reviewed and accepted." },
    },
  }),
  response: { status: 201, description: "The job, signed.", schema: jobRecord },
  errors: ["member_required", "password_wrong", "sign_off_blocked", "job_signed"],
  limit: "sign-in",
  handle: async (call) => {
    const { row } = await loadJob(call.deps, callerOf(call).organisation.id, call.params.id ?? "");
    await checkSigner(call.deps, row, byOf(call), call.body.password);
    return changeOnce(call.deps, call, 201, async (transaction) => {
      await signJob(call.deps, transaction, call.params.id ?? "", call.body, byOf(call));
      return changed(call, transaction);
    });
  },
});

const reviseJobOperation = defineOperation({
  operationId: "reviseJob",
  method: "post",
  path: "/v1/jobs/{id}/revisions",
  tag,
  summary: "Open a signed job again",
  description: "As its next revision, with a reason. The signed one stays readable.",
  body: reviseJobRequest,
  requestExamples: () => ({
    correction: { summary: "A correction", value: { reason: "brg-2 was read with the wrong gauge." } },
  }),
  response: { status: 201, description: "The job, open again.", schema: jobRecord },
  errors: ["job_not_signed"],
  handle: (call) =>
    changeOnce(call.deps, call, 201, async (transaction) => {
      await reviseJob(call.deps, transaction, call.params.id ?? "", call.body.reason, byOf(call));
      return changed(call, transaction);
    }),
});

/** The job as a change left it, read in the same transaction. */
async function changed(
  call: Pick<Call, "deps" | "caller" | "params">,
  transaction: NonNullable<Parameters<typeof recordOf>[2]>,
) {
  const loaded = await loadJob(call.deps, callerOf(call).organisation.id, call.params.id ?? "", {
    transaction,
  });
  const body = await recordOf(call.deps, loaded, transaction);
  return { body, headers: { ETag: versionTag(loaded.row.version) } };
}

export const jobOperations = [
  listJobs,
  createJobOperation,
  readJob,
  updateJobOperation,
  readJobLogOperation,
  readJobRevision,
  reviseJobOperation,
  signJobOperation,
];
