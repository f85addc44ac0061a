import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import {
  growthSchema,
  targetStationSchema,
  wireSchema,
  type GrowthRequest,
} from "../../shared/schemas/cold-targets.ts";
import { unitsSchema } from "../../shared/schemas/common.ts";
import {
  convertersFor,
  furtherUnitChoices,
  type Converter,
  type FurtherDimension,
  type FurtherUnit,
} from "../../shared/units.ts";
import { outsideFault, rotorFaults, shaftExtent, type Extent } from "./cold-target-rotor-faults.ts";
import {
  belowAbsoluteZero,
  combinationInvalid,
  duplicates,
  idsOf,
  listOf,
  membersOf,
  unitNotStated,
} from "./common-faults.ts";

type Place = readonly PropertyKey[];
type Members = Readonly<Record<string, unknown>>;

/**
 * Every fault of the domain in a body, of its sound parts where others fail the schema: the same for a request that
 * passed its schema and for one that did not.
 */
export function coldTargetFaults(body: unknown): Fault[] {
  const { units, stations, rotor, wire } = membersOf(body);
  // Places are compared with each other only: any unit will do where none was stated.
  const lengths = unitsSchema.safeParse(lengthUnitsOf(units)).data ?? {
    axial: "mm",
    bore: "mm",
    offset: "mm",
  };
  const { axial } = convertersFor(lengths);
  const sent = listOf(stations);
  const extents = {
    shaft: isPresent(rotor) ? shaftExtent(rotor, axial) : null,
    wire: wireExtent(wire, axial),
  };
  return [
    ...unitFaults(membersOf(body)),
    ...duplicates(idsOf(sent), (index) => ["stations", index, "id"]),
    ...sent.flatMap((station, index) => [
      ...growthFaults(station, ["stations", index, "growth"], membersOf(units)["temperature"]),
      ...placeFaults(station, ["stations", index, "z"], extents, axial),
    ]),
    ...(isPresent(rotor) ? objectFaults(rotor, () => rotorFaults(rotor, axial)) : noRotorFaults(sent)),
    ...objectFaults(wire, () => wireFaults(membersOf(wire))),
  ];
}

/** What is no object at all is the schema's fault. */
const objectFaults = (value: unknown, find: () => Fault[]): Fault[] =>
  typeof value === "object" && value !== null && !Array.isArray(value) ? find() : [];

const isPresent = (value: unknown): boolean => value !== undefined && value !== null;

function lengthUnitsOf(units: unknown): Members {
  const { axial, bore, offset } = membersOf(units);
  return { axial, bore, offset };
}

/** Units that the call uses and does not state. */
function unitFaults({ units, stations, rotor, wire }: Members): Fault[] {
  if (!isPresent(units)) return [];
  const { density, modulus, masses } = membersOf(rotor);
  const { massPerLength, hungMass, tension } = membersOf(wire);
  const uses: Record<FurtherDimension, boolean> = {
    temperature: listOf(stations).some((station) => growthsIn(station).length > 0),
    mass: listOf(masses).length > 0 || isPresent(massPerLength) || isPresent(hungMass),
    force: isPresent(tension),
    density: isPresent(density),
    modulus: isPresent(modulus),
  };
  return (Object.keys(furtherUnitChoices) as FurtherDimension[])
    .filter((dimension) => uses[dimension] && membersOf(units)[dimension] === undefined)
    .map(unitNotStated);
}

/** The growths of a station that may be anything, each with its place below `growth`. */
function growthsIn(station: unknown): { readonly growth: unknown; readonly step: Place }[] {
  const { growth } = membersOf(station);
  if (Array.isArray(growth)) return growth.map((one: unknown, index) => ({ growth: one, step: [index] }));
  return isPresent(growth) ? [{ growth, step: [] }] : [];
}

function growthFaults(station: unknown, at: Place, temperatureUnit: unknown): Fault[] {
  return growthsIn(station).flatMap(({ growth, step }) => {
    const sound = growthSchema.safeParse(growth).data;
    if (!sound) return [];
    const place = [...at, ...step];
    return [...expansionFaults(sound, place), ...temperatureFaults(sound, place, temperatureUnit)];
  });
}

function expansionFaults({ coefficient, material }: GrowthRequest, at: Place): Fault[] {
  const pointer = pointerOf([...at, "coefficient"]);
  if (isPresent(coefficient) && isPresent(material)) {
    return [combinationInvalid([...at, "coefficient"], "Send coefficient or material, not both.")];
  }
  if (isPresent(coefficient) || isPresent(material)) return [];
  return [{ pointer, code: "required", detail: "Growth needs a coefficient, or a material that has one." }];
}

function temperatureFaults(growth: GrowthRequest, at: Place, unit: unknown): Fault[] {
  const stated: FurtherUnit<"temperature"> | undefined = furtherUnitChoices.temperature.find(
    (choice) => choice === unit,
  );
  return (["hot", "cold"] as const).flatMap((name) => belowAbsoluteZero(growth[name], stated, [...at, name]));
}

/** A station beyond the shaft that it follows, or beyond the wire. */
function placeFaults(
  station: unknown,
  at: Place,
  extents: { readonly shaft: Extent | null; readonly wire: Extent | null },
  axial: Converter,
): Fault[] {
  const { z, follows } = membersOf(station);
  const sound = targetStationSchema.shape.z.safeParse(z).data;
  if (sound === undefined) return [];
  return [
    ...(follows === "rotor" && extents.shaft ? outsideFault(sound, at, extents.shaft, axial) : []),
    ...(extents.wire ? outsideFault(sound, at, extents.wire, axial) : []),
  ];
}

function wireExtent(wire: unknown, axial: Converter): Extent | null {
  const span = wireSchema.shape.span.safeParse(membersOf(wire)["span"]).data;
  if (!span || !(span[0]! < span[1]!)) return null;
  const detail = "It lies beyond the ends of the wire.";
  return { fromMm: axial.toMm(span[0]!), toMm: axial.toMm(span[1]!), slackMm: 0, detail };
}

function wireFaults({ tension, hungMass, span }: Members): Fault[] {
  const ends = wireSchema.shape.span.safeParse(span).data;
  const faults: Fault[] = [];
  if (isPresent(tension) && isPresent(hungMass)) {
    faults.push(combinationInvalid(["wire", "tension"], "Send tension or hungMass, not both."));
  }
  if (!isPresent(tension) && !isPresent(hungMass)) {
    faults.push({ pointer: "/wire/tension", code: "required", detail: "A wire needs tension or hungMass." });
  }
  if (ends && !(ends[0]! < ends[1]!)) {
    faults.push(combinationInvalid(["wire", "span"], "The wire's first end is below its second along z."));
  }
  return faults;
}

function noRotorFaults(stations: readonly unknown[]): Fault[] {
  if (!stations.some((station) => membersOf(station)["follows"] === "rotor")) return [];
  return [{ pointer: "/rotor", code: "required", detail: "A station follows the rotor: describe it." }];
}
