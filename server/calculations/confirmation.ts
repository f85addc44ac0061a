import { cautions } from "../../shared/cautions.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import { confirmationRequest, type ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import { convertersFor, type Units } from "../../shared/units.ts";
import { findOutstanding } from "../compute/confirmation/find-outstanding.ts";
import { judgeReference } from "../compute/confirmation/judge-reference.ts";
import { changeOf } from "../compute/confirmation/survey-change.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { confirmationFaults, confirmationFaultsBesideSchema } from "./confirmation-faults.ts";
import {
  movedIdsOf,
  pairSurveys,
  readLog,
  readPlan,
  type PairedSurveys,
  type Plan,
} from "./confirmation-input.ts";
import { movedAnswer, referenceAnswer, unmovedAnswer, type Look } from "./confirmation-stations.ts";
import { verdictsAfter } from "./confirmation-verdicts.ts";
import { confirmationWarnings } from "./confirmation-words.ts";

interface ConfirmationAnswer {
  readonly units: Units;
  readonly level: number;
  readonly result: ConfirmationResult;
  readonly cautions: typeof cautions;
}

const levelDefault = 0.95;
/** What a rigid part may be off a plan before it is told: the misfit that shims may leave (common practice). */
const misfitMaxMm = 0.02;
/** Reference stations that are judged in less time than a thread takes to be worth it. */
const referencesInPlace = 200;

/** POST /v1/confirmations: whether a later survey repeats an earlier one where it should, and what moved elsewhere. */
export const confirmationKind: CalculationKind<ConfirmationRequest, ConfirmationAnswer> = {
  kind: "confirmation",
  request: confirmationRequest,
  answer(request) {
    const faults = confirmationFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const level = request.level ?? levelDefault;
    return { units: request.units, level, result: confirm(request, level), cautions };
  },
  isLong: ({ reference }) => (reference ?? []).length > referencesInPlace,
  faultsBesideSchema: confirmationFaultsBesideSchema,
};

function confirm(request: ConfirmationRequest, level: number): ConfirmationResult {
  const convert = convertersFor(request.units);
  const surveys = pairSurveys(request, convert);
  const plan = readPlan(request, surveys.zMmOf, convert);
  const movedIds = movedIdsOf(request);
  const named = request.reference ?? [];
  const comparedAt = new Map(surveys.comparedIds.map((id, index) => [id, index]));
  const usable = named.filter((id) => comparedAt.has(id) && !movedIds.has(id));
  const judged = judgeReference({
    changes: surveys.compared.map(changeOf),
    reference: usable.map((id) => comparedAt.get(id)!),
    someMissing: usable.length < named.length,
    sameSetUp: request.sameSetUp,
    level,
  });
  const look: Look = { convert, comparedAt, frame: judged.frame, level };
  const planned = new Set([...movedIds, ...plan.plannedOf.keys()]);
  const moved = surveys.ids.filter((id) => planned.has(id)).map((id) => movedAnswer(id, plan, look));
  const unmoved = surveys.comparedIds
    .filter((id) => !planned.has(id) && !named.includes(id))
    .map((id) => unmovedAnswer(id, look));
  const toldApart = judged.moved.map((index) => surveys.comparedIds[index]!);
  const { verdicts, noAxis } = verdictsAfter(
    request,
    usable.filter((id) => !toldApart.includes(id)),
  );
  const outstanding = outstandingOf(request, surveys, plan, movedIds);
  const failing = judged.perStation.flatMap(({ test }, i) => (test?.within === false ? [usable[i]!] : []));
  const unexpected = new Set([
    // Where it cannot be told which reference station moved, but the set-up did not, all that changed are named.
    ...(request.sameSetUp && judged.cause === "undetermined" ? failing : toldApart),
    ...unmoved.filter(({ changed }) => changed).map(({ id }) => id),
    ...moved
      .filter(({ planned: by, agrees }) => by?.h === 0 && by.v === 0 && agrees === false)
      .map(({ id }) => id),
  ]);
  return {
    frame: judged.frame.line ? "reference" : "fixed",
    reference: referenceAnswer(judged, usable, toldApart, convert),
    moved,
    unmoved,
    unexpected: surveys.ids.filter((id) => unexpected.has(id)),
    outstanding,
    verdicts,
    warnings: confirmationWarnings({
      notices: named.length === 0 ? [] : judged.notices,
      cause: judged.cause,
      sameSetUp: request.sameSetUp,
      namesReference: named.length > 0,
      missingReference: named.filter((id) => !comparedAt.has(id)),
      movedReference: named.filter((id) => movedIds.has(id)),
      toldApart,
      staleReference: outstanding.filter((id) => usable.includes(id)),
      untested: [...unmoved.filter(({ changed }) => changed === null).map(({ id }) => id)],
      notInBoth: moved.filter(({ achieved }) => achieved === null).map(({ id }) => id),
      unplanned: moved.filter(({ planned: by }) => by === null).map(({ id }) => id),
      unlogged: unloggedOf(request, plan),
      bent: plan.misfits
        .filter(({ misfitMm }) => misfitMm > misfitMaxMm)
        .map(({ componentId }) => componentId),
      noAxis,
    }),
  };
}

function outstandingOf(
  request: ConfirmationRequest,
  { ids, measuredAfter }: PairedSurveys,
  { plannedOf }: Plan,
  movedIds: ReadonlySet<string>,
): string[] {
  return findOutstanding({
    referenceIds: request.reference ?? [],
    stationIds: ids,
    plannedIds: new Set([...plannedOf.keys()].filter((id) => movedIds.has(id))),
    measuredIds: measuredAfter,
    events: readLog(request),
  });
}

/** Stations that were to move, by a log that has moves and none of theirs. */
function unloggedOf(request: ConfirmationRequest, { plannedOf }: Plan): string[] {
  if (!request.log || request.log.length === 0) return [];
  const logged = movedIdsOf({ ...request, moves: [] });
  const toMove = movedIdsOf({ ...request, log: [] });
  return [...plannedOf.keys()].filter((id) => toMove.has(id) && !logged.has(id));
}
