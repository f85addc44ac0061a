import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import {
  costedComponentSchema,
  floatingReferenceSchema,
  type CostedComponentRequest,
  type FewestMovesRequest,
  type FloatingReferenceRequest,
} from "../../shared/schemas/fewest-moves.ts";
import { moveStationSchema, type MoveStationRequest } from "../../shared/schemas/shim-moves.ts";
import { convertersFor, type Units } from "../../shared/units.ts";
import {
  combinationInvalid,
  duplicates,
  idsOf,
  listOf,
  membersOf,
  notAvailable,
  soundOf,
  statedUnitsOrAny,
  unknownReference,
} from "./common-faults.ts";
import { componentFaults, stationsSharedFaults } from "./component-faults.ts";
import { carrierFaults } from "./linkage-faults.ts";
import { moveStationFaults } from "./shim-move-faults.ts";

/** Reference stations nearer to each other than this share of the machine count as standing at one z. */
const sameZWithin = 1e-9;

/** What could be read of a body: all of it when it passed the schema, the sound parts when it did not (null elsewhere). */
interface Readable {
  readonly units: Units;
  readonly stationIds: readonly (string | null)[];
  readonly stations: readonly (MoveStationRequest | null)[];
  readonly referenceIds: readonly (string | null)[];
  readonly references: readonly (FloatingReferenceRequest | null)[];
  readonly componentIds: readonly (string | null)[];
  readonly components: readonly (CostedComponentRequest | null)[];
}

/** Every fault of the domain in a request that passed its schema. */
export function fewestMovesFaults({
  units,
  stations,
  reference = [],
  components,
}: FewestMovesRequest): Fault[] {
  return faultsOf({
    units,
    stationIds: stations.map(({ id }) => id),
    stations,
    referenceIds: reference.map(({ id }) => id),
    references: reference,
    componentIds: components.map(({ id }) => id),
    components,
  });
}

/** The faults of the domain in the sound parts of a body that failed its schema elsewhere. */
export function fewestMovesFaultsBesideSchema(body: unknown): Fault[] {
  const sent = membersOf(body);
  const lists = {
    stations: listOf(sent["stations"]),
    reference: listOf(sent["reference"]),
    components: listOf(sent["components"]),
  };
  return faultsOf({
    units: statedUnitsOrAny(sent["units"]),
    stationIds: idsOf(lists.stations),
    stations: soundOf(moveStationSchema, lists.stations),
    referenceIds: idsOf(lists.reference),
    references: soundOf(floatingReferenceSchema, lists.reference),
    componentIds: idsOf(lists.components),
    components: soundOf(costedComponentSchema, lists.components),
  });
}

function faultsOf(read: Readable): Fault[] {
  const { stationIds, stations, referenceIds, references, componentIds, components } = read;
  const convert = convertersFor(read.units);
  const zOf = new Map(stations.flatMap((station) => (station ? [[station.id, station.z] as const] : [])));
  const known = new Set(stationIds);
  const reference = referenceIds.flatMap((id) => id ?? []);
  return [
    ...duplicates(stationIds, (index) => ["stations", index, "id"]),
    ...stations.flatMap((station, index) => (station ? moveStationFaults(station, index, convert) : [])),
    ...duplicates(referenceIds, (index) => ["reference", index, "id"]),
    ...referenceIds.flatMap((id, index) =>
      id === null || known.has(id) ? [] : [unknownReference(["reference", index, "id"], "station")],
    ),
    ...references.flatMap((each, index) => (each ? floatFaults(each, index) : [])),
    ...spreadFaults(referenceIds, zOf),
    ...duplicates(componentIds, (index) => ["components", index, "id"]),
    ...components.flatMap((component, index) =>
      component
        ? [
            ...componentFaults(component, index, { stationIds: known, reference, zOf }, convert),
            ...notComputed(component, index),
            ...unboundedFaults(component, index, components, reference),
          ]
        : [],
    ),
    ...stationsSharedFaults(components),
    ...carrierFaults(components, componentIds),
  ];
}

function floatFaults({ float }: FloatingReferenceRequest, index: number): Fault[] {
  return (["h", "v"] as const).flatMap((plane) => {
    const range = float?.[plane];
    if (!range || range[0]! <= range[1]!) return [];
    return [combinationInvalid(["reference", index, "float", plane], "The least is not above the most.")];
  });
}

/** An axis that floats is held at two stations apart along z, or nothing would hold its slope. */
function spreadFaults(ids: readonly (string | null)[], zOf: ReadonlyMap<string, number>): Fault[] {
  if (ids.length === 0) return [];
  const pointer = pointerOf(["reference"]);
  if (ids.length === 1) {
    const detail = "An axis is set by two reference stations or more; with none it stays as surveyed.";
    return [{ pointer, code: "reference_count", detail, value: 1, allowed: { min: 2 } }];
  }
  const z = ids.flatMap((id) => (id === null ? [] : (zOf.get(id) ?? [])));
  const apart = spreadOf(z) > sameZWithin * spreadOf([...zOf.values()]);
  if (z.length < ids.length || apart) return [];
  const detail = "The reference stations stand at one z, or far too near to each other to hold an axis.";
  return [{ pointer, code: "stations_coincident", detail }];
}

const spreadOf = (values: readonly number[]): number => Math.max(...values) - Math.min(...values);

/** What shim-moves takes and this call would have to leave out. */
function notComputed({ roll, tilt }: CostedComponentRequest, index: number): Fault[] {
  const detail = (what: string) =>
    `The choice of parts does not look at ${what}: leave it out here, and send it to shim-moves.`;
  return [
    ...(roll ? [notAvailable(["components", index, "roll"], detail("a roll"))] : []),
    ...(tilt ? [notAvailable(["components", index, "tilt"], detail("a tilt"))] : []),
  ];
}

/** Parts that move stations together have their supports' travel stated: the program needs a bound of their moves. */
function unboundedFaults(
  component: CostedComponentRequest,
  index: number,
  components: readonly (CostedComponentRequest | null)[],
  reference: readonly string[],
): Fault[] {
  const { id, fixed, allowReferenceMove, stations = [], supports = [], carriedBy } = component;
  const held = stations.some((station) => reference.includes(station)) && allowReferenceMove !== true;
  const linked = (carriedBy ?? null) !== null || components.some((each) => each?.carriedBy === id);
  if (fixed || held || !linked) return [];
  return supports.flatMap(({ travel, blocked = [] }, k) => {
    const open = (["h", "v"] as const).filter((plane) => !blocked.includes(plane) && !travel?.[plane]);
    if (open.length === 0) return [];
    const detail = `A part that carries another, or rests in one, states its travel: here in ${open.join(" and ")}.`;
    return [combinationInvalid(["components", index, "supports", k, "travel"], detail)];
  });
}
