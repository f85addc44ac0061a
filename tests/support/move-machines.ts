import fc from "fast-check";
import type { PlaneTolerance, Tolerance } from "../../server/compute/conformity/tolerance.ts";
import type {
  MoveComponent,
  MoveProblem,
  MoveStation,
  MoveSupport,
  ShimStack,
} from "../../server/compute/moves/move-problem.ts";
import {
  feetAt,
  jointKeysAt,
  moveProblem,
  padsAt,
  partOn,
  range,
  stackOf,
  stationOff,
  unlimited,
} from "./move-problems.ts";

/** Micrometres and tenths: no two choices are equally good by chance, as they are for round numbers. */
const lengthMm = (leastMm: number, mostMm: number) =>
  fc.integer({ min: leastMm * 1e4, max: mostMm * 1e4 }).map((tenths) => tenths / 1e4 + 0.0000137);
const offset = lengthMm(-0.4, 0.4);

const someStack = fc
  .record({
    pieces: fc.constantFrom<readonly number[] | null>([3], [2, 0.5], [0], null),
    limited: fc.boolean(),
    down: lengthMm(0.01, 0.3),
    up: lengthMm(0.01, 0.3),
  })
  .map(({ pieces, limited, down, up }): ShimStack => {
    const thick = pieces?.reduce((sum, piece) => sum + piece, 0) ?? 4.2;
    const piecesMm = thick === 0 ? [] : pieces;
    if (!limited) return stackOf(thick, { piecesMm });
    return stackOf(thick, { piecesMm, minMm: Math.max(0, thick - down), maxMm: thick + up });
  });

const travel = fc
  .record({
    limited: fc.boolean(),
    down: lengthMm(0, 0.3),
    up: lengthMm(0, 0.3),
  })
  .map(({ limited, down, up }) => (limited ? range(-down, up) : unlimited));

type MakeSupport = (id: string, zMm: number) => MoveSupport;

const someSupport: fc.Arbitrary<MakeSupport> = fc
  .record({
    form: fc.constantFrom("feet", "keyed", "inside", "joint", "pads", "pads-around"),
    stack: someStack,
    key: someStack,
    h: travel,
    v: travel,
    blocked: fc.constantFrom([], [], [], ["h"] as const, ["v"] as const),
  })
  .map(({ form, stack, key, h, v, blocked }) => (id, zMm) => {
    const rest = { travel: { h, v }, blocked };
    const feet = { left: stack, right: stack };
    const keyed = { ...feet, "key-left": key, "key-right": key };
    switch (form) {
      case "feet":
        return feetAt(id, zMm, { ...rest, stacks: feet });
      case "keyed":
        return feetAt(id, zMm, { ...rest, stacks: keyed });
      case "inside":
        return feetAt(id, zMm, { ...rest, stacks: keyed, keys: "inside" });
      case "joint":
        return jointKeysAt(id, zMm, {
          ...rest,
          // One cheek's stack has no mirror image: nothing may stop it.
          stacks: { "key-left": stack, "key-right": stack, "key-bottom": stackOf(9) },
        });
      // Pads blocked in one plane answer to the other only within a misfit, and in more than one equally good way.
      case "pads":
        return padsAt(id, zMm, [135, 225], stack, { travel: rest.travel });
      default: {
        const around = padsAt(id, zMm, [130, 220, 45, 315], stack, { travel: rest.travel });
        // Upper pads that can always follow: one that cannot leaves a misfit, which the next move would not know of.
        const pads = around.pads.map((pad, k) => (k < 2 ? pad : { ...pad, stack: stackOf(9) }));
        return { ...around, pads };
      }
    }
  });

const somePart = fc.record({
  kind: fc.constantFrom("casing", "shroud", "bearing" as const),
  /** Stations 2 to 3 and supports 1 to 2: the stations determine every way of moving. */
  stations: fc.array(
    fc.record({ h: offset, v: offset, tolerance: fc.constantFrom(0.03, 0.05, 0.1), oneSided: fc.boolean() }),
    { minLength: 2, maxLength: 3 },
  ),
  supports: fc.array(someSupport, { minLength: 1, maxLength: 2 }),
});

