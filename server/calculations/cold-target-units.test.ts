import { describe, expect, it } from "vitest";
import { coldMachineMm as base } from "../../tests/support/cold-target-requests.ts";
import type {
  ColdTargetRequest,
  ColdTargetResult,
  GrowthRequest,
} from "../../shared/schemas/cold-targets.ts";
import { furtherUnitChoices, unitChoices } from "../../shared/units.ts";
import { coldTargetKind } from "./cold-target.ts";

const answer = (request: ColdTargetRequest) => coldTargetKind.answer(request).result;
type Stated = ColdTargetRequest["units"];
type Units = { readonly [D in keyof Stated]-?: NonNullable<Stated[D]> };

/** Exact by definition, stated here so that the service's own table is not its own witness. */
const exactly = {
  mm: 1,
  um: 1e-3,
  m: 1e3,
  in: 25.4,
  mil: 0.0254,
  ft: 304.8,
  kg: 1,
  lb: 0.45359237,
  N: 1,
  lbf: 0.45359237 * 9.80665,
  "kg/m3": 1,
  "lb/in3": 0.45359237 / 0.0254 ** 3,
  GPa: 1,
  psi: (0.45359237 * 9.80665) / 0.0254 ** 2 / 1e9,
};

/** The same machine in other units. */
function inUnits(request: ColdTargetRequest, units: Units): ColdTargetRequest {
  const axial = (value: number) => value / exactly[units.axial];
  const bore = (value: number) => value / exactly[units.bore];
  const offset = (value: number) => value / exactly[units.offset];
  const mass = (value: number) => value / exactly[units.mass];
  const pair = ({ h, v }: { h: number; v: number }) => ({ h: offset(h), v: offset(v) });
  const degrees = (value: number) => (units.temperature === "F" ? value * 1.8 + 32 : value);
  const grown = (growth: GrowthRequest): GrowthRequest => ({
    ...growth,
    length: bore(growth.length),
    hot: degrees(growth.hot),
    cold: degrees(growth.cold),
    ...(growth.coefficient
      ? { coefficient: growth.coefficient / (units.temperature === "F" ? 1.8 : 1) }
      : {}),
    ...(growth.uncertainty ? { uncertainty: offset(growth.uncertainty) } : {}),
  });
  const { rotor, wire, stations } = request;
  return {
    units,
    stations: stations.map((station) => ({
      ...station,
      z: axial(station.z),
      ...(station.growth
        ? { growth: Array.isArray(station.growth) ? station.growth.map(grown) : grown(station.growth) }
        : {}),
      ...(station.closing ? { closing: pair(station.closing) } : {}),
    })),
    rotor: {
      z: axial(rotor!.z!),
      sections: rotor!.sections.map(({ length, outer, inner }) => ({
        length: axial(length),
        outer: bore(outer),
        ...(inner ? { inner: bore(inner) } : {}),
      })),
      density: rotor!.density! / exactly[units.density],
      modulus: rotor!.modulus! / exactly[units.modulus],
      masses: rotor!.masses!.map((one) => ({ z: axial(one.z), mass: mass(one.mass) })),
      supports: rotor!.supports.map(({ z, line }) => ({
        z: axial(z),
        ...(line ? { line: pair(line) } : {}),
      })),
      journals: rotor!.journals!.map((journal) =>
        "running" in journal
          ? { z: axial(journal.z), running: pair(journal.running) }
          : {
              z: axial(journal.z),
              radialClearance: offset(journal.radialClearance),
              lift: pair(journal.lift),
            },
      ),
    },
    wire: {
      massPerLength: wire!.massPerLength * (units.mass === "lb" ? 0.3048 / 0.45359237 : 1),
      tension: wire!.tension! / exactly[units.force],
      span: wire!.span.map(axial),
    },
  };
}

/** A million such comparisons are made: only one that fails is worth a matcher. */
function near(got: number, wanted: number, size: number): void {
  if (!(Math.abs(got - wanted) <= 1e-10 * size)) expect(got).toBe(wanted);
}

function expectSameInMm(got: ColdTargetResult, units: Units, wanted: ColdTargetResult): void {
  const f = exactly[units.offset];
  got.stations.forEach((station, i) => {
    const other = wanted.stations[i]!;
    expect([station.id, station.follows]).toEqual([other.id, other.follows]);
    expect(station.warnings.map(({ code }) => code)).toEqual(other.warnings.map(({ code }) => code));
    expect(Object.keys(station.parts)).toEqual(Object.keys(other.parts));
    near(station.z * exactly[units.axial], other.z, 1e4);
    near(station.wireSag! * f, other.wireSag!, 1);
    for (const plane of ["h", "v"] as const) {
      near(station.target[plane] * f, other.target[plane], 1);
      near(station.parts.growth[plane] * f, other.parts.growth[plane], 1);
      near(station.parts.closing[plane] * f, other.parts.closing[plane], 1);
      if (other.parts.rotor) near(station.parts.rotor![plane] * f, other.parts.rotor[plane], 1);
      if (other.uncertainty) near(station.uncertainty![plane] * f, other.uncertainty[plane], 1);
    }
    station.growths.forEach(({ growth, coefficient }, k) => {
      near(growth * f, other.growths[k]!.growth, 1);
      near(coefficient * (units.temperature === "F" ? 1.8 : 1), other.growths[k]!.coefficient, 1e-5);
    });
  });
  got.rotor!.supports.forEach((support, i) => {
    const other = wanted.rotor!.supports[i]!;
    for (const plane of ["h", "v"] as const) {
      near(support.journal[plane] * f, other.journal[plane], 1);
      near((support.slope[plane] * f) / exactly[units.axial], other.slope[plane], 1e-3);
      near(support.reaction![plane] * exactly[units.force], other.reaction![plane], 1e5);
    }
  });
  near(got.wire!.greatestSag * f, wanted.wire!.greatestSag, 1);
  near(got.wire!.greatestSagByParabola * f, wanted.wire!.greatestSagByParabola, 1);
}

/** Every way in which a call may state its units. */
const everyUnits = Object.entries({ ...unitChoices, ...furtherUnitChoices }).reduce<object[]>(
  (all, [dimension, choices]) => all.flatMap((one) => choices.map((unit) => ({ ...one, [dimension]: unit }))),
  [{}],
) as Units[];

describe("coldTargetKind.answer: units", () => {
  it("gives the same answer in each of the 1,024 ways to state units", () => {
    const inMm = answer(base);
    expect(everyUnits).toHaveLength(4 * 2 * 4 * 2 ** 5);
    for (const units of everyUnits) expectSameInMm(answer(inUnits(base, units)), units, inMm);
  });
});
