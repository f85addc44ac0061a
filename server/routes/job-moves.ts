import { jobConfirmationRequest, loggedMoveRequest, planRequest } from "../../shared/schemas/job-entries.ts";
import { byOf } from "../http/call-parts.ts";
import { defineOperation } from "../http/operation.ts";
import { confirmSurveys, planMoves } from "../services/job-computations.ts";
import { logMove } from "../services/jobs.ts";
import { addComputedEntry, added, change } from "./add-to-job.ts";

const tag = "Jobs";
const EXAMPLE_SURVEY = "0193a5e0-7c00-7000-8000-000000000003";

const planJobMoves = defineOperation({
  operationId: "planJobMoves",
  method: "post",
  path: "/v1/jobs/{id}/plans",
  tag,
  summary: "Plan moves from a survey",
  description: "As POST /v1/shim-moves, from the survey's deviations and the machine's supports and shims.",
  body: planRequest,
  requestExamples: () => ({
    plan: { summary: "From the as-found survey", value: { survey: EXAMPLE_SURVEY } },
  }),
  response: added("The plan, in the log; GET /v1/jobs/{id} shows it."),
  errors: ["job_signed", "survey_not_computed", "too_few_items", "too_many_choices"],
  handle: (call) => addComputedEntry(call, (loaded) => planMoves(call.deps, loaded, call.body, byOf(call))),
});

const logMoveOperation = defineOperation({
  operationId: "logMove",
  method: "post",
  path: "/v1/jobs/{id}/moves",
  tag,
  summary: "Log a move",
  description:
    "What was moved, when, by whom. Casing sections and shrouds come before bearings, each locked before the next: another order asks for a reason and is flagged.",
  body: loggedMoveRequest,
  requestExamples: () => ({
    casing: {
      summary: "A casing, moved and locked",
      value: {
        component: "compressor-casing",
        at: "2026-11-06T10:15:00Z",
        person: "Sol Winter",
        moved: [{ support: "feet-forward", h: -0.08, v: 0.15 }],
        finished: true,
      },
    },
  }),
  response: added("The move, in the log, with its flags."),
  errors: ["job_signed", "unknown_reference", "reason_required"],
  handle: (call) =>
    change(call, (transaction) =>
      logMove(call.deps, transaction, call.params.id ?? "", call.body, byOf(call)),
    ),
});

const confirmJob = defineOperation({
  operationId: "confirmJob",
  method: "post",
  path: "/v1/jobs/{id}/confirmations",
  tag,
  summary: "Confirm a survey against an earlier one",
  description:
    "As POST /v1/confirmations: whether the reference stations repeat, what the moves achieved, what moved unasked, what is still to be measured.",
  body: jobConfirmationRequest,
  requestExamples: () => ({
    asLeft: {
      summary: "As left against as found",
      value: { before: EXAMPLE_SURVEY, after: "0193a5e0-7c00-7000-8000-000000000004" },
    },
  }),
  response: added("The confirmation, in the log; GET /v1/jobs/{id} shows it."),
  errors: ["job_signed", "survey_not_computed", "combination_invalid"],
  handle: (call) =>
    addComputedEntry(call, (loaded) => confirmSurveys(call.deps, loaded, call.body, byOf(call))),
});

export const jobMoveOperations = [planJobMoves, logMoveOperation, confirmJob];
