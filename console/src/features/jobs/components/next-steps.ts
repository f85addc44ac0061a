/** Obstacle to a signature → what to do about it, and in which section of the job's page. */
export const nextSteps: Readonly<Record<string, { readonly words: string; readonly section: string }>> = {
  no_survey: { words: "Open a survey, add its readings and compute it.", section: "surveys" },
  survey_not_computed: { words: "Compute the survey again, with all its readings.", section: "surveys" },
  as_left_missing: { words: "Open a survey as left, measure, and compute it.", section: "surveys" },
  move_unfinished: {
    words: "Log the move that brings the part home, finished and locked.",
    section: "moves",
  },
  station_not_remeasured: { words: "Measure the station again in a survey as left.", section: "surveys" },
  station_not_measured: { words: "Measure the station and compute the survey.", section: "surveys" },
  reference_not_remeasured: {
    words: "Measure the reference station again after the last move.",
    section: "surveys",
  },
  axis_not_accepted: { words: "Accept the new axis by name, with the reason.", section: "axis" },
  not_confirmed: { words: "Confirm the last survey against the one as found.", section: "confirmation" },
  reference_does_not_repeat: {
    words: "Find out why; measure again, or accept the new axis by name.",
    section: "axis",
  },
  reference_repeat_unknown: { words: "Measure again, or accept the axis by name.", section: "axis" },
  station_does_not_conform: {
    words: "Correct the station and measure it again, or grant a concession.",
    section: "concessions",
  },
};
