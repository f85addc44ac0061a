import { z } from "zod";
import {
  axisAcceptanceRequest,
  commentRequest,
  concessionRequest,
  withdrawalRequest,
} from "../../shared/schemas/job-entries.ts";
import { unknownReference } from "../calculations/common-faults.ts";
import { byOf } from "../http/call-parts.ts";
import { defineOperation } from "../http/operation.ts";
import { computedSurvey } from "../services/find-survey.ts";
import { withdrawEntry } from "../services/jobs.ts";
import { added, addOne, change, refuse } from "./add-to-job.ts";

const tag = "Jobs";
const EXAMPLE_SURVEY = "0193a5e0-7c00-7000-8000-000000000003";

const grantConcession = defineOperation({
  operationId: "grantConcession",
  method: "post",
  path: "/v1/jobs/{id}/concessions",
  tag,
  summary: "Grant a concession",
  description: "A station that stays outside its tolerance, or undecided, by name and with a reason.",
  body: concessionRequest,
  requestExamples: () => ({
    nozzle: {
      summary: "A nozzle left low",
      value: {
        station: "noz-1",
        name: "Maren Oake",
        reason: "Clearances checked by lead; within the maker's band.",
      },
    },
  }),
  response: added("The concession, in the log."),
  errors: ["job_signed", "unknown_reference"],
  handle: (call) =>
    addOne(call, ({ machine }) => {
      if (!machine.stations.some(({ id }) => id === call.body.station)) {
        refuse([unknownReference(["station"], "station of the machine")]);
      }
      return [{ kind: "concession", document: call.body }];
    }),
});

const acceptAxis = defineOperation({
  operationId: "acceptAxis",
  method: "post",
  path: "/v1/jobs/{id}/axis-acceptances",
  tag,
  summary: "Accept a new axis by name",
  description:
    "Where a reference station was itself moved, or could not be shown to have stayed. It holds for the axis as the survey's newest result has it: a survey computed again is accepted again.",
  body: axisAcceptanceRequest,
  requestExamples: () => ({
    accept: {
      summary: "The axis of the as-left survey",
      value: {
        survey: EXAMPLE_SURVEY,
        name: "Ines Alder",
        reason: "The forward bearing was moved on purpose.",
      },
    },
  }),
  response: added("The acceptance, in the log."),
  errors: ["job_signed", "survey_not_computed"],
  handle: (call) =>
    addOne(call, ({ state }) => {
      const { result } = computedSurvey(state.surveys, call.body.survey);
      return [{ kind: "axis_acceptance", document: { ...call.body, surveyResult: result.id } }];
    }),
});

const addComment = defineOperation({
  operationId: "addComment",
  method: "post",
  path: "/v1/jobs/{id}/comments",
  tag,
  summary: "Comment on a job",
  description: "Kept in the log with its author.",
  body: commentRequest,
  requestExamples: () => ({ note: { summary: "A remark", value: { text: "Rain on the deck until noon." } } }),
  response: added("The comment, in the log."),
  errors: ["job_signed"],
  handle: (call) => addOne(call, () => [{ kind: "comment", document: call.body }]),
});

const withdrawEntryOperation = defineOperation({
  operationId: "withdrawEntry",
  method: "post",
  path: "/v1/jobs/{id}/entries/{entry}/withdrawal",
  tag,
  summary: "Withdraw an entry",
  description:
    "A reading, a move, a concession, an acceptance or an attachment entered by mistake. It stays in the log, and counts no more.",
  params: { entry: z.uuid() },
  body: withdrawalRequest,
  requestExamples: () => ({ slip: { summary: "A slip", value: { reason: "Read at the wrong station." } } }),
  response: added("The withdrawal, in the log."),
  errors: ["job_signed", "entry_not_withdrawable"],
  handle: (call) =>
    change(call, (transaction) =>
      withdrawEntry(
        call.deps,
        transaction,
        { id: call.params.id ?? "", entry: call.params.entry ?? "" },
        call.body.reason,
        byOf(call),
      ),
    ),
});

export const jobEntryOperations = [grantConcession, acceptAxis, addComment, withdrawEntryOperation];
