import { addReadingsRequest, checkRequest, surveyRequest } from "../../shared/schemas/job-entries.ts";
import { byOf } from "../http/call-parts.ts";
import { callerOf, defineOperation } from "../http/operation.ts";
import { surveyFaults } from "../jobs/job-faults.ts";
import { checkedReadings } from "../services/check-readings.ts";
import { computeSurvey } from "../services/job-computations.ts";
import { loadJob } from "../services/job-store.ts";
import { addComputedEntry, added, addOne, refuse } from "./add-to-job.ts";

const tag = "Jobs";

const answerCheck = defineOperation({
  operationId: "answerCheck",
  method: "post",
  path: "/v1/jobs/{id}/checks",
  tag,
  summary: "Answer a set-up check",
  description:
    "Yes, no or not applicable, by whom and when. A survey taken before all are answered is allowed, and marked as such wherever it is shown.",
  body: checkRequest,
  requestExamples: () => ({
    yes: {
      summary: "Answered yes",
      value: { check: "upper_halves_bolted", answer: "yes", by: "Sol Winter" },
    },
  }),
  response: added("The answer, in the log."),
  errors: ["job_signed"],
  handle: (call) => addOne(call, () => [{ kind: "check", document: call.body }]),
});

const addSurvey = defineOperation({
  operationId: "addSurvey",
  method: "post",
  path: "/v1/jobs/{id}/surveys",
  tag,
  summary: "Open a survey",
  description: "As found, after a step, or as left. Its id is that of the entry; readings go into it.",
  body: surveyRequest,
  requestExamples: () => ({
    asFound: {
      summary: "As found",
      value: {
        stage: "as_found",
        sameSetUp: false,
        instrument: "gauge-1",
        conditions: {
          temperatureUnit: "C",
          ambient: 19.5,
          metal: [{ place: "aft casing, lower half", value: 21.2 }],
        },
      },
    },
  }),
  response: added("The survey, in the log."),
  errors: ["job_signed", "unknown_reference"],
  handle: (call) =>
    addOne(call, ({ state }) => {
      refuse(surveyFaults(call.body, state.details));
      return [{ kind: "survey", document: call.body }];
    }),
});

const addReadings = defineOperation({
  operationId: "addReadings",
  method: "post",
  path: "/v1/jobs/{id}/surveys/{survey}/readings",
  tag,
  summary: "Add readings to a survey",
  description:
    "All or none. Each is fitted first as POST /v1/bore-fits would, so that a reading that cannot be used is refused while the crew still stands at the bore.",
  body: addReadingsRequest,
  requestExamples: () => ({
    bearing: {
      summary: "A bearing, four readings of a turned gauge",
      value: {
        readings: [
          {
            station: "brg-1",
            form: "turned_gauge",
            takenAt: "2026-11-04T07:40:00Z",
            person: "Ines Alder",
            upperHalf: "on",
            sense: "larger_is_farther",
            zero: "nominal",
            readings: [
              { clockDeg: 0, reading: 0.12 },
              { clockDeg: 90, reading: 0.05 },
              { clockDeg: 180, reading: -0.1 },
              { clockDeg: 270, reading: -0.03 },
            ],
          },
        ],
      },
    },
  }),
  response: added("The readings, in the log, in the order sent."),
  errors: ["job_signed", "unknown_reference", "too_few_points", "points_collinear"],
  handle: async (call) => {
    const { deps, params, body } = call;
    const loaded = await loadJob(deps, callerOf(call).organisation.id, params.id ?? "");
    const entries = await checkedReadings(deps, loaded, params.survey ?? "", body.readings, null);
    return addOne(call, () => entries);
  },
});

const computeSurveyOperation = defineOperation({
  operationId: "computeSurvey",
  method: "post",
  path: "/v1/jobs/{id}/surveys/{survey}/results",
  tag,
  summary: "Compute a survey",
  description:
    "Fits the readings that count and takes the deviations from the job's axis, each kept as a calculation of the job, in one transaction with the entry that names them. Again after further readings. The first station's closing less its opening reading is judged against the uncertainty of both (`drift`) and flagged, never shared out over the readings by time: common practice is to find the cause and to read again.",
  response: added("The result, in the log; GET /v1/jobs/{id} shows it."),
  errors: ["job_signed", "too_few_items", "unknown_reference", "reference_count", "stations_coincident"],
  handle: (call) =>
    addComputedEntry(call, (loaded) =>
      computeSurvey(call.deps, loaded, call.params.survey ?? "", byOf(call)),
    ),
});

export const jobSurveyOperations = [answerCheck, addSurvey, addReadings, computeSurveyOperation];
