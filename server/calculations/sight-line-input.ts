import type { SightLineSetupRequest } from "../../shared/schemas/sight-line-setups.ts";
import { convertersFor, gradientConverter, type Converter } from "../../shared/units.ts";
import type { PlaneVector } from "../compute/plane.ts";
import type { SightAir } from "../compute/sight-line/bend-in-air.ts";
import type { SightLineInput, SightStation } from "../compute/sight-line/sight-line-input.ts";
import { readVector } from "./read-vector.ts";

type Pair = { readonly h: number; readonly v: number };
type Seen = SightLineSetupRequest["seen"];

const levelDefault = 0.95;

/** A request without faults in millimetres, all of it in the downstream view. */
export function readSightLine(request: SightLineSetupRequest): SightLineInput {
  const { units, seen, sense, level, sourceZ, stations, wanted, readingUncertainty, drift } = request;
  const { axial, offset } = convertersFor(units);
  const [first, second] = stations;
  const spotOf = (spot: Pair, view: Seen): PlaneVector => {
    const read = turned(spot, view, offset);
    return sense === "spot_on_target" ? read : { hMm: -read.hMm, vMm: -read.vMm };
  };
  const stationOf = (station: SightLineSetupRequest["stations"][number]): SightStation => ({
    zMm: axial.toMm(station.z),
    beam: spotOf(station.spot, station.seen ?? seen),
    expected: turned(station.expected ?? { h: 0, v: 0 }, station.seen ?? seen, offset),
  });
  return {
    sourceZMm: axial.toMm(sourceZ),
    stations: [stationOf(first!), stationOf(second!)],
    wantedMm: offset.toMm(wanted),
    uncertaintyMm: typeof readingUncertainty === "number" ? offset.toMm(readingUncertainty) : null,
    level: level ?? levelDefault,
    closing: drift
      ? {
          beam: spotOf(drift.closing, first!.seen ?? seen),
          allowedMm: offset.toMm(drift.allowed),
          shareOut: drift.shareOut ?? false,
        }
      : null,
    adjusterZMm: placesOf(request).map(({ z }) => axial.toMm(z)),
  };
}

/** Where the source can be moved, by name; nowhere where no adjuster is stated. */
export function placesOf({ adjuster }: SightLineSetupRequest): readonly { at: string; z: number }[] {
  if (!adjuster) return [];
  if (adjuster.kind === "shift_and_tilt") return [{ at: "pivot", z: adjuster.z }];
  return adjuster.supports.map(({ id, z }) => ({ at: id, z }));
}

/** The air across the path, as far as it is stated to reach, else to the farther station. */
export function readAir(
  { units, seen, sightPath }: SightLineSetupRequest,
  { sourceZMm, stations }: SightLineInput,
): SightAir | null {
  if (!sightPath) return null;
  const { axial } = convertersFor(units);
  const { toInside } = gradientConverter(units.temperature);
  const { gradient, length } = sightPath;
  return {
    gradient: {
      hKPerMm: toInside(seen === "upstream" ? -gradient.h : gradient.h),
      vKPerMm: toInside(gradient.v),
    },
    lengthMm:
      typeof length === "number"
        ? axial.toMm(length)
        : Math.max(...stations.map(({ zMm }) => Math.abs(zMm - sourceZMm))),
  };
}

/** From the view of the reader to the downstream view. */
function turned({ h, v }: Pair, view: Seen, offset: Converter): PlaneVector {
  return readVector({ h: view === "upstream" ? -h : h, v }, offset);
}
