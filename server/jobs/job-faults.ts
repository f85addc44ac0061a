import type { Fault } from "../../shared/error-codes.ts";
import type { JobDetails, Reading, SurveyRequest } from "../../shared/schemas/job-entries.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { duplicates, unknownReference } from "../calculations/common-faults.ts";

const counts: Partial<
  Record<NonNullable<JobDetails["axis"]>["method"], readonly [min: number, max: number]>
> = {
  two_station: [2, 2],
  least_squares: [2, Infinity],
  minimum_zone: [3, Infinity],
  least_absolute: [3, Infinity],
  line_of_sight: [0, 0],
};

/** What is wrong with a job's details for its machine, under /details. */
export function jobDetailsFaults(details: JobDetails, machine: MachineDocument): Fault[] {
  const known = new Set(machine.stations.map(({ id }) => id));
  const { instruments = [], axis } = details;
  const through = axis ? (axis.through ?? []) : (machine.reference ?? []);
  const [min, max] = counts[axis?.method ?? "least_squares"] ?? [0, Infinity];
  return [
    ...duplicates(
      instruments.map(({ id }) => id),
      (index) => ["details", "instruments", index, "id"],
    ),
    ...(axis?.through ?? []).flatMap((id, index) =>
      known.has(id)
        ? []
        : [unknownReference(["details", "axis", "through", index], "station of the machine")],
    ),
    ...(through.length >= min && through.length <= max
      ? []
      : [
          {
            pointer: "/details/axis",
            code: "reference_count" as const,
            detail: axis
              ? `The method takes ${min === max ? min : `at least ${min}`} reference stations.`
              : "The machine names fewer than two reference stations: say how the axis is set.",
          },
        ]),
  ];
}

/** What a survey refers to and the job does not have. */
export function surveyFaults({ instrument }: SurveyRequest, { instruments = [] }: JobDetails): Fault[] {
  if (!instrument || instruments.some(({ id }) => id === instrument)) return [];
  return [unknownReference(["instrument"], "instrument of the job")];
}

/** What readings refer to and the machine or the job does not have. */
export function readingFaults(
  readings: readonly Reading[],
  machine: MachineDocument,
  { instruments = [] }: JobDetails,
): Fault[] {
  const stations = new Map(machine.stations.map((station) => [station.id, station]));
  return readings.flatMap((reading, index) => {
    const station = stations.get(reading.station);
    const isNamed = !reading.instrument || instruments.some(({ id }) => id === reading.instrument);
    const hasDiameter =
      reading.form !== "turned_gauge" || !station || reading.nominalDiameter || station.nominalDiameter;
    return [
      ...(station ? [] : [unknownReference(["readings", index, "station"], "station of the machine")]),
      ...(isNamed ? [] : [unknownReference(["readings", index, "instrument"], "instrument of the job")]),
      ...(hasDiameter
        ? []
        : [
            {
              pointer: pointerOf(["readings", index, "nominalDiameter"]),
              code: "required" as const,
              detail: "The machine has no nominal diameter for this station.",
            },
          ]),
    ];
  });
}
