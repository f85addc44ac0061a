import { cautions } from "../../shared/cautions.ts";
import {
  fewestMovesRequest,
  type FewestMovesRequest,
  type FewestMovesResult,
} from "../../shared/schemas/fewest-moves.ts";
import { convertersFor, type Converter, type Dimension, type Units } from "../../shared/units.ts";
import { judge } from "../compute/conformity/judge.ts";
import type {
  FewestChoice,
  FewestMovesProblem,
  Infeasible,
} from "../compute/fewest-moves/fewest-moves-problem.ts";
import { findFewestMoves } from "../compute/fewest-moves/find-fewest-moves.ts";
import { mayMove } from "../compute/fewest-moves/machine-model.ts";
import { carriersOf } from "../compute/moves/solving-order.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { fewestMovesFaults, fewestMovesFaultsBesideSchema } from "./fewest-moves-faults.ts";
import { handOver } from "./fewest-moves-handover.ts";
import { readFewestMoves } from "./fewest-moves-input.ts";
import { adviceOn, writeInfeasible } from "./fewest-moves-words.ts";
import { writeDeviation } from "./write-deviation.ts";
import { writeVector } from "./write-plane.ts";

type Converters = Record<Dimension, Converter>;

interface FewestMovesAnswer {
  readonly units: Units;
  readonly level: number;
  readonly result: FewestMovesResult;
  readonly cautions: typeof cautions;
}

/** POST /v1/fewest-moves: which parts to move, and the axis that needs the fewest of them. */
export const fewestMovesKind: CalculationKind<FewestMovesRequest, FewestMovesAnswer> = {
  kind: "fewest-moves",
  request: fewestMovesRequest,
  answer(request) {
    const faults = fewestMovesFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const convert = convertersFor(request.units);
    const problem = readFewestMoves(request, convert);
    const found = findFewestMoves(problem);
    const result = found.possible
      ? writeChoice(request, problem, found.choice, convert)
      : writeNoChoice(request, problem, found.why, convert);
    return { units: request.units, level: problem.level, result, cautions };
  },
  isLong: () => true,
  faultsBesideSchema: fewestMovesFaultsBesideSchema,
};

function writeChoice(
  request: FewestMovesRequest,
  problem: FewestMovesProblem,
  choice: FewestChoice,
  convert: Converters,
): FewestMovesResult {
  const { axial, offset } = convert;
  const { method, proved, betterBy, cuts, tied } = choice.search;
  const shimMoves = handOver(request, choice, convert);
  const moved = stationsMoved(problem, choice);
  const line = ({ at0Mm, slope }: FewestChoice["axis"]["h"]) => ({
    at0: offset.fromMm(at0Mm),
    slope: offset.fromMm(slope * axial.toMm(1)),
  });
  return {
    cost: choice.cost,
    axis: {
      float: choice.axis.atReferences.map(({ stationId, ...at }) => ({
        id: stationId,
        ...writeVector(at, offset),
      })),
      h: line(choice.axis.h),
      v: line(choice.axis.v),
    },
    components: choice.components.map(({ id, moved: moves, fixed, moves: at }) => ({
      id,
      moved: moves,
      fixed,
      moves: at.map(({ supportId, ...move }) => ({ support: supportId, ...writeVector(move, offset) })),
    })),
    predicted: choice.predicted.map(({ id, deviation, verdict }) => ({
      id,
      deviation: writeDeviation(deviation, offset),
      verdict,
    })),
    remeasure:
      moved.length === 0
        ? []
        : [...new Set([...problem.references.map(({ stationId }) => stationId), ...moved])],
    search: { method, proved, gap: betterBy, cuts, tied },
    infeasible: null,
    shimMoves,
    advice: adviceOn(request, choice, shimMoves, moved),
  };
}

/** Nothing moves and the axis stays: every station as it was found, and why that cannot be mended. */
function writeNoChoice(
  request: FewestMovesRequest,
  problem: FewestMovesProblem,
  why: Infeasible,
  { offset }: Converters,
): FewestMovesResult {
  const { stations, references, components, level, rule } = problem;
  return {
    cost: null,
    axis: {
      float: references.map(({ stationId }) => ({ id: stationId, h: 0, v: 0 })),
      h: { at0: 0, slope: 0 },
      v: { at0: 0, slope: 0 },
    },
    components: components.map((component) => ({
      id: component.id,
      moved: false,
      fixed: !mayMove(problem, component),
      moves: component.supports.map(({ id }) => ({ support: id, h: 0, v: 0 })),
    })),
    predicted: stations.map(({ id, deviation, covariance, dof, tolerance }) => {
      const applied = covariance ? rule : "simple";
      const input = { deviation, covariance, dof, level, rule: applied } as const;
      const verdict = tolerance && judge({ ...input, tolerance }).verdict;
      return { id, deviation: writeDeviation(deviation, offset), verdict };
    }),
    remeasure: [],
    search: null,
    infeasible: writeInfeasible(request, problem, why, offset),
    shimMoves: null,
    advice: [],
  };
}

/** Ids of the stations that follow a part moved, in the order sent. */
function stationsMoved({ stations, components }: FewestMovesProblem, choice: FewestChoice): string[] {
  const moved = new Set(
    components.flatMap(({ stationIds }, index) =>
      [index, ...carriersOf(components, index)].some((each) => choice.components[each]!.moved)
        ? stationIds
        : [],
    ),
  );
  return stations.map(({ id }) => id).filter((id) => moved.has(id));
}
