import type { BoreRequest } from "../../shared/schemas/bore-fits.ts";
import { micrometre, type FellgateStation, type OffsetPair } from "./fellgate-machine.ts";
import { seededNormal } from "./seeded-normal.ts";

/** How far the tip of the turned gauge hangs below its axis, in millimetres. */
const gaugeSag = 0.02;
/** The rule and its threshold that put a slip aside. */
const outliers = { rule: "mad", threshold: 4 } as const;

export interface Survey {
  /** Where each bore lies off the line of sight, by station id. */
  readonly centres: ReadonlyMap<string, OffsetPair>;
  /** Another seed is another day's scatter. */
  readonly seed: number;
  /** Whether readings go wrong where the machine's table says so. */
  readonly withSlips: boolean;
}

/** What an instrument on the line of sight reads of one bore, to the micrometre. */
export function readBore(station: FellgateStation, survey: Survey): BoreRequest {
  const centre = survey.centres.get(station.id);
  if (!centre) throw new Error(`The survey has no centre of ${station.id}.`);
  const { id, nominalDiameter, wall } = station;
  const normal = seededNormal(survey.seed + Math.round(station.z));
  const slipAt = survey.withSlips ? wall.slip?.index : undefined;
  const walls = clockAngles(wall).map((clockDeg, index) => {
    const slip = index === slipAt ? (wall.slip?.by ?? 0) : 0;
    return { clockDeg, radius: radiusAt(station, clockDeg) + wall.readingUncertainty * normal() + slip };
  });
  const common = {
    id,
    seen: wall.seen,
    nominalDiameter,
    readingUncertainty: wall.readingUncertainty,
    outliers,
  };
  if (wall.instrument === "points") {
    const points = walls.map(({ clockDeg, radius }) => pointAt(centre, clockDeg, radius));
    return {
      ...common,
      form: "points",
      points: points.map(({ h, v }) => ({
        h: micrometre(wall.seen === "upstream" ? -h : h),
        v: micrometre(v),
      })),
    };
  }
  const aboutTip = { h: centre.h, v: centre.v + gaugeSag };
  return {
    ...common,
    form: "turned_gauge",
    sense: "larger_is_farther",
    zero: "nominal",
    gaugeSag,
    readings: walls.map(({ clockDeg, radius }) => ({
      clockDeg: wall.seen === "upstream" ? (360 - clockDeg) % 360 : clockDeg,
      reading: micrometre(distanceAlong(aboutTip, clockDeg, radius) - nominalDiameter / 2),
    })),
  };
}

function clockAngles({ everyDeg, gapsDeg }: FellgateStation["wall"]): number[] {
  const all = Array.from({ length: 360 / everyDeg }, (_, index) => index * everyDeg);
  return all.filter((angle) => !gapsDeg.some(([from, to]) => angle >= from && angle <= to));
}

function radiusAt({ nominalDiameter, wall }: FellgateStation, clockDeg: number): number {
  const lobe = Math.cos(2 * radians(clockDeg - wall.longAxisDeg));
  return (nominalDiameter + wall.oversize) / 2 + wall.outOfRound * lobe;
}

function pointAt({ h, v }: OffsetPair, clockDeg: number, radius: number): OffsetPair {
  const angle = radians(clockDeg);
  return { h: h + radius * Math.sin(angle), v: v + radius * Math.cos(angle) };
}

/** From the origin to the circle about `centre`, along a clock angle. */
function distanceAlong({ h, v }: OffsetPair, clockDeg: number, radius: number): number {
  const angle = radians(clockDeg);
  const along = h * Math.sin(angle) + v * Math.cos(angle);
  const across = h * Math.cos(angle) - v * Math.sin(angle);
  return along + Math.sqrt(radius ** 2 - across ** 2);
}

const radians = (degrees: number): number => (degrees * Math.PI) / 180;
