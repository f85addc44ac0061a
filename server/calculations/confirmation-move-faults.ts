import type { Fault } from "../../shared/error-codes.ts";
import type {
  ConfirmationComponent,
  ConfirmationRequest,
  LogEntryRequest,
  PlannedMoveRequest,
  SurveyStationRequest,
} from "../../shared/schemas/confirmations.ts";
import { combinationInvalid, unknownReference } from "./common-faults.ts";
import { carriersOf } from "./confirmation-input.ts";

interface ReadableSurvey {
  readonly ids: readonly (string | null)[];
  readonly stations: readonly (SurveyStationRequest | null)[];
}

/** What could be read of a body: all of it when it passed the schema, the sound parts when it did not (null elsewhere). */
export interface Readable {
  readonly before: ReadableSurvey;
  readonly after: ReadableSurvey;
  readonly components: readonly (ConfirmationComponent | null)[];
  readonly moves: readonly (PlannedMoveRequest | null)[];
  readonly log: readonly (LogEntryRequest | null)[];
  readonly reference: readonly string[];
  readonly sameSetUp: boolean | null;
  readonly axis: ConfirmationRequest["axis"];
}

/** A planned move is of a known station, or of a known component at one of its supports: each once, and all of them. */
export function moveFaults({ moves, components }: Readable, known: ReadonlySet<string | null>): Fault[] {
  const whole = components.flatMap((component) => component ?? []);
  if (whole.length < components.length) return [];
  const seen = new Set<string>();
  const faults = moves.flatMap((move, index) => {
    if (!move) return [];
    const at = ["moves", index];
    const { station, component, support } = move;
    if ((station === undefined) === (component === undefined && support === undefined)) {
      return [combinationInvalid(at, "A move is of a station, or of a component at one of its supports.")];
    }
    const key = JSON.stringify([station, component, support]);
    if (seen.has(key)) return [combinationInvalid(at, "The same move stands earlier in the list.")];
    seen.add(key);
    if (station === undefined) return supportFaults(component, support, whole, at);
    if (!known.has(station)) return [unknownReference([...at, "station"], "survey")];
    const part = whole.find(({ stations = [] }) => stations.includes(station));
    const isMoved =
      part && carriersOf(part.id, whole).some((id) => moves.some((one) => one?.component === id));
    return isMoved
      ? [combinationInvalid(at, "The station's component has a planned move as well: state one.")]
      : [];
  });
  return moves.some((move) => move === null) ? faults : [...faults, ...halfMoved(moves, whole)];
}

function supportFaults(
  component: string | undefined,
  support: string | undefined,
  components: readonly ConfirmationComponent[],
  at: readonly PropertyKey[],
): Fault[] {
  if (component === undefined) return [combinationInvalid(at, "A support is named with its component.")];
  if (support === undefined) return [combinationInvalid(at, "A component moves at its supports: name one.")];
  const part = components.find(({ id }) => id === component);
  if (!part) return [unknownReference([...at, "component"], "component")];
  const isKnown = (part.supports ?? []).some(({ id }) => id === support);
  return isKnown ? [] : [unknownReference([...at, "support"], "support of the component")];
}

/** A component that moves at some of its supports only: what it does at the others is not known. */
function halfMoved(
  moves: readonly (PlannedMoveRequest | null)[],
  components: readonly ConfirmationComponent[],
): Fault[] {
  return components.flatMap(({ id, supports = [] }) => {
    const moving = new Set(moves.flatMap((move) => (move?.component === id ? [move.support] : [])));
    const still = supports.filter((support) => !moving.has(support.id));
    if (moving.size === 0 || still.length === 0) return [];
    const names = still.map((support) => support.id).join(", ");
    return [
      combinationInvalid(
        ["moves"],
        `${id} has a planned move at some supports, none at ${names}: state 0 there.`,
      ),
    ];
  });
}

/** An entry of the log is about a known station, or a known component. */
export function logFaults({ log, components }: Readable, known: ReadonlySet<string | null>): Fault[] {
  const whole = components.flatMap((component) => component ?? []);
  const parts = new Set(whole.map(({ id }) => id));
  return log.flatMap((entry, index) => {
    if (!entry) return [];
    const { station, component } = entry;
    if ((station === undefined) === (component === undefined)) {
      return [combinationInvalid(["log", index], "An entry is about a station, or about a component.")];
    }
    if (station !== undefined) {
      return known.has(station) ? [] : [unknownReference(["log", index, "station"], "survey")];
    }
    if (parts.has(component ?? "") || whole.length < components.length) return [];
    return [unknownReference(["log", index, "component"], "component")];
  });
}
