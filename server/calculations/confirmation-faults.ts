import type { Fault } from "../../shared/error-codes.ts";
import {
  confirmationComponent,
  confirmationRequest,
  logEntrySchema,
  plannedMoveSchema,
  surveyStationSchema,
  type ConfirmationRequest,
  type SurveyStationRequest,
} from "../../shared/schemas/confirmations.ts";
import { convertersFor, type Units } from "../../shared/units.ts";
import {
  duplicates,
  idsOf,
  listOf,
  membersOf,
  soundOf,
  statedUnitsOrAny,
  unknownReference,
} from "./common-faults.ts";
import { componentPartFaults } from "./confirmation-component-faults.ts";
import { logFaults, moveFaults, type Readable } from "./confirmation-move-faults.ts";
import { referenceStationFaults } from "./confirmation-reference-faults.ts";
import { pairFaults, surveyStationFaults } from "./confirmation-survey-faults.ts";

const wholeCall = confirmationRequest.shape;

/** Every fault of the domain in a request that passed its schema. */
export function confirmationFaults(request: ConfirmationRequest): Fault[] {
  const { units, before, after, components = [], moves = [], log = [] } = request;
  return faultsOf(units, {
    before: { ids: before.stations.map(({ id }) => id), stations: before.stations },
    after: { ids: after.stations.map(({ id }) => id), stations: after.stations },
    components,
    moves,
    log,
    reference: request.reference ?? [],
    sameSetUp: request.sameSetUp,
    axis: request.axis,
  });
}

/** The faults of the domain in the sound parts of a body that failed its schema elsewhere. */
export function confirmationFaultsBesideSchema(body: unknown): Fault[] {
  const sent = membersOf(body);
  const survey = (name: "before" | "after") => {
    const stations = listOf(membersOf(sent[name])["stations"]);
    return { ids: idsOf(stations), stations: soundOf<SurveyStationRequest>(surveyStationSchema, stations) };
  };
  const units = statedUnitsOrAny(sent["units"]);
  return faultsOf(units, {
    before: survey("before"),
    after: survey("after"),
    components: soundOf(confirmationComponent, sent["components"]),
    moves: soundOf(plannedMoveSchema, sent["moves"]),
    log: soundOf(logEntrySchema, sent["log"]),
    reference: wholeCall.reference.safeParse(sent["reference"]).data ?? [],
    sameSetUp: wholeCall.sameSetUp.safeParse(sent["sameSetUp"]).data ?? null,
    axis: wholeCall.axis.safeParse(sent["axis"]).data,
  });
}

function faultsOf(units: Units, read: Readable): Fault[] {
  const convert = convertersFor(units);
  const { before, after, reference } = read;
  const known = new Set([...before.ids, ...after.ids]);
  return [
    ...(["before", "after"] as const).flatMap((name) => [
      ...duplicates(read[name].ids, (index) => [name, "stations", index, "id"]),
      ...read[name].stations.flatMap((station, index) =>
        station ? surveyStationFaults(station, [name, "stations", index], convert) : [],
      ),
    ]),
    ...pairFaults(before.stations, after.stations, convert),
    ...duplicates(reference, (index) => ["reference", index]),
    ...reference.flatMap((id, index) =>
      known.has(id) ? [] : [unknownReference(["reference", index], "station")],
    ),
    ...componentPartFaults(read.components, known),
    ...moveFaults(read, known),
    ...logFaults(read, known),
    ...referenceStationFaults(read, convert),
  ];
}
