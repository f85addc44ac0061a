import type {
  ColdTargetRequest,
  GrowthRequest,
  JournalRequest,
  RotorRequest,
  TargetStationRequest,
  WireRequest,
} from "../../shared/schemas/cold-targets.ts";
import {
  convertersFor,
  expansionConverter,
  furtherConverter,
  massPerLengthConverter,
  type Converter,
  type Dimension,
  type FurtherUnits,
} from "../../shared/units.ts";
import { standardGravity } from "../compute/beam/shaft.ts";
import type { PlaneVector } from "../compute/plane.ts";
import {
  isSamePlace,
  runningFromClearance,
  type ColdTargetInput,
  type Rotor,
  type TargetStation,
} from "../compute/targets/cold-target-input.ts";
import type { Growth } from "../compute/targets/growth.ts";
import { materials } from "../compute/targets/materials.ts";
import type { Wire } from "../compute/targets/wire-sag.ts";
import { readVector } from "./read-vector.ts";

type Converters = Record<Dimension, Converter>;
type Pair = { readonly h: number; readonly v: number };

/** A request without faults, in millimetres, newtons and kelvins, with every default filled in. */
export function readColdTargets({ units, stations, rotor, wire }: ColdTargetRequest): ColdTargetInput {
  const convert = convertersFor(units);
  return {
    stations: stations.map((station) => readStation(station, convert, units)),
    rotor: rotor ? readRotor(rotor, convert, units) : null,
    wire: wire ? readWire(wire, convert, units) : null,
  };
}

/** One growth or a list, as a list. */
export function growthsOf({ growth }: Pick<TargetStationRequest, "growth">): readonly GrowthRequest[] {
  if (!growth) return [];
  return Array.isArray(growth) ? growth : [growth];
}

function readStation(station: TargetStationRequest, convert: Converters, units: FurtherUnits): TargetStation {
  return {
    zMm: convert.axial.toMm(station.z),
    follows: station.follows,
    growths: growthsOf(station).map((growth) => readGrowth(growth, convert, units)),
    closing: vectorOf(station.closing, convert.offset),
  };
}

function readGrowth(growth: GrowthRequest, { bore, offset }: Converters, units: FurtherUnits): Growth {
  const { direction, length, coefficient, material, hot, cold, uncertainty } = growth;
  const stated = typeof coefficient === "number";
  return {
    direction: direction ?? "v",
    lengthMm: bore.toMm(length),
    expansionPerK: stated
      ? expansionConverter(units.temperature).toInside(coefficient)
      : materials[material!].expansionPerK,
    riseK: furtherConverter("temperature", units.temperature).toInside(hot - cold),
    uncertaintyMm: typeof uncertainty === "number" ? offset.toMm(uncertainty) : null,
  };
}

function readRotor(rotor: RotorRequest, { axial, bore, offset }: Converters, units: FurtherUnits): Rotor {
  const { z, sections, material, density, modulus, masses, supports, journals } = rotor;
  const table = material ? materials[material] : null;
  const shaft = {
    startMm: axial.toMm(z ?? 0),
    sections: sections.map(({ length, outer, inner }) => ({
      lengthMm: axial.toMm(length),
      outerMm: bore.toMm(outer),
      innerMm: bore.toMm(inner ?? 0),
    })),
    densityKgPerMm3:
      typeof density === "number"
        ? furtherConverter("density", units.density).toInside(density)
        : furtherConverter("density", "kg/m3").toInside(table!.densityKgPerM3),
    modulusNPerMm2:
      typeof modulus === "number"
        ? furtherConverter("modulus", units.modulus).toInside(modulus)
        : furtherConverter("modulus", "GPa").toInside(table!.modulusGPa!),
    masses: (masses ?? []).map((one) => ({
      zMm: axial.toMm(one.z),
      massKg: furtherConverter("mass", units.mass).toInside(one.mass),
    })),
  };
  const runs = (journals ?? []).map((journal) => ({
    zMm: axial.toMm(journal.z),
    running: readRunning(journal, offset),
  }));
  return {
    shaft,
    supports: supports.map((support) => {
      const zMm = axial.toMm(support.z);
      const running = runs.find((run) => isSamePlace(run.zMm, zMm))?.running ?? { hMm: 0, vMm: 0 };
      return { zMm, line: vectorOf(support.line, offset), running };
    }),
  };
}

function readRunning(journal: JournalRequest, offset: Converter): PlaneVector {
  if ("running" in journal) return readVector(journal.running, offset);
  return runningFromClearance(offset.toMm(journal.radialClearance), readVector(journal.lift, offset));
}

function readWire(wire: WireRequest, { axial }: Converters, units: FurtherUnits): Wire {
  const { massPerLength, tension, hungMass, span } = wire;
  return {
    weightNPerMm: massPerLengthConverter(units.mass).toInside(massPerLength) * standardGravity,
    tensionN:
      typeof tension === "number"
        ? furtherConverter("force", units.force).toInside(tension)
        : furtherConverter("mass", units.mass).toInside(hungMass!) * standardGravity,
    fromMm: axial.toMm(span[0]!),
    toMm: axial.toMm(span[1]!),
  };
}

function vectorOf(pair: Pair | null | undefined, offset: Converter): PlaneVector {
  return readVector(pair ?? { h: 0, v: 0 }, offset);
}
