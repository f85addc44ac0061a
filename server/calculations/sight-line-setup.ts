import { cautions } from "../../shared/cautions.ts";
import type { SightLineResult } from "../../shared/schemas/sight-line-answers.ts";
import { sightLineSetupRequest, type SightLineSetupRequest } from "../../shared/schemas/sight-line-setups.ts";
import { convertersFor, type Converter, type Dimension } from "../../shared/units.ts";
import { assertFinite } from "../compute/compute-error.ts";
import type { PlaneVector } from "../compute/plane.ts";
import { bendInAir, type SightAir } from "../compute/sight-line/bend-in-air.ts";
import {
  setUpSightLine,
  type SightLineSetup,
  type SourceMove,
} from "../compute/sight-line/set-up-sight-line.ts";
import type { SightLineInput } from "../compute/sight-line/sight-line-input.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { sightLineFaults } from "./sight-line-faults.ts";
import { placesOf, readAir, readSightLine } from "./sight-line-input.ts";
import { amplificationMax, sightLineWarnings } from "./sight-line-words.ts";
import { writeDeviation } from "./write-deviation.ts";
import { writeVector } from "./write-plane.ts";

interface SightLineSetupAnswer {
  readonly units: SightLineSetupRequest["units"];
  readonly seen: "downstream";
  readonly level: number;
  readonly result: SightLineResult;
  readonly cautions: typeof cautions;
}

type Converters = Record<Dimension, Converter>;

/** POST /v1/sight-line-setups: how to move the source so that its beam passes a near and a far bore where it should. */
export const sightLineSetupKind: CalculationKind<SightLineSetupRequest, SightLineSetupAnswer> = {
  kind: "sight-line-setup",
  request: sightLineSetupRequest,
  answer(request) {
    const faults = sightLineFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const input = readSightLine(request);
    const result = resultOf(request, input);
    return { units: request.units, seen: "downstream", level: input.level, result, cautions };
  },
  faultsBesideSchema: sightLineFaults,
};

function resultOf(request: SightLineSetupRequest, input: SightLineInput): SightLineResult {
  const convert = convertersFor(request.units);
  const { offset } = convert;
  const setup = setUpSightLine(input);
  const air = readAir(request, input);
  const bends = air ? input.stations.map(({ zMm }) => bendInAir(air, Math.abs(zMm - input.sourceZMm))) : [];
  return {
    stations: setup.stations.map(({ role, beam, off, within, after }, index) => ({
      id: request.stations[index]!.id,
      z: plain(request.stations[index]!.z),
      role,
      beam: pairOf(beam, offset),
      expected: pairOf(input.stations[index]!.expected, offset),
      off: deviationOf(off, offset),
      guard: setup.guardMm === null ? null : plain(offset.fromMm(setup.guardMm)),
      within,
      after: after && {
        beam: pairOf(after.beam, offset),
        distance: plain(offset.fromMm(after.distanceMm)),
        within: after.within,
      },
    })),
    adjustment: setup.move && adjustmentOf(request, setup.move, convert),
    amplification: { factor: setup.amplification, limit: amplificationMax },
    ...(air ? { bend: bendOf(request, air, bends, convert) } : {}),
    ...(request.drift ? { drift: driftOf(request, request.drift, setup, offset) } : {}),
    repeat: setup.next !== "go_on",
    next: setup.next,
    warnings: sightLineWarnings(input, setup, bends),
  };
}

function adjustmentOf(
  request: SightLineSetupRequest,
  { shift, tilt, at }: SourceMove,
  { axial, offset }: Converters,
): SightLineResult["adjustment"] {
  // mm per mm → offset units per axial unit
  const slopeOf = (slope: number) => plain(offset.fromMm(axial.toMm(slope)));
  const milliradiansOf = (slope: number) => plain(1000 * Math.atan(slope));
  return {
    shift: pairOf(shift, offset),
    tilt: { h: slopeOf(tilt.h), v: slopeOf(tilt.v) },
    tiltMilliradians: { h: milliradiansOf(tilt.h), v: milliradiansOf(tilt.v) },
    moves: request.adjuster
      ? placesOf(request).map((place, index) => ({
          at: place.at,
          z: plain(place.z),
          ...pairOf(at[index]!, offset),
        }))
      : null,
  };
}

function bendOf(
  { stations }: SightLineSetupRequest,
  air: SightAir,
  bends: readonly PlaneVector[],
  { axial, offset }: Converters,
): SightLineResult["bend"] {
  const { h, v, radial } = deviationOf(bendInAir(air, air.lengthMm), offset);
  return {
    length: axial.fromMm(air.lengthMm),
    h,
    v,
    radial,
    stations: stations.map(({ id }, index) => ({ id, ...pairOf(bends[index]!, offset) })),
  };
}

function driftOf(
  { stations }: SightLineSetupRequest,
  { allowed }: NonNullable<SightLineSetupRequest["drift"]>,
  { drift }: SightLineSetup,
  offset: Converter,
): SightLineResult["drift"] {
  const { change, within, verdict, corrections } = drift!;
  const { h, v, radial } = deviationOf(change, offset);
  return {
    h,
    v,
    radial,
    allowed,
    within,
    verdict,
    corrections:
      verdict === "shared_out"
        ? stations.map(({ id }, index) => ({ id, ...pairOf(corrections[index]!, offset) }))
        : [],
  };
}

function deviationOf(deviation: PlaneVector, offset: Converter) {
  const written = writeDeviation(deviation, offset);
  return { ...written, h: plain(written.h), v: plain(written.v), radial: plain(written.radial) };
}

function pairOf(vector: PlaneVector, offset: Converter) {
  const { h, v } = writeVector(vector, offset);
  return { h: plain(h), v: plain(v) };
}

/**
 * Without the sign of a negative zero, which JSON drops: an answer is the same before and after it was stored.
 * @throws ComputeError result_overflow: a finite length in millimetres can be too many micrometres
 */
function plain(value: number): number {
  return assertFinite(value + 0, "A length of the answer");
}
