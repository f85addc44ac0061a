import { assertFinite, ComputeError } from "../compute-error.ts";
import { radialMm, type PlaneVector } from "../plane.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import { judgeDrift, type SightDrift } from "./judge-drift.ts";
import type { SightLineInput, SightStation, TwoStations } from "./sight-line-input.ts";

/** The beam at a station, and what it will be. */
export interface StationSight {
  readonly role: "near" | "far";
  /** Relative to the bore's centre, with the drift taken out. */
  readonly beam: PlaneVector;
  /** Less where it should pass. */
  readonly off: PlaneVector;
  readonly within: boolean;
  /** Null where the survey is refused. */
  readonly after: PredictedSight | null;
}

export interface PredictedSight {
  readonly beam: PlaneVector;
  /** From where it should pass. */
  readonly distanceMm: number;
  readonly within: boolean;
}

/** How the source moves, as one rigid piece. */
export interface SourceMove {
  /** Of the beam at the source. */
  readonly shift: PlaneVector;
  /** mm per mm: what the beam moves further on for each unit of z. */
  readonly tilt: { readonly h: number; readonly v: number };
  /** At each place of the adjuster. */
  readonly at: readonly PlaneVector[];
}

export interface SightLineSetup {
  readonly stations: readonly [StationSight, StationSight];
  /** Null where the survey is refused. */
  readonly move: SourceMove | null;
  /** Radial expanded uncertainty of the beam at a station; null where none is stated. */
  readonly guardMm: number | null;
  readonly amplification: number;
  /** Whether the source stands between the stations, or at one. */
  readonly sourceInside: boolean;
  readonly drift: SightDrift | null;
  readonly next: "go_on" | "adjust_and_read_again" | "read_again";
}

/**
 * How far to shift and tilt the source of a line of sight so that its beam passes two bores where it should. Off by
 * d₁ and d₂ at z₁ and z₂, the source moves by δ(z) = −d₁ + (z − z₁)·(d₁ − d₂)/(z₂ − z₁): a straight line in each plane,
 * exact for lengths along z. The beam is within when |d| + U is no more than wanted, U = k₂·u with the two-dimensional
 * factor of `radialFactor` (guarded acceptance, JCGM 106:2012). Amplification √(a₁² + a₂²), a₁ = (z₂ − zₛ)/(z₂ − z₁) and
 * a₂ = 1 − a₁: how much larger the uncertainty of the shift at the source is than that of a spot. Millimetres, downstream
 * view.
 * @throws ComputeError stations_coincident; result_overflow; as `radialFactor`
 */
export function setUpSightLine(input: SightLineInput): SightLineSetup {
  const { sourceZMm, wantedMm, uncertaintyMm, level, adjusterZMm, closing } = input;
  const drift = closing && judgeDrift(input.stations, closing);
  const stations = drift ? withCorrections(input.stations, drift) : input.stations;
  const spanMm = spanOf(stations);
  const guardMm = uncertaintyMm === null ? null : radialFactor(level, null) * uncertaintyMm;
  const isWithin = (off: PlaneVector) => radialMm(off) + (guardMm ?? 0) <= wantedMm;
  const move = drift?.verdict === "refused" ? null : moveOf(stations, sourceZMm, adjusterZMm);
  const roles = rolesOf(stations, sourceZMm);
  const sightOf = (station: SightStation, role: "near" | "far"): StationSight => {
    const off = offOf(station, station.beam);
    return {
      role,
      beam: station.beam,
      off,
      within: isWithin(off),
      after: move && afterMove(station, move, sourceZMm, isWithin),
    };
  };
  const sights = [sightOf(stations[0], roles[0]), sightOf(stations[1], roles[1])] as const;
  const first = (stations[1].zMm - sourceZMm) / spanMm;
  return {
    stations: sights,
    move,
    guardMm,
    amplification: assertFinite(Math.hypot(first, 1 - first), "The amplification"),
    sourceInside: (stations[0].zMm - sourceZMm) * (stations[1].zMm - sourceZMm) <= 0,
    drift,
    next:
      move === null ? "read_again" : sights.every(({ within }) => within) ? "go_on" : "adjust_and_read_again",
  };
}

/** z₂ − z₁. */
function spanOf([first, second]: TwoStations): number {
  if (first.zMm !== second.zMm) return second.zMm - first.zMm;
  const message = "A near and a far station stand at different z.";
  throw new ComputeError("stations_coincident", message, { at: ["stations", 1, "z"] });
}

function withCorrections([first, second]: TwoStations, { corrections }: SightDrift): TwoStations {
  return [
    { ...first, beam: sum(first.beam, corrections[0]) },
    { ...second, beam: sum(second.beam, corrections[1]) },
  ];
}

/** Of two equally far from the source the first is the near one. */
function rolesOf([first, second]: TwoStations, sourceZMm: number): readonly ["near" | "far", "near" | "far"] {
  const isFirstNear = Math.abs(first.zMm - sourceZMm) <= Math.abs(second.zMm - sourceZMm);
  return isFirstNear ? ["near", "far"] : ["far", "near"];
}

function moveOf(stations: TwoStations, sourceZMm: number, adjusterZMm: readonly number[]): SourceMove {
  const [first, second] = stations;
  const spanMm = spanOf(stations);
  const [from, to] = [offOf(first, first.beam), offOf(second, second.beam)];
  const tilt = {
    h: assertFinite((from.hMm - to.hMm) / spanMm, "The tilt in h"),
    v: assertFinite((from.vMm - to.vMm) / spanMm, "The tilt in v"),
  };
  const at = (zMm: number): PlaneVector => ({
    hMm: assertFinite(tilt.h * (zMm - first.zMm) - from.hMm, "A move in h"),
    vMm: assertFinite(tilt.v * (zMm - first.zMm) - from.vMm, "A move in v"),
  });
  return { shift: at(sourceZMm), tilt, at: adjusterZMm.map(at) };
}

/** As the answered shift and tilt make it, rounding and all. */
function afterMove(
  station: SightStation,
  { shift, tilt }: SourceMove,
  sourceZMm: number,
  isWithin: (off: PlaneVector) => boolean,
): PredictedSight {
  const alongMm = station.zMm - sourceZMm;
  const beam = {
    hMm: station.beam.hMm + (shift.hMm + tilt.h * alongMm),
    vMm: station.beam.vMm + (shift.vMm + tilt.v * alongMm),
  };
  const off = offOf(station, beam);
  return { beam, distanceMm: radialMm(off), within: isWithin(off) };
}

function offOf({ expected }: SightStation, beam: PlaneVector): PlaneVector {
  return { hMm: beam.hMm - expected.hMm, vMm: beam.vMm - expected.vMm };
}

function sum(a: PlaneVector, b: PlaneVector): PlaneVector {
  return { hMm: a.hMm + b.hMm, vMm: a.vMm + b.vMm };
}
