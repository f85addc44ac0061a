import type { Fault } from "../../shared/error-codes.ts";
import {
  poolingSchema,
  repeatReading,
  studyCell,
  type CrossedStudyRequest,
  type OneStationStudyRequest,
  type RepeatabilityStudyRequest,
} from "../../shared/schemas/repeatability-studies.ts";
import { toleranceSchema, unitsSchema } from "../../shared/schemas/common.ts";
import { convertersFor } from "../../shared/units.ts";
import { findToleranceFaults } from "../compute/conformity/find-tolerance-faults.ts";
import { faultOf } from "./collect-faults.ts";
import { combinationInvalid, membersOf, soundOf } from "./common-faults.ts";
import { readTolerance } from "./read-tolerance.ts";

type Reading = OneStationStudyRequest["readings"][number];
type Cell = CrossedStudyRequest["cells"][number];
type Common = Partial<Pick<RepeatabilityStudyRequest, "units" | "tolerance">>;

/** Every fault of the domain in a request that passed its schema. */
export function repeatabilityStudyFaults(request: RepeatabilityStudyRequest): Fault[] {
  return [
    ...toleranceFaults(request),
    ...(request.form === "one_station"
      ? timeFaults(request.readings)
      : [...cellFaults(request.cells), ...poolingFaults(request.pooling)]),
  ];
}

/** The faults of the domain in the sound parts of a body that failed its schema elsewhere. */
export function repeatabilityStudyFaultsBesideSchema(body: unknown): Fault[] {
  const sent = membersOf(body);
  const units = unitsSchema.safeParse(sent["units"]).data;
  const tolerance = toleranceSchema.safeParse(sent["tolerance"]).data;
  const cells = soundOf(studyCell, sent["cells"]);
  return [
    ...toleranceFaults({ ...(units ? { units } : {}), ...(tolerance ? { tolerance } : {}) }),
    ...(sent["form"] === "one_station" ? timeFaults(soundOf(repeatReading, sent["readings"])) : []),
    ...(sent["form"] === "crossed"
      ? [...cellFaults(cells), ...poolingFaults(poolingSchema.safeParse(sent["pooling"]).data)]
      : []),
  ];
}

function toleranceFaults({ units, tolerance }: Common): Fault[] {
  if (!tolerance) return [];
  // No fault of the domain depends on the unit: any will do where none was stated.
  const { offset } = convertersFor(units ?? { axial: "mm", bore: "mm", offset: "mm" });
  return findToleranceFaults(readTolerance(tolerance, offset)).map((error) => faultOf(error, []));
}

/** Times are of every reading or of none, and rise with the order read. */
function timeFaults(readings: readonly (Reading | null)[]): Fault[] {
  const some = readings.some((reading) => reading?.at !== undefined);
  let latest = -Infinity;
  return readings.flatMap((reading, index) => {
    if (!some || !reading) return [];
    const at = ["readings", index, "at"];
    if (reading.at === undefined) {
      return [combinationInvalid(at, "Other readings state when they were read, this one does not.")];
    }
    const time = Date.parse(reading.at);
    const earlier = time < latest;
    latest = Math.max(latest, time);
    return earlier
      ? [
          combinationInvalid(
            at,
            "It was read before the one that stands before it: send them in the order read.",
          ),
        ]
      : [];
  });
}

/** Every person at every station, once, with the same number of readings. A broken cell (null) hides what depends on it. */
function cellFaults(cells: readonly (Cell | null)[]): Fault[] {
  const placeOf = new Map<string, number>();
  const repeats = cells.find((cell) => cell !== null)?.readings.length;
  const faults = cells.flatMap((cell, index) => {
    if (!cell) return [];
    const key = JSON.stringify([cell.station, cell.person]);
    const first = placeOf.get(key);
    if (first !== undefined) {
      const detail = `The same person at the same station stands at /cells/${first}: send all of its readings there.`;
      return [combinationInvalid(["cells", index], detail)];
    }
    placeOf.set(key, index);
    if (cell.readings.length === repeats) return [];
    const detail = `Every cell has the same number of readings; this one has ${cell.readings.length}, the first ${repeats}.`;
    return [combinationInvalid(["cells", index, "readings"], detail)];
  });
  if (cells.some((cell) => cell === null)) return faults;
  const [stations, people] = [namesOf(cells, "station"), namesOf(cells, "person")];
  const missing = stations.flatMap((station) =>
    people
      .filter((person) => !placeOf.has(JSON.stringify([station, person])))
      .map((person) => [station, person]),
  );
  return [
    ...faults,
    ...(stations.length < 2 || people.length < 2
      ? [combinationInvalid(["cells"], "A crossed study has two stations and two people at least.")]
      : []),
    ...missing.map(([station, person]) =>
      combinationInvalid(["cells"], `${person} did not read ${station}: every person reads every station.`),
    ),
  ];
}

/** The names in the order in which they first stand. */
export function namesOf(cells: readonly (Cell | null)[], member: "station" | "person"): string[] {
  return [...new Set(cells.flatMap((cell) => (cell ? [cell[member]] : [])))];
}

function poolingFaults(pooling: CrossedStudyRequest["pooling"]): Fault[] {
  if (pooling?.rule !== "never" || pooling.probability === undefined) return [];
  const detail = "A probability goes with the rule above; never pools at none.";
  return [combinationInvalid(["pooling", "probability"], detail)];
}
