import {
  coldTargetRequest,
  type ColdTargetRequest,
  type ColdTargetResult,
  type TargetStationRequest,
} from "../../shared/schemas/cold-targets.ts";
import {
  convertersFor,
  expansionConverter,
  furtherConverter,
  type Converter,
  type Dimension,
} from "../../shared/units.ts";
import type { SupportAnswer } from "../compute/beam/beam.ts";
import { isSamePlace, type ColdTargetInput } from "../compute/targets/cold-target-input.ts";
import { coldTargets, type BentRotor, type StationTarget } from "../compute/targets/cold-targets.ts";
import { catenarySagMm, parabolaSagMm, type Wire } from "../compute/targets/wire-sag.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { coldTargetFaults } from "./cold-target-faults.ts";
import { readColdTargets } from "./cold-target-input.ts";
import { writeVector } from "./write-plane.ts";

interface ColdTargetAnswer {
  readonly units: ColdTargetRequest["units"];
  readonly result: ColdTargetResult;
}

type Converters = Record<Dimension, Converter>;
type Warnings = ColdTargetResult["stations"][number]["warnings"];

/** Where the theory of small slopes is off by about a hundredth. */
const slopeMax = 0.1;

/** POST /v1/cold-targets: where every bore should lie cold, and what that is made of. */
export const coldTargetKind: CalculationKind<ColdTargetRequest, ColdTargetAnswer> = {
  kind: "cold-target",
  request: coldTargetRequest,
  answer(request) {
    const faults = coldTargetFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const input = readColdTargets(request);
    const { stations, rotor } = coldTargets(input);
    const convert = convertersFor(request.units);
    const result = {
      stations: stations.map((station, i) => writeStation(station, request, i, input, convert)),
      ...(rotor ? { rotor: writeRotor(rotor, request, convert) } : {}),
      ...(input.wire ? { wire: writeWire(input.wire, convert.offset) } : {}),
    };
    return { units: request.units, result };
  },
  faultsBesideSchema: coldTargetFaults,
};

function writeStation(
  found: StationTarget,
  { units, stations }: ColdTargetRequest,
  index: number,
  input: ColdTargetInput,
  { offset }: Converters,
): ColdTargetResult["stations"][number] {
  const { id, z, follows } = stations[index]!;
  const { growths } = input.stations[index]!;
  const base = writeVector(found.base, offset);
  return {
    id,
    z,
    follows,
    target: writeVector(found.target, offset),
    ...(found.uncertainty ? { uncertainty: writeVector(found.uncertainty, offset) } : {}),
    parts: {
      ...(follows === "rotor" ? { rotor: base } : { line: base }),
      growth: writeVector(found.growth, offset),
      closing: writeVector(found.closing, offset),
    },
    growths: growths.map(({ direction, expansionPerK }, i) => ({
      direction,
      growth: offset.fromMm(found.growthsMm[i]!),
      coefficient: expansionConverter(units.temperature).fromInside(expansionPerK),
    })),
    ...(found.wireSagMm === null ? {} : { wireSag: offset.fromMm(found.wireSagMm) }),
    warnings: stationWarnings(found, stations[index]!, growths),
  };
}

function stationWarnings(
  { uncertainty, lineNotGiven }: StationTarget,
  { z }: TargetStationRequest,
  growths: ColdTargetInput["stations"][number]["growths"],
): Warnings {
  const exact = growths.filter(({ uncertaintyMm }) => uncertaintyMm === null).length;
  return [
    ...(lineNotGiven
      ? [
          {
            code: "line_not_given",
            detail: `No support of the rotor stands at z ${z}: this bearing's line is taken as 0, though others are not.`,
          },
        ]
      : []),
    ...(uncertainty && exact > 0
      ? [
          {
            code: "uncertainty_partial",
            detail: `${exact} of ${growths.length} growths state no uncertainty: the target's holds that of the others only.`,
          },
        ]
      : []),
  ];
}

function writeRotor(
  { h, v }: BentRotor,
  { units, rotor }: ColdTargetRequest,
  { axial, offset }: Converters,
): NonNullable<ColdTargetResult["rotor"]> {
  const force = units.force === undefined ? null : furtherConverter("force", units.force);
  const slope = (one: SupportAnswer) => offset.fromMm(one.slope * axial.toMm(1));
  return {
    supports: v.supports.map((up, i) => {
      const right = h.supports[i]!;
      return {
        z: rotor!.supports[i]!.z,
        journal: writeVector({ hMm: right.upMm, vMm: up.upMm }, offset),
        slope: { h: slope(right), v: slope(up) },
        ...(force
          ? { reaction: { h: force.fromInside(right.reactionN), v: force.fromInside(up.reactionN) } }
          : {}),
      };
    }),
    closure: Math.max(h.closure, v.closure),
    warnings: rotorWarnings({ h, v }, rotor!, axial),
  };
}

function rotorWarnings(
  { h, v }: BentRotor,
  { supports, journals }: NonNullable<ColdTargetRequest["rotor"]>,
  axial: Converter,
): Warnings {
  const placesOf = (indices: readonly number[]) => indices.map((i) => supports[i]!.z).join(", ");
  const every = [...supports.keys()];
  const bare = every.filter(
    (i) => !(journals ?? []).some(({ z }) => isSamePlace(axial.toMm(z), axial.toMm(supports[i]!.z))),
  );
  const lifted = every.filter((i) => v.supports[i]!.reactionN < 0);
  const steepest = [h, v]
    .flatMap(({ elements, supports: held }) => [...elements, ...held])
    .reduce((most, { slope }) => Math.max(most, Math.abs(slope)), 0);
  return [
    ...(bare.length > 0
      ? [
          {
            code: "journal_not_given",
            detail: `No running journal is given at z ${placesOf(bare)}: there the shaft is held at the line itself.`,
          },
        ]
      : []),
    ...(lifted.length > 0
      ? [
          {
            code: "support_lifts",
            detail: `The shaft would lift off at z ${placesOf(lifted)}: a bearing cannot pull it down, so the line found is not the one it takes.`,
          },
        ]
      : []),
    ...(steepest > slopeMax
      ? [
          {
            code: "slope_not_small",
            detail: `The shaft slopes by up to ${steepest.toPrecision(2)}: the theory holds for small slopes. Check units and supports.`,
          },
        ]
      : []),
  ];
}

function writeWire(wire: Wire, offset: Converter): NonNullable<ColdTargetResult["wire"]> {
  const middleMm = wire.fromMm + (wire.toMm - wire.fromMm) / 2;
  return {
    greatestSag: offset.fromMm(catenarySagMm(wire, middleMm)),
    greatestSagByParabola: offset.fromMm(parabolaSagMm(wire, middleMm)),
  };
}
