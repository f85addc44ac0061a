import type { z } from "zod";
import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import {
  axisSchema,
  axisStationSchema,
  type AxisDeviationRequest,
  type AxisStationRequest,
} from "../../shared/schemas/axis-deviations.ts";
import { unitsSchema } from "../../shared/schemas/common.ts";
import { convertersFor, type Units } from "../../shared/units.ts";
import {
  findMethodFaults,
  findReferenceFaults,
  findStationFaults,
  type ReferenceStation,
} from "../compute/axis/find-faults.ts";
import { readAxisStation } from "./axis-deviation-input.ts";
import { faultOf } from "./collect-faults.ts";
import { isSymmetric } from "./read-covariance.ts";

/** What could be read of a body: all of it when it passed the schema, the sound parts when it did not (null elsewhere). */
interface Readable {
  readonly units: Units;
  readonly axis: z.infer<typeof axisSchema> | null;
  readonly ids: readonly (string | null)[];
  readonly stations: readonly (AxisStationRequest | null)[];
}

/** Every fault of the domain in a request that passed its schema. */
export function axisDeviationFaults({ units, axis, stations }: AxisDeviationRequest): Fault[] {
  return faultsOf({ units, axis, ids: stations.map(({ id }) => id), stations });
}

/** The faults of the domain in the sound parts of a body that failed its schema elsewhere. */
export function axisDeviationFaultsBesideSchema(body: unknown): Fault[] {
  const { units, axis, stations } = membersOf(body);
  const sent: unknown[] = Array.isArray(stations) ? stations : [];
  return faultsOf({
    // No fault of the domain depends on the unit: any will do where none was stated.
    units: unitsSchema.safeParse(units).data ?? { axial: "mm", bore: "mm", offset: "mm" },
    axis: axisSchema.safeParse(axis).data ?? null,
    ids: sent.map((station) => {
      const { id } = membersOf(station);
      return typeof id === "string" ? id : null;
    }),
    stations: sent.map((station) => axisStationSchema.safeParse(station).data ?? null),
  });
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
    ...stations.flatMap((station, index) => asymmetry(station, index)),
    ...stationFaults,
    ...duplicates(through, (index) => ["axis", "through", index]),
    ...named.flatMap((station, index) => (station < 0 ? unknownReference(index) : [])),
    ...(axis ? findMethodFaults(axis.method, through.length).map((error) => faultOf(error, [])) : []),
  ];
  const references = named
    .filter((index, at) => index >= 0 && named.indexOf(index) === at)
    .map((index) => ({ index, station: read[index] ?? null }));
  const sound = references.filter((one): one is ReferenceStation => one.station !== null);
  if (!axis || sound.length < references.length) return faults;
  return [...faults, ...findReferenceFaults(axis.method, sound).map((error) => faultOf(error, []))];
}

function duplicates(ids: readonly (string | null)[], at: (index: number) => PropertyKey[]): Fault[] {
  return ids.flatMap((id, index) => {
    const first = ids.indexOf(id);
    if (id === null || first === index) return [];
    return {
      pointer: pointerOf(at(index)),
      code: "duplicate_id" as const,
      detail: `The same id stands at ${pointerOf(at(first))}.`,
    };
  });
}

function unknownReference(index: number): Fault {
  return {
    pointer: pointerOf(["axis", "through", index]),
    code: "unknown_reference",
    detail: "No station of this call has that id.",
  };
}

function asymmetry(station: AxisStationRequest | null, index: number): Fault[] {
  if (!station?.covariance || isSymmetric(station.covariance)) return [];
  return [
    {
      pointer: pointerOf(["stations", index, "covariance"]),
      code: "covariance_not_positive",
      detail: "A covariance is symmetric: its two off-diagonal entries are the same number.",
    },
  ];
}

function membersOf(value: unknown): Record<string, unknown> {
  return typeof value === "object" && value !== null ? (value as Record<string, unknown>) : {};
}
