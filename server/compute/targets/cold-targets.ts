import { stateAt, type Beam } from "../beam/beam.ts";
import { loadsOf, piecesOf } from "../beam/shaft.ts";
import { solveBeam } from "../beam/solve-beam.ts";
import { assertFinite, ComputeError } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";
import { isSamePlace, type ColdTargetInput, type Rotor, type TargetStation } from "./cold-target-input.ts";
import { growthMm } from "./growth.ts";
import { catenarySagMm } from "./wire-sag.ts";

/** The running shaft: bent by its weight in v, by its bearings alone in h. */
export interface BentRotor {
  readonly h: Beam;
  readonly v: Beam;
}

export interface StationTarget {
  /** Where the bore's centre should lie cold, relative to the axis: base less growth less closing. */
  readonly target: PlaneVector;
  /** The rotor's centre line at the station, or the bearing's place on the line. */
  readonly base: PlaneVector;
  readonly growth: PlaneVector;
  readonly closing: PlaneVector;
  /** Of each reason for growth, in the order given, mm. */
  readonly growthsMm: readonly number[];
  /** Standard, from those of the growths taken as independent; null where none is stated. */
  readonly uncertainty: PlaneVector | null;
  /** Below the wire's level chord, mm; null without a wire. */
  readonly wireSagMm: number | null;
  /** A bearing on no support of the rotor, whose line is not all 0: its own line is taken as 0. */
  readonly lineNotGiven: boolean;
}

export interface ColdTargets {
  /** In the order of the input. */
  readonly stations: readonly StationTarget[];
  readonly rotor: BentRotor | null;
}

/**
 * Cold targets of a machine's bores. A part round the rotor: target = rotor − growth − closing, the rotor bent as a beam on
 * its journals (line + running place). A bearing: target = line − growth − closing. Stations take a time logarithmic in
 * the number of sections.
 * @throws ComputeError as `solveBeam`; combination_invalid when a station follows a rotor that is not there; result_overflow
 */
export function coldTargets({ stations, rotor, wire }: ColdTargetInput): ColdTargets {
  const bent = rotor && bendRotor(rotor);
  const answered = stations.map((station, index): StationTarget => {
    const base = station.follows === "rotor" ? rotorAt(bent, station.zMm, index) : lineAt(rotor, station.zMm);
    const growthsMm = station.growths.map((growth) => assertFinite(growthMm(growth), "A growth"));
    const growth = {
      hMm: sumOf(station, growthsMm, "h"),
      vMm: sumOf(station, growthsMm, "v"),
    };
    const { closing } = station;
    return {
      target: {
        hMm: base.hMm - growth.hMm - closing.hMm,
        vMm: base.vMm - growth.vMm - closing.vMm,
      },
      base: { hMm: base.hMm, vMm: base.vMm },
      growth,
      closing,
      growthsMm,
      uncertainty: uncertaintyOf(station),
      wireSagMm: wire && catenarySagMm(wire, station.zMm),
      lineNotGiven: station.follows === "bearing_line" && lacksLine(rotor, station.zMm),
    };
  });
  return { stations: answered, rotor: bent };
}

/** Bends the shaft on its journals, in both planes; without gravity in h. @throws ComputeError as `solveBeam` */
export function bendRotor({ shaft, supports }: Rotor): BentRotor {
  const { startMm } = shaft;
  const held = (plane: "hMm" | "vMm") =>
    supports.map(({ zMm, line, running }) => ({ zMm, upMm: line[plane] + running[plane] }));
  return {
    h: solveBeam({ startMm, pieces: piecesOf(shaft, true), loads: [], supports: held("hMm") }),
    v: solveBeam({ startMm, pieces: piecesOf(shaft), loads: loadsOf(shaft), supports: held("vMm") }),
  };
}

function rotorAt(bent: BentRotor | null, zMm: number, index: number): PlaneVector {
  if (!bent) {
    const at = ["stations", index, "follows"];
    throw new ComputeError("combination_invalid", "There is no rotor for this station to follow.", { at });
  }
  return { hMm: stateAt(bent.h, zMm).upMm, vMm: stateAt(bent.v, zMm).upMm };
}

function lineAt(rotor: Rotor | null, zMm: number): PlaneVector {
  return rotor?.supports.find((support) => isSamePlace(support.zMm, zMm))?.line ?? { hMm: 0, vMm: 0 };
}

function lacksLine(rotor: Rotor | null, zMm: number): boolean {
  const supports = rotor?.supports ?? [];
  return (
    supports.some(({ line }) => line.hMm !== 0 || line.vMm !== 0) &&
    !supports.some((support) => isSamePlace(support.zMm, zMm))
  );
}

function sumOf({ growths }: TargetStation, growthsMm: readonly number[], plane: "h" | "v"): number {
  return growths.reduce((sum, { direction }, i) => (direction === plane ? sum + growthsMm[i]! : sum), 0);
}

function uncertaintyOf({ growths }: TargetStation): PlaneVector | null {
  const stated = growths.filter(({ uncertaintyMm }) => uncertaintyMm !== null);
  if (stated.length === 0) return null;
  const of = (plane: "h" | "v") =>
    Math.hypot(
      ...stated.filter(({ direction }) => direction === plane).map(({ uncertaintyMm }) => uncertaintyMm!),
    );
  return { hMm: of("h"), vMm: of("v") };
}