/** A machine of one to three parts, with an indicator on each and a reference station on none of them. */
export function someMachine(cutIncrementMm: number | null): fc.Arbitrary<MoveProblem> {
  return fc.array(somePart, { minLength: 1, maxLength: 3 }).map((parts) => {
    const stations: MoveStation[] = [stationOff("reference", -900, 0, 0)];
    const components = parts.map(({ kind, stations: off, supports }, p): MoveComponent => {
      const z0 = p * 2500;
      const own = off.map(({ h, v, tolerance, oneSided }, i) =>
        stationOff(`s${p}-${i}`, z0 + 210 + i * 517, h, v, tolerance, {
          ...(oneSided
            ? { tolerance: { form: "planes", h: range(-tolerance, 2 * tolerance), v: range(0, tolerance) } }
            : {}),
        }),
      );
      stations.push(...own);
      const made = supports.map((make, k) => make(`f${p}-${k}`, z0 + k * 1430));
      return partOn(
        `part-${p}`,
        own.map(({ id }) => id),
        made,
        { kind },
      );
    });
    return moveProblem(stations, components, {
      referenceIds: ["reference"],
      cutIncrementMm,
      maximumIncrementMm: 0.1,
      indicators: components.map(({ id }, p) => ({
        id: `di-${id}`,
        componentId: id,
        zMm: p * 2500 + 700,
        clockDeg: 30,
        contact: "outside",
      })),
    });
  });
}

/** How a problem is told anew: z along the machine, every offset by a factor, or seen in a mirror (h reversed). */
export interface Retelling {
  readonly z?: (zMm: number) => number;
  readonly factor?: number;
  readonly mirrored?: boolean;
}

const swapped: Readonly<Record<string, string>> = {
  left: "right",
  right: "left",
  "key-left": "key-right",
  "key-right": "key-left",
};

export const mirroredPlace = (place: string): string => swapped[place] ?? place;

export function retell(problem: MoveProblem, { z = (mm) => mm, factor = 1, mirrored = false }: Retelling) {
  const turn = mirrored ? -1 : 1;
  const span = ({ minMm, maxMm }: PlaneTolerance, sign: number): PlaneTolerance =>
    sign > 0 ? range(minMm * factor, maxMm * factor) : range(-maxMm * factor, -minMm * factor);
  const tolerance = (one: Tolerance | null): Tolerance | null =>
    one?.form === "radial"
      ? { ...one, halfWidthMm: one.halfWidthMm * factor }
      : one && { form: "planes", h: span(one.h, turn), v: span(one.v, 1) };
  const stack = (one: ShimStack): ShimStack => ({
    thicknessMm: one.thicknessMm * factor,
    minMm: one.minMm * factor,
    maxMm: one.maxMm * factor,
    maxCount: one.maxCount,
    piecesMm: one.piecesMm?.map((piece) => piece * factor) ?? null,
  });
  const stacks = <T extends object>(all: T): T =>
    Object.fromEntries(
      Object.entries(all).map(([place, one]) => [
        mirrored ? mirroredPlace(place) : place,
        stack(one as ShimStack),
      ]),
    ) as T;
  const support = (one: MoveSupport): MoveSupport => {
    const at = { zMm: z(one.zMm), travel: { h: span(one.travel.h, turn), v: span(one.travel.v, 1) } };
    return one.form === "pads"
      ? {
          ...one,
          ...at,
          pads: one.pads.map((pad) => ({ ...pad, clockDeg: turn * pad.clockDeg, stack: stack(pad.stack) })),
        }
      : one.form === "feet"
        ? { ...one, ...at, stacks: stacks(one.stacks) }
        : { ...one, ...at, stacks: stacks(one.stacks) };
  };
  return {
    ...problem,
    stations: problem.stations.map((one) => ({
      ...one,
      zMm: z(one.zMm),
      deviation: { hMm: one.deviation.hMm * factor * turn, vMm: one.deviation.vMm * factor },
      tolerance: tolerance(one.tolerance),
    })),
    components: problem.components.map((one) => ({ ...one, supports: one.supports.map(support) })),
    cutIncrementMm: problem.cutIncrementMm === null ? null : problem.cutIncrementMm * factor,
    maximumMisfitMm: problem.maximumMisfitMm * factor,
    maximumIncrementMm: problem.maximumIncrementMm === null ? null : problem.maximumIncrementMm * factor,
    indicators: problem.indicators.map((one) => ({ ...one, zMm: z(one.zMm), clockDeg: turn * one.clockDeg })),
  };
}
