import fc from "fast-check";
import type { Tolerance } from "../../server/compute/conformity/tolerance.ts";
import type {
  CostedComponent,
  FewestChoice,
  FewestMovesProblem,
  FloatingReference,
  Infeasible,
} from "../../server/compute/fewest-moves/fewest-moves-problem.ts";
import { findFewestMoves } from "../../server/compute/fewest-moves/find-fewest-moves.ts";
import type { MoveComponent, MoveStation } from "../../server/compute/moves/move-problem.ts";
import { feetAt, partOn, range, stationOff } from "./move-problems.ts";

/** A reference station where the axis may leave the one surveyed by so much to either side. */
export const floating = (stationId: string, hMm: number, vMm: number): FloatingReference => ({
  stationId,
  float: { h: range(-hMm, hMm), v: range(-vMm, vMm) },
});

export const costed = (component: MoveComponent, cost = 1): CostedComponent => ({ ...component, cost });

export function fewestProblem(
  stations: readonly MoveStation[],
  components: readonly CostedComponent[],
  rest: Partial<FewestMovesProblem> = {},
): FewestMovesProblem {
  return { stations, components, references: [], rule: "guarded", level: 0.95, marginMm: 0, ...rest };
}

export function choiceOf(problem: FewestMovesProblem): FewestChoice {
  const found = findFewestMoves(problem);
  if (!found.possible) throw new Error(`Not possible: ${JSON.stringify(found.why)}`);
  return found.choice;
}

export function reasonOf(problem: FewestMovesProblem): Infeasible {
  const found = findFewestMoves(problem);
  if (found.possible) throw new Error(`Possible at ${found.choice.cost}.`);
  return found.why;
}

export const movedIds = ({ components }: FewestChoice): string[] =>
  components.filter(({ moved }) => moved).map(({ id }) => id);

/** Ten-thousandths of a millimetre and a bit: no two choices are equally good by chance. */
const lengthMm = (leastMm: number, mostMm: number) =>
  fc.integer({ min: leastMm * 1e4, max: mostMm * 1e4 }).map((tenths) => tenths / 1e4 + 0.0000137);

const somePart = fc.record({
  off: fc.array(fc.record({ h: lengthMm(-0.25, 0.25), v: lengthMm(-0.25, 0.25) }), {
    minLength: 1,
    maxLength: 3,
  }),
  common: fc.record({ h: lengthMm(-0.2, 0.2), v: lengthMm(-0.2, 0.2) }),
  halfWidthMm: fc.constantFrom(0.08, 0.12, 0.2),
  supports: fc.integer({ min: 1, max: 2 }),
  travelMm: fc.constantFrom(null, 0.15, 0.3),
  cost: fc.constantFrom(1, 1.7, 3.1),
  fixed: fc.constantFrom(false, false, false, true),
});

/**
 * A machine of two to `partsMost` parts between two reference stations, with round tolerances or such in planes. A third
 * of it in each part: a common offset of its stations, so that moving or floating can serve.
 */
export function someFewestProblem(
  form: "radial" | "planes",
  partsMost = 5,
): fc.Arbitrary<FewestMovesProblem> {
  return fc
    .record({
      parts: fc.array(somePart, { minLength: 2, maxLength: partsMost }),
      floatMm: fc.constantFrom(0, 0.05, 0.15, 0.3),
      linked: fc.boolean(),
      references: fc.record({ h: lengthMm(-0.02, 0.02), v: lengthMm(-0.02, 0.02) }),
    })
    .map(({ parts, floatMm, linked, references }) => {
      const toleranceOf = (halfWidthMm: number, k: number): Tolerance =>
        form === "radial"
          ? { form, halfWidthMm }
          : {
              form,
              h: range(-halfWidthMm, halfWidthMm),
              v: range(-halfWidthMm, (1 + (k % 2)) * halfWidthMm),
            };
      const ends = [0, 900 * (parts.length + 1)] as const;
      const stations = [
        stationOff("first", ends[0], references.h, references.v, null, { tolerance: toleranceOf(0.35, 0) }),
      ];
      const components = parts.map(
        ({ off, common, halfWidthMm, supports, travelMm: stated, cost, fixed }, p) => {
          // Where the second part rests in the first, both state their travel.
          const travelMm = linked && p < 2 ? (stated ?? 0.4) : stated;
          const z = 500 + 900 * p;
          const own = off.map(({ h, v }, i) =>
            stationOff(`s${p}-${i}`, z + 210 * i, common.h + h / 3, common.v + v / 3, null, {
              tolerance: toleranceOf(halfWidthMm, i),
            }),
          );
          stations.push(...own);
          const travel =
            travelMm === null
              ? {}
              : { travel: { h: range(-travelMm, travelMm), v: range(-travelMm, travelMm) } };
          const made = Array.from({ length: supports }, (_, k) => feetAt(`f${k}`, z + 700 * k, travel));
          return costed(
            partOn(
              `part-${p}`,
              own.map(({ id }) => id),
              made,
              { fixed, carriedById: linked && p === 1 ? "part-0" : null },
            ),
            cost,
          );
        },
      );
      stations.push(
        stationOff("last", ends[1], -references.h, references.v, null, { tolerance: toleranceOf(0.35, 1) }),
      );
      const floats = [floating("first", floatMm, floatMm), floating("last", floatMm, floatMm)];
      return fewestProblem(stations, components, { references: floats });
    });
}
