import { cautions } from "../../shared/cautions.ts";
import {
  shimMoveRequest,
  type ShimMoveRequest,
  type ShimMoveResult,
} from "../../shared/schemas/shim-moves.ts";
import { convertersFor, type Converter, type Dimension, type Units } from "../../shared/units.ts";
import type { PlaneVector } from "../compute/plane.ts";
import type { ComponentMove, MovePlan, StackChange, Step, SupportMove } from "../compute/moves/move-plan.ts";
import type { Tilt } from "../compute/moves/tilt.ts";
import type { ChoiceSearch } from "../compute/moves/shared-choice.ts";
import { solveMoves } from "../compute/moves/solve-moves.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { attempt } from "./collect-faults.ts";
import { adviceInWords, wordingFor, writeUnreachable, type Wording } from "./move-words.ts";
import { shimMoveFaults, shimMoveFaultsBesideSchema } from "./shim-move-faults.ts";
import { readMoveProblem } from "./shim-move-input.ts";
import { writeDeviation } from "./write-deviation.ts";

type Converters = Record<Dimension, Converter>;

interface ShimMoveAnswer {
  readonly units: Units;
  readonly level: number;
  readonly result: ShimMoveResult;
  readonly cautions: typeof cautions;
}

/** POST /v1/shim-moves: what every support and stack changes, in which order, and where every station then lies. */
export const shimMoveKind: CalculationKind<ShimMoveRequest, ShimMoveAnswer> = {
  kind: "shim-move",
  request: shimMoveRequest,
  answer(request) {
    const faults = shimMoveFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const convert = convertersFor(request.units);
    const problem = readMoveProblem(request, convert);
    const plan = solveMoves(problem, (order, solve) => {
      const attempts = order.map((index) => attempt(["components", index], () => solve(index)));
      const refused = attempts.flatMap(({ faults: found }) => found);
      if (refused.length > 0) throw new CalculationRefusal(refused);
      return attempts.flatMap(({ results }) => results);
    });
    const result = writePlan(plan, wordingFor(request, convert.offset), convert);
    return { units: request.units, level: problem.level, result, cautions };
  },
  isLong: ({ shims, objective }) => Boolean(shims?.cutToSize ?? shims?.stock) || objective === "minimax",
  faultsBesideSchema: shimMoveFaultsBesideSchema,
};

function writePlan(plan: MovePlan, wording: Wording, convert: Converters): ShimMoveResult {
  const { offset } = convert;
  return {
    components: plan.components.map((component, index) => writeComponent(component, index, wording, convert)),
    predicted: plan.predicted.map(({ id, deviation, verdict }) => ({
      id,
      deviation: writeDeviation(deviation, offset),
      verdict,
    })),
    steps: plan.steps.map((step) => writeStep(step, offset)),
    remeasure: [...plan.remeasureIds],
    ...(plan.search ? { search: writeSearch(plan.search) } : {}),
    advice: plan.advice.map((advice) => ({ code: advice.code, detail: adviceInWords(wording, advice) })),
  };
}

const writeSearch = ({ method, proved, betterBy }: ChoiceSearch) => ({ method, proved, gap: betterBy });

function writeComponent(
  { id, fixed, ideal, realised, stacks, tilt, roll, unreachable }: ComponentMove,
  index: number,
  wording: Wording,
  { axial, offset }: Converters,
): ShimMoveResult["components"][number] {
  const slopes = ({ h, v }: Tilt) => ({
    h: offset.fromMm(h * axial.toMm(1)),
    v: offset.fromMm(v * axial.toMm(1)),
  });
  return {
    id,
    fixed,
    moves: ideal.map((move) => writeMove(move, offset)),
    realised: realised.map((move) => writeMove(move, offset)),
    stacks: stacks.map((stack) => writeStack(stack, offset)),
    ...(tilt ? { tilt: { found: slopes(tilt.found), predicted: slopes(tilt.predicted) } } : {}),
    ...(roll
      ? {
          roll: {
            found: roll.foundRadians,
            predicted: roll.predictedRadians,
            boreShift: writeVector(roll.boreShift, offset),
          },
        }
      : {}),
    ...(unreachable ? { unreachable: writeUnreachable(wording, index, unreachable) } : {}),
  };
}

function writeStack(
  { supportId, place, idealMm, changeMm, fromMm, toMm, addMm, removeMm, misfitMm }: StackChange,
  offset: Converter,
): ShimMoveResult["components"][number]["stacks"][number] {
  return {
    support: supportId,
    place,
    ideal: offset.fromMm(idealMm),
    change: offset.fromMm(changeMm),
    from: offset.fromMm(fromMm),
    to: offset.fromMm(toMm),
    add: addMm.map((piece) => offset.fromMm(piece)),
    remove: removeMm.map((piece) => offset.fromMm(piece)),
    misfit: offset.fromMm(misfitMm),
  };
}

function writeStep(
  { order, componentId, increments, watch }: Step,
  offset: Converter,
): ShimMoveResult["steps"][number] {
  return {
    order,
    component: componentId,
    increments: increments.map(({ moves, readings }) => ({
      moves: moves.map((move) => writeMove(move, offset)),
      indicators: readings.map(({ indicatorId, readingMm }) => ({
        id: indicatorId,
        reading: offset.fromMm(readingMm),
      })),
    })),
    watch: watch.map(({ stationId, change, stopAt }) => ({
      station: stationId,
      change: writeVector(change, offset),
      stopAt: {
        h: [offset.fromMm(stopAt.h.minMm), offset.fromMm(stopAt.h.maxMm)],
        v: [offset.fromMm(stopAt.v.minMm), offset.fromMm(stopAt.v.maxMm)],
      },
    })),
  };
}

function writeMove(
  { supportId, ...move }: SupportMove,
  offset: Converter,
): { support: string; h: number; v: number } {
  return { support: supportId, ...writeVector(move, offset) };
}

function writeVector({ hMm, vMm }: PlaneVector, offset: Converter): { h: number; v: number } {
  return { h: offset.fromMm(hMm), v: offset.fromMm(vMm) };
}
