/**
 * What has to be so before a survey can be trusted (common practice, no source). Answered yes, no or not applicable on
 * each job; a survey taken before all are answered is marked as such wherever it is shown.
 */
export const setUpChecks = [
  {
    id: "upper_halves_bolted",
    text: "Upper halves on and bolted to the maker's torque: the closed casing is the structure.",
  },
  { id: "jacks_and_props_out", text: "Temporary jacks and props are out." },
  { id: "sight_on_bore_line", text: "The line of sight runs roughly on the bore line." },
  {
    id: "source_guarded",
    text: "The source stands outside the stations measured, on firm ground, guarded from knocks.",
  },
  {
    id: "drift_within_limits",
    text: "Drift over time is within limits; the first station will be read again at the end.",
  },
  { id: "sight_path_clear", text: "No heat, sun or draught across the sight path." },
  { id: "instrument_calibrated", text: "The instrument's calibration is in date and its scale is checked." },
  { id: "detector_squared", text: "The detector's mark is squared to its bracket." },
  { id: "metal_temperatures_noted", text: "Metal temperatures are steady and noted." },
  { id: "isolated_and_proved_dead", text: "The machine is isolated, locked out and proved dead." },
] as const;

export type SetUpCheckId = (typeof setUpChecks)[number]["id"];
export const setUpCheckIds = setUpChecks.map(({ id }) => id) as [SetUpCheckId, ...SetUpCheckId[]];
