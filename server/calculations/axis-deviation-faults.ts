import type { z } from "zod";
import type { Fault } from "../../shared/error-codes.ts";
import {
  axisSchema,
  axisStationSchema,
  type AxisDeviationRequest,
  type AxisStationRequest,
} from "../../shared/schemas/axis-deviations.ts";
import { convertersFor, type Units } from "../../shared/units.ts";
import {
  findMethodFaults,
  findReferenceFaults,
  findStationFaults,
  type ReferenceStation,
} from "../compute/axis/find-faults.ts";
import { readAxisStation } from "./axis-deviation-input.ts";
import { faultOf } from "./collect-faults.ts";
import {
  axisTrialWork,
  levelDefault,
  monteCarloFaults,
  monteCarloFaultsBesideSchema,
} from "./monte-carlo-faults.ts";
import {
  asymmetry,
  duplicates,
  idsOf,
  listOf,
  membersOf,
  unknownReference,
  statedUnitsOrAny,
} from "./common-faults.ts";

/** What could be read of a body: all of it when it passed the schema, the sound parts when it did not (null elsewhere). */
interface Readable {
  readonly units: Units;
  readonly axis: z.infer<typeof axisSchema> | null;
  readonly ids: readonly (string | null)[];
  readonly stations: readonly (AxisStationRequest | null)[];
}

/** Every fault of the domain in a request that passed its schema. */
export function axisDeviationFaults(request: AxisDeviationRequest): Fault[] {
  const { units, axis, stations, level = levelDefault, monteCarlo } = request;
  return [
    ...faultsOf({ units, axis, ids: stations.map(({ id }) => id), stations }),
    ...monteCarloFaults(monteCarlo, level, axisTrialWork(request)),
  ];
}

/** The faults of the domain in the sound parts of a body that failed its schema elsewhere. */
export function axisDeviationFaultsBesideSchema(body: unknown): Fault[] {
  const { units, axis, stations } = membersOf(body);
  const sent = listOf(stations);
  const faults = faultsOf({
    units: statedUnitsOrAny(units),
    axis: axisSchema.safeParse(axis).data ?? null,
    ids: idsOf(sent),
    stations: sent.map((station) => axisStationSchema.safeParse(station).data ?? null),
  });
  return [...faults, ...monteCarloFaultsBesideSchema(body)];
}

function faultsOf({ units, axis, ids, stations }: Readable): Fault[] {
  const convert = convertersFor(units);
  const read = stations.map((station) => station && readAxisStation(station, convert));
  const through = axis?.through ?? [];
  const named = through.map((id) => ids.indexOf(id));
  const stationFaults = read.flatMap((station, index) =>
    station ? findStationFaults(station, index).map((error) => faultOf(error, [])) : [],
  );
  const faults = [
    ...duplicates(ids, (index) => ["stations", index, "id"]),
    ...stations.flatMap((station, index) =>
      asymmetry(station?.covariance, ["stations", index, "covariance"]),
    ),
    ...stationFaults,
    ...duplicates(through, (index) => ["axis", "through", index]),
    ...named.flatMap((station, index) =>
      station < 0 ? unknownReference(["axis", "through", index], "station") : [],
    ),
    ...(axis ? findMethodFaults(axis.method, through.length).map((error) => faultOf(error, [])) : []),
  ];
  const references = named
    .filter((index, at) => index >= 0 && named.indexOf(index) === at)
    .map((index) => ({ index, station: read[index] ?? null }));
  const sound = references.filter((one): one is ReferenceStation => one.station !== null);
  if (!axis || sound.length < references.length) return faults;
  return [...faults, ...findReferenceFaults(axis.method, sound).map((error) => faultOf(error, []))];
}
