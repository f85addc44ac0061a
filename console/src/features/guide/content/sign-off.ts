import type { ProblemCode } from "../../../../../shared/error-codes.ts";

/** Obstacle to a signature → what it means. What to do about each stands beside it on the job's own page too. */
export const obstacleMeanings: Readonly<Record<string, string>> = {
  no_survey: "No survey has been computed.",
  survey_not_computed: "Readings were added or withdrawn since a survey was computed.",
  as_left_missing: "Parts were moved, and the last computed survey is not one as left.",
  move_unfinished: "The last move of a part is not finished and locked.",
  station_not_remeasured: "A station was moved and not measured since.",
  station_not_measured: "A station has a tolerance and was never given a verdict.",
  reference_not_remeasured: "A reference station was not measured after the last move of any part.",
  axis_not_accepted: "A reference station was itself moved, and nobody has taken the new axis by name.",
  not_confirmed: "The last survey was not held against an earlier one, or either was computed again since.",
  reference_does_not_repeat: "A reference station has changed by more than both surveys' uncertainty.",
  reference_repeat_unknown: "The surveys cannot show whether the reference stations repeat.",
  station_does_not_conform:
    "A station exceeds its tolerance or is undecided, and carries no concession. Undecided is not conforming.",
};

/** What the call that signs refuses, whatever the job says. */
export const signatureRefusals = [
  "member_required",
  "password_wrong",
  "sign_off_blocked",
  "job_signed",
] as const satisfies readonly ProblemCode[];
