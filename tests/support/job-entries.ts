import type { LoggedMove } from "../../shared/schemas/job-entries.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { EntryDocuments, JobEntry, JobEntryKind } from "../../server/jobs/job-log.ts";

/*
 * The rules of a job are facts of the trade: common practice, no source (set-up before survey, casings before bearings,
 * reference stations re-measured and repeating, every station conforming or conceded by name).
 */
const tolerance = { radial: 0.1 };
export const machine: MachineDocument = {
  name: "A row of four bores",
  downstream: "Toward the generator.",
  units: { axial: "mm", bore: "mm", offset: "mm" },
  stations: [
    { id: "brg-1", kind: "bearing", z: 0, tolerance },
    { id: "cas-1", kind: "casing", z: 1000, tolerance },
    { id: "brg-2", kind: "bearing", z: 2000, tolerance },
    { id: "shr-1", kind: "shroud", z: 3000, tolerance },
  ],
  reference: ["brg-1", "shr-1"],
  components: [
    { id: "casing", kind: "casing", stations: ["cas-1"], supports: [] },
    { id: "bearing-2", kind: "bearing", stations: ["brg-2"], carriedBy: "casing", supports: [] },
    { id: "bearing-1", kind: "bearing", stations: ["brg-1"], supports: [] },
  ],
};

let serial = 0;
export function entry<Kind extends JobEntryKind>(
  kind: Kind,
  document: EntryDocuments[Kind],
  id?: string,
): JobEntry<Kind> {
  serial += 1;
  return {
    kind,
    id: id ?? `entry-${serial}`,
    createdAt: new Date(Date.UTC(2026, 10, 1, 0, serial)),
    memberId: null,
    keyId: null,
    authorName: "Ines Alder",
    document,
  };
}
export const details = entry("details", { title: "Outage", seen: "downstream" });
export const survey = (id: string, stage: "as_found" | "as_left") =>
  entry("survey", { stage, sameSetUp: false }, id);
export const reading = (surveyId: string, station: string, takenAt: string, more: object = {}, id?: string) =>
  entry(
    "reading",
    {
      survey: surveyId,
      reading: { station, takenAt, form: "points", points: [], ...more },
      sourceFile: null,
    },
    id,
  );
export const result = (surveyId: string, readings: string[]) =>
  entry(
    "survey_result",
    {
      survey: surveyId,
      boreFit: `fit-${surveyId}`,
      axisDeviation: `axis-${surveyId}`,
      engineVersion: "1.0.0",
      readings,
      drift: null,
    },
    `result-${surveyId}`,
  );
export const move = (component: string, at: string, more: Partial<LoggedMove> = {}) =>
  entry("move", { component, at, finished: true, ...more });
export const stations = ["brg-1", "cas-1", "brg-2", "shr-1"];
export const surveyed = (id: string, stage: "as_found" | "as_left", day: string) => {
  const readings = stations.map((station, index) =>
    reading(id, station, `${day}T08:0${index}:00Z`, {}, `${id}-${station}`),
  );
  return [
    survey(id, stage),
    ...readings,
    result(
      id,
      readings.map((one) => one.id),
    ),
  ];
};

export const found = () => surveyed("found", "as_found", "2026-11-04");
export const left = () => surveyed("left", "as_left", "2026-11-10");
export const confirmed = () =>
  entry("confirmation", {
    before: "found",
    beforeResult: "result-found",
    after: "left",
    afterResult: "result-left",
    calculation: "c",
  });
