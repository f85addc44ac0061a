import type { IndicationAnswer } from "../../../../../shared/schemas/indications.ts";

/** What each thing of a job is, in the order in which a job meets it. */
export const jobTerms: readonly (readonly [term: string, meaning: string])[] = [
  [
    "machine",
    "A row of bores as it was built: stations with their targets and tolerances, parts on their supports, indicators, shims, the maker's cautions. It has revisions, and a job is made on one of them.",
  ],
  [
    "job",
    "One outage of one machine. It is a log: entries are added, none is edited. A slip is withdrawn by an entry that says why.",
  ],
  [
    "survey",
    "Readings of the bores at one stage: as found, after a step, as left. Computed, it gives every centre, the axis, the deviations and their verdicts.",
  ],
  [
    "reading",
    "What an instrument showed at one station, with when, by whom and with what. The latest of a station counts. The first station is read once more at the end: what it has drifted is told.",
  ],
  [
    "plan",
    "The moves, shims and steps that a computed survey asks for. It keeps the result that it was made from.",
  ],
  [
    "move",
    "What was moved, when, by whom, how far, and whether it is finished and locked. An unusual order asks for a reason.",
  ],
  [
    "indication",
    "What indicators and the line of sight read at one moment of a move, counted from its beginning. It is answered with what is left at every support, and whether to stop.",
  ],
  [
    "confirmation",
    "A later survey held against an earlier one: whether the reference stations repeat, what was achieved of what was planned, and what moved without being meant to.",
  ],
  ["concession", "Leave, by name and with a reason, for a station that does not conform."],
  [
    "axis acceptance",
    "A new axis taken by name and with a reason, where a reference station was moved or is not shown to repeat.",
  ],
  [
    "signature",
    "A member's name under the record, given with the password again. The hash over every entry closes it: it changes no more.",
  ],
  ["revision", "A signed job opened again, with a reason. The signed one stays readable as it was."],
];

export const workOrder: readonly string[] = [
  "Take the machine's newest revision, or describe it anew. Start the job with its people, its instruments and the reference stations of its axis.",
  "Answer the set-up checks before the first reading: upper halves bolted, props out, temperatures steady, instruments in calibration.",
  "Survey as found: read every bore, the first once more at the end, and compute.",
  "Plan the moves: casings and shrouds to the axis first, bearings after them.",
  "Move one part at a time, in small parts. Read its indicators and its neighbours after each, stop when a limit is passed, lock it, and log the move.",
  "Survey as left: the reference stations first, then every station that was moved.",
  "Confirm the survey as left against the one as found.",
  "Settle what is open: measure again, move again, or grant a concession by name.",
  "Sign, and hand over the report: no job is finished without it.",
];

interface Said {
  readonly means: string;
  readonly then: string;
}

/** Why an indication says stop. */
export const stopReasons: Readonly<Record<IndicationAnswer["stop"][number]["code"], Said>> = {
  neighbour_passed: {
    means: "A neighbour has changed by more than the plan lets it.",
    then: "Stop, and find what drags or binds before going on.",
  },
  gone_past: {
    means: "A support is past where it shall be, by more than the machine's largest misfit.",
    then: "Bring it back, or plan again from a new survey.",
  },
  readings_disagree: {
    means: "No rigid move fits the readings within the machine's largest misfit.",
    then: "Check indicators, bolts and the line of sight, and read again.",
  },
  move_complete: {
    means: "Every support is where it shall be, within the machine's largest misfit.",
    then: "Lock it, log the move, and go to the next step.",
  },
};
