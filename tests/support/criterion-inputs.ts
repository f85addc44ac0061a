import { ComputeError } from "../../server/compute/compute-error.ts";
import type { WallFit } from "../../server/compute/bore/bore-fit.ts";
import {
  fitByCriterion,
  type CriterionInput,
  type CriterionMethod,
} from "../../server/compute/bore/fit-criterion.ts";
import { pairsInput } from "./bore-inputs.ts";
import type { Pair } from "./limiting-oracles.ts";
import { seededRandom } from "./seeded-random.ts";

/** Points of every kind: bores, arcs, ovals, and what no bore ever looks like. */
export const pointKinds = ["ring", "rough", "arc", "short arc", "oval", "lobed", "cloud", "grid"] as const;
export type PointKind = (typeof pointKinds)[number];

/** `count` points of a kind about (3, −7), 100 in radius or 10 in extent. */
export function pointsOfKind(kind: PointKind, count: number, seed: number): Pair[] {
  const random = seededRandom(seed);
  const about = (radius: number, angle: number): Pair => [
    3 + radius * Math.cos(angle),
    -7 + radius * Math.sin(angle),
  ];
  return Array.from({ length: count }, (_, i): Pair => {
    const turn = (2 * Math.PI * i) / count;
    switch (kind) {
      case "ring":
        return about(100 + 0.1 * random.normal(), turn);
      case "rough":
        return about(100 + 15 * random.normal(), turn);
      case "arc":
        return about(100 + 0.1 * random.normal(), turn / 3);
      case "short arc":
        return about(100 + 0.01 * random.normal(), turn / 18);
      case "oval":
        return about(100 + 3 * Math.cos(2 * turn) + 0.02 * random.normal(), turn);
      case "lobed":
        return about(100 + 3 * Math.cos(3 * turn), turn);
      case "cloud":
        return [10 * random.uniform(), 10 * random.uniform()];
      case "grid":
        return [Math.floor(5 * random.uniform()), Math.floor(5 * random.uniform())];
    }
  });
}

/** The fit of plain points, or the code of its refusal. */
export function fitPairs(
  pairs: readonly Pair[],
  method: CriterionMethod,
  rest: Parameters<typeof pairsInput>[1] = {},
): WallFit | string {
  return fitOrCode(pairsInput(pairs, rest), method);
}

/** The fit, or the code of its refusal; another error fails the test. */
export function fitOrCode(input: CriterionInput, method: CriterionMethod): WallFit | string {
  try {
    return fitByCriterion(input, method);
  } catch (error) {
    if (error instanceof ComputeError) return error.code;
    throw error;
  }
}

export const centreOf = ({ centre }: WallFit): Pair => [centre.hMm, centre.vMm];
export const codesOf = ({ warnings }: WallFit) => warnings.map(({ code }) => code);
