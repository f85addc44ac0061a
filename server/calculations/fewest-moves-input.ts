import type { FewestMovesRequest, FloatingReferenceRequest } from "../../shared/schemas/fewest-moves.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { PlaneTolerance } from "../compute/conformity/tolerance.ts";
import type { FewestMovesProblem, FloatingReference } from "../compute/fewest-moves/fewest-moves-problem.ts";
import { readComponent, readMoveStation } from "./shim-move-input.ts";

const levelDefault = 0.95;
const costDefault = 1;

/** A request as sent, in millimetres, with every default filled in. */
export function readFewestMoves(
  { stations, reference = [], components, verdict, level, margin }: FewestMovesRequest,
  convert: Record<Dimension, Converter>,
): FewestMovesProblem {
  return {
    stations: stations.map((station) => readMoveStation(station, convert)),
    references: reference.map((each) => readReference(each, convert.offset)),
    components: components.map(({ cost, ...component }) => ({
      ...readComponent(component, convert),
      cost: cost ?? costDefault,
    })),
    rule: verdict?.rule ?? "guarded",
    level: level ?? levelDefault,
    marginMm: convert.offset.toMm(margin ?? 0),
  };
}

function readReference({ id, float }: FloatingReferenceRequest, offset: Converter): FloatingReference {
  const range = (sent: readonly number[] | undefined): PlaneTolerance =>
    sent ? { minMm: offset.toMm(sent[0]!), maxMm: offset.toMm(sent[1]!) } : { minMm: 0, maxMm: 0 };
  return { stationId: id, float: { h: range(float?.h), v: range(float?.v) } };
}
