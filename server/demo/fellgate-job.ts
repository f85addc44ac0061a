import type { AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type {
  CheckRequest,
  JobDetails,
  LoggedMove,
  Reading,
  SurveyRequest,
} from "../../shared/schemas/job-entries.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import { plannedBoreMoves } from "../../shared/planned-move.ts";
import { setUpCheckIds } from "../../shared/set-up-checks.ts";
import { fellgateStations, referenceStations } from "./fellgate-machine.ts";
import { readBore } from "./fellgate-readings.ts";
import { foundCentres, leftCentres } from "./outage-requests.ts";

const ENGINEER = "Ines Alder";
const MILLWRIGHT = "Sol Winter";

/** How the demo's job is set up. */
export const fellgateJobDetails: JobDetails = {
  title: "Unit 2, major outage",
  orderNumber: "WO-1180",
  site: "Fellgate",
  startsOn: "2026-11-02",
  endsOn: "2026-11-20",
  people: [
    { name: ENGINEER, role: "Alignment engineer" },
    { name: MILLWRIGHT, role: "Millwright lead" },
  ],
  instruments: [
    {
      id: "gauge-1",
      description: "Turned bore gauge on the line of sight",
      calibratedOn: "2026-06-01",
      calibrationDueOn: "2027-06-01",
      readingUncertainty: 0.008,
    },
  ],
  seen: "downstream",
  level: 0.95,
  axis: { method: "two_station", through: [...referenceStations] },
};

/** Every set-up check, answered before the first reading. */
export const fellgateChecks: readonly CheckRequest[] = setUpCheckIds.map((check) => ({
  check,
  answer: "yes",
  by: ENGINEER,
  at: "2026-11-04T06:30:00Z",
}));

/** The survey when the outage began, under what conditions and with what. */
export const asFoundSurvey: SurveyRequest = {
  stage: "as_found",
  sameSetUp: false,
  instrument: "gauge-1",
  conditions: {
    temperatureUnit: "C",
    ambient: 19.5,
    metal: [
      { place: "casing, turbine end", value: 21.2 },
      { place: "bearing 1 pedestal", value: 20.8 },
    ],
  },
};

/** The survey after the moves, the line of sight untouched. */
export const asLeftSurvey: SurveyRequest = {
  stage: "as_left",
  sameSetUp: true,
  instrument: "gauge-1",
  conditions: {
    temperatureUnit: "C",
    ambient: 18.9,
    metal: [
      { place: "casing, turbine end", value: 20.4 },
      { place: "bearing 1 pedestal", value: 20.1 },
    ],
  },
};

/** Every bore as it lay when the outage began, and the first once more at the end. */
export function asFoundReadings(): Reading[] {
  return readingsOf({ centres: foundCentres(), seed: 1, withSlips: true }, "2026-11-04");
}

/** Every bore after the moves. */
export function asLeftReadings(
  found: Pick<AxisDeviationResult, "stations">,
  moves: Pick<ShimMoveResult, "predicted">,
): Reading[] {
  return readingsOf({ centres: leftCentres(found, moves), seed: 4, withSlips: false }, "2026-11-14");
}

function readingsOf(survey: Parameters<typeof readBore>[1], day: string): Reading[] {
  const minute = (index: number) =>
    `${day}T${String(7 + Math.floor(index / 4)).padStart(2, "0")}:${String((index % 4) * 15).padStart(2, "0")}:00Z`;
  const reading = (index: number, station: (typeof fellgateStations)[number], seed: number): Reading => {
    const { id, ...read } = readBore(station, { ...survey, seed });
    return {
      ...read,
      station: id,
      takenAt: minute(index),
      person: ENGINEER,
      upperHalf: "on",
      instrument: "gauge-1",
    };
  };
  const all = fellgateStations.map((station, index) => reading(index, station, survey.seed));
  const [first] = fellgateStations;
  return first
    ? [...all, { ...reading(fellgateStations.length, first, survey.seed + 100), closing: true }]
    : all;
}

/** The moves that a plan asks for, in its order, each finished on a day of its own. */
export function movesAsPlanned(moves: Pick<ShimMoveResult, "steps" | "components">): LoggedMove[] {
  return moves.steps.map(({ component }, index) => ({
    component,
    at: `2026-11-${String(6 + Math.floor(index / 4)).padStart(2, "0")}T${String(8 + 2 * (index % 4)).padStart(2, "0")}:00:00Z`,
    person: MILLWRIGHT,
    moved: plannedBoreMoves(moves.components.find(({ id }) => id === component)),
    finished: true,
  }));
}
