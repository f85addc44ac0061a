import type { Fault } from "../../shared/error-codes.ts";
import { componentSchema, type ComponentRequest } from "../../shared/schemas/move-components.ts";
import {
  indicatorSchema,
  moveStationSchema,
  shimMoveRequest,
  type IndicatorRequest,
  type MoveStationRequest,
  type ShimMoveRequest,
} from "../../shared/schemas/shim-moves.ts";
import { convertersFor, type Converter, type Dimension, type Units } from "../../shared/units.ts";
import { findToleranceFaults } from "../compute/conformity/find-tolerance-faults.ts";
import { faultOf } from "./collect-faults.ts";
import {
  asymmetry,
  duplicates,
  idsOf,
  listOf,
  membersOf,
  notPositive,
  soundOf,
  statedUnitsOrAny,
  unknownReference,
} from "./common-faults.ts";
import { componentFaults, stationsSharedFaults } from "./component-faults.ts";
import { carrierFaults, couplingFaults } from "./linkage-faults.ts";
import { readMoveStation } from "./shim-move-input.ts";

const wholeCall = shimMoveRequest.shape;

/** What could be read of a body: all of it when it passed the schema, the sound parts when it did not (null elsewhere). */
interface Readable {
  readonly units: Units;
  readonly stationIds: readonly (string | null)[];
  readonly stations: readonly (MoveStationRequest | null)[];
  readonly componentIds: readonly (string | null)[];
  readonly components: readonly (ComponentRequest | null)[];
  readonly indicatorIds: readonly (string | null)[];
  readonly indicators: readonly (IndicatorRequest | null)[];
  readonly reference: readonly string[];
  readonly call: Pick<ShimMoveRequest, "couplings">;
}

/** Every fault of the domain in a request that passed its schema. */
export function shimMoveFaults(request: ShimMoveRequest): Fault[] {
  const { units, stations, components, indicators = [], reference = [] } = request;
  return faultsOf({
    units,
    stationIds: stations.map(({ id }) => id),
    stations,
    componentIds: components.map(({ id }) => id),
    components,
    indicatorIds: indicators.map(({ id }) => id),
    indicators,
    reference,
    call: request,
  });
}

/** The faults of the domain in the sound parts of a body that failed its schema elsewhere. */
export function shimMoveFaultsBesideSchema(body: unknown): Fault[] {
  const sent = membersOf(body);
  const lists = {
    stations: listOf(sent["stations"]),
    components: listOf(sent["components"]),
    indicators: listOf(sent["indicators"]),
  };
  return faultsOf({
    units: statedUnitsOrAny(sent["units"]),
    stationIds: idsOf(lists.stations),
    stations: soundOf(moveStationSchema, lists.stations),
    componentIds: idsOf(lists.components),
    components: soundOf(componentSchema, lists.components),
    indicatorIds: idsOf(lists.indicators),
    indicators: soundOf(indicatorSchema, lists.indicators),
    reference: wholeCall.reference.safeParse(sent["reference"]).data ?? [],
    call: {
      couplings: wholeCall.couplings.safeParse(sent["couplings"]).data,
    },
  });
}

function faultsOf(read: Readable): Fault[] {
  const { stationIds, stations, componentIds, components, indicatorIds, indicators, reference } = read;
  const convert = convertersFor(read.units);
  const zOf = new Map(stations.flatMap((station) => (station ? [[station.id, station.z] as const] : [])));
  const known = { stations: new Set(stationIds), components: new Set(componentIds) };
  return [
    ...duplicates(stationIds, (index) => ["stations", index, "id"]),
    ...stations.flatMap((station, index) => (station ? moveStationFaults(station, index, convert) : [])),
    ...duplicates(reference, (index) => ["reference", index]),
    ...reference.flatMap((id, index) =>
      known.stations.has(id) ? [] : [unknownReference(["reference", index], "station")],
    ),
    ...duplicates(componentIds, (index) => ["components", index, "id"]),
    ...components.flatMap((component, index) =>
      component
        ? componentFaults(component, index, { stationIds: known.stations, reference, zOf }, convert)
        : [],
    ),
    ...stationsSharedFaults(components),
    ...carrierFaults(components, componentIds),
    ...couplingFaults(read.call.couplings ?? [], components, {
      components: componentIds,
      stations: known.stations,
    }),
    ...duplicates(indicatorIds, (index) => ["indicators", index, "id"]),
    ...indicators.flatMap((indicator, index) =>
      !indicator || known.components.has(indicator.component)
        ? []
        : [unknownReference(["indicators", index, "component"], "component")],
    ),
  ];
}

/** Everything that is wrong with the covariance and the tolerance of one station. */
export function moveStationFaults(
  station: MoveStationRequest,
  index: number,
  convert: Record<Dimension, Converter>,
): Fault[] {
  const at = ["stations", index];
  const { covariance, tolerance } = readMoveStation(station, convert);
  return [
    ...asymmetry(station.covariance, [...at, "covariance"]),
    ...notPositive(covariance, [...at, "covariance"]),
    ...(tolerance ? findToleranceFaults(tolerance).map((error) => faultOf(error, at)) : []),
  ];
}
