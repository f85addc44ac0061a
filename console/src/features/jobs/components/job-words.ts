import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import type { StoredReading } from "../../../../../shared/schemas/job-surveys.ts";
import type { Author } from "../../../../../shared/schemas/machines.ts";

export const stageChoices = [
  { value: "as_found", words: "as found" },
  { value: "after_step", words: "after a step" },
  { value: "as_left", words: "as left" },
] as const;

export const readingForms = {
  points: "points on the wall",
  turned_gauge: "turned gauge",
  rotating_target: "rotating target",
  wire: "stretched wire",
} as const satisfies Record<StoredReading["reading"]["form"], string>;

export const answerWords = { yes: "yes", no: "no", not_applicable: "not applicable" } as const;

export function authorName({ member, key }: Author): string {
  return member?.name ?? (key ? `key ${key.name}` : "not known");
}

/** "turned gauge, 8 readings" */
export function readingWords({ reading }: StoredReading): string {
  const form = readingForms[reading.form];
  switch (reading.form) {
    case "points":
      return `${form}, ${reading.points.length}`;
    case "turned_gauge":
      return `${form}, ${reading.readings.length} readings`;
    case "rotating_target":
      return `${form}, ${reading.spots.length} spots`;
    case "wire":
      return form;
  }
}

/** Ids as choices of a select. */
export function stationChoices({ machine }: Pick<JobRecord, "machine">) {
  return machine.stations.map(({ id, label }) => ({ value: id, words: label ? `${id}, ${label}` : id }));
}
