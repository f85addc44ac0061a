import { limits } from "../../shared/limits.ts";
import type { ComponentRequest, StackRequest, SupportRequest } from "../../shared/schemas/move-components.ts";
import type {
  IndicatorRequest,
  MoveStationRequest,
  ShimMoveRequest,
} from "../../shared/schemas/shim-moves.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { PlaneTolerance } from "../compute/conformity/tolerance.ts";
import type {
  MoveComponent,
  MoveIndicator,
  MoveProblem,
  MoveStation,
  MoveSupport,
  Plane,
  ShimStack,
} from "../compute/moves/move-problem.ts";
import { readCovariance } from "./read-covariance.ts";
import { readTolerance } from "./read-tolerance.ts";

type Converters = Record<Dimension, Converter>;

const levelDefault = 0.95;
const maximumMisfitDefaultMm = 0.02;

/** A request as sent, in millimetres, with every default filled in. */
export function readMoveProblem(request: ShimMoveRequest, convert: Converters): MoveProblem {
  const { shims, maximumMisfit, maximumIncrement } = request;
  const { offset } = convert;
  return {
    stations: request.stations.map((station) => readMoveStation(station, convert)),
    referenceIds: request.reference ?? [],
    components: request.components.map((component) => readComponent(component, convert)),
    couplings: (request.couplings ?? []).map(({ component, support, station, h, v }) => ({
      componentId: component,
      supportId: support,
      stationId: station,
      h,
      v,
    })),
    aim: request.objective ?? "least_squares",
    cutIncrementMm: shims?.cutToSize ? offset.toMm(shims.cutToSize.increment) : null,
    stock:
      shims?.stock?.map(({ thickness, quantity }) => ({
        thicknessMm: offset.toMm(thickness),
        quantity: quantity ?? Infinity,
      })) ?? null,
    reuse: shims?.reuse ?? false,
    maximumMisfitMm: maximumMisfit === undefined ? maximumMisfitDefaultMm : offset.toMm(maximumMisfit),
    maximumIncrementMm: orElse(maximumIncrement, offset, null),
    incrementsMax: limits.incrementsPerCall,
    indicators: (request.indicators ?? []).map((indicator) => readIndicator(indicator, convert)),
    level: request.level ?? levelDefault,
  };
}

export function readMoveStation(station: MoveStationRequest, { axial, offset }: Converters): MoveStation {
  const { id, z, deviation, covariance, dof, tolerance } = station;
  return {
    id,
    zMm: axial.toMm(z),
    deviation: { hMm: offset.toMm(deviation.h), vMm: offset.toMm(deviation.v) },
    covariance: covariance ? readCovariance(covariance, offset) : null,
    dof: dof ?? null,
    tolerance: tolerance ? readTolerance(tolerance, offset) : null,
  };
}

export function readComponent(component: ComponentRequest, convert: Converters): MoveComponent {
  const { id, kind, stations, fixed, allowReferenceMove, supports, carriedBy, tilt, roll } = component;
  const { axial, offset } = convert;
  return {
    id,
    kind: kind ?? "other",
    stationIds: stations ?? [],
    fixed: fixed ?? false,
    allowReferenceMove: allowReferenceMove ?? false,
    supports: (supports ?? []).map((support) => readSupport(support, convert)),
    carriedById: carriedBy ?? null,
    tiltTolerance: tilt
      ? {
          h: offset.toMm(tilt.tolerance.h) / axial.toMm(1),
          v: offset.toMm(tilt.tolerance.v) / axial.toMm(1),
        }
      : null,
    roll: roll
      ? {
          radians: roll.radians,
          feet: roll.feet.map(({ support, place, h, v }) => ({
            supportId: support,
            place,
            hMm: offset.toMm(h),
            vMm: offset.toMm(v),
          })),
        }
      : null,
  };
}

function readSupport(support: SupportRequest, { axial, offset }: Converters): MoveSupport {
  const position = {
    id: support.id,
    zMm: axial.toMm(support.z),
    blocked: support.blocked ?? [],
    travel: { h: readTravel(support.travel, "h", offset), v: readTravel(support.travel, "v", offset) },
  };
  switch (support.form) {
    case "feet": {
      const stacks = readStacks(support.stacks ?? {}, offset);
      return { ...position, form: "feet", keys: support.keys ?? "outside", stacks };
    }
    case "joint_keys":
      return { ...position, form: "joint_keys", stacks: readStacks(support.stacks ?? {}, offset) };
    case "pads":
      return {
        ...position,
        form: "pads",
        pads: support.pads.map(({ id, clockDeg, stack }) => ({
          id,
          clockDeg,
          stack: readStack(stack, offset),
        })),
      };
  }
}

function readTravel(travel: SupportRequest["travel"], plane: Plane, offset: Converter): PlaneTolerance {
  const range = travel?.[plane];
  return range
    ? { minMm: offset.toMm(range[0]!), maxMm: offset.toMm(range[1]!) }
    : { minMm: -Infinity, maxMm: Infinity };
}

function readStacks<Name extends string>(
  stacks: Readonly<Partial<Record<Name, StackRequest | undefined>>>,
  offset: Converter,
): Partial<Record<Name, ShimStack>> {
  const read: Partial<Record<Name, ShimStack>> = {};
  for (const name of Object.keys(stacks) as Name[]) {
    const stack = stacks[name];
    if (stack) read[name] = readStack(stack, offset);
  }
  return read;
}

function readStack({ thickness, min, max, maxCount, shims }: StackRequest, offset: Converter): ShimStack {
  return {
    thicknessMm: offset.toMm(thickness),
    minMm: offset.toMm(min ?? 0),
    maxMm: orElse(max, offset, Infinity),
    maxCount: maxCount ?? Infinity,
    piecesMm: shims?.map((piece) => offset.toMm(piece)) ?? null,
  };
}

function readIndicator(indicator: IndicatorRequest, { axial }: Converters): MoveIndicator {
  const { id, component, z, clockDeg, contact } = indicator;
  return { id, componentId: component, zMm: axial.toMm(z), clockDeg, contact: contact ?? "outside" };
}

function orElse<Absent>(value: number | null | undefined, unit: Converter, absent: Absent): number | Absent {
  return value === null || value === undefined ? absent : unit.toMm(value);
}
