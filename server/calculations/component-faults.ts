import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { ComponentRequest, StackRequest, SupportRequest } from "../../shared/schemas/move-components.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import { combinationInvalid, duplicates, unknownReference } from "./common-faults.ts";
import { rollFaults, tiltFaults } from "./linkage-faults.ts";

type Path = readonly PropertyKey[];

/** What a component is held against: the stations of the call and which of them set the axis. */
interface Known {
  readonly stationIds: ReadonlySet<string | null>;
  readonly reference: readonly string[];
  /** z of the stations that were sent well. */
  readonly zOf: ReadonlyMap<string, number>;
}

/** Pieces add up to their pack within this and within a billionth of it: far below any gauge, far above rounding. */
const sumSlackMm = 1e-6;

/** Everything that is wrong with one component: its stations, its supports, its stacks, its tilt and roll. */
export function componentFaults(
  component: ComponentRequest,
  index: number,
  known: Known,
  { offset }: Record<Dimension, Converter>,
): Fault[] {
  const at: Path = ["components", index];
  const { stations = [], supports = [] } = component;
  return [
    ...duplicates(stations, (k) => [...at, "stations", k]),
    ...stations.flatMap((id, k) =>
      known.stationIds.has(id) ? [] : [unknownReference([...at, "stations", k], "station")],
    ),
    ...(supports.length === 0 && mayMove(component, known) ? [noSupport(at)] : []),
    ...duplicates(
      supports.map(({ id }) => id),
      (k) => [...at, "supports", k, "id"],
    ),
    ...supports.flatMap((support, k) => supportFaults(support, [...at, "supports", k], offset)),
    ...tiltFaults(component, at, known.zOf),
    ...rollFaults(component, at),
  ];
}

/** A station belongs to one component: every further claim on it is a fault. */
export function stationsSharedFaults(components: readonly (ComponentRequest | null)[]): Fault[] {
  const owner = new Map<string, number>();
  return components.flatMap((component, index) =>
    (component?.stations ?? []).flatMap((id, k) => {
      const first = owner.get(id) ?? index;
      owner.set(id, first);
      if (first === index) return [];
      const detail = `A station belongs to one component; this one is listed at ${pointerOf(["components", first])} too.`;
      return [combinationInvalid(["components", index, "stations", k], detail)];
    }),
  );
}

function mayMove(
  { fixed, allowReferenceMove, stations = [] }: ComponentRequest,
  { reference }: Known,
): boolean {
  return !fixed && (allowReferenceMove === true || !stations.some((id) => reference.includes(id)));
}

function noSupport(at: Path): Fault {
  return {
    pointer: pointerOf([...at, "supports"]),
    code: "supports_insufficient",
    detail: "A component that may move rests on one support or more.",
  };
}

function supportFaults(support: SupportRequest, at: Path, offset: Converter): Fault[] {
  const travel = (["h", "v"] as const).flatMap((plane) => {
    const range = support.travel?.[plane];
    if (!range || range[0]! <= range[1]!) return [];
    return [combinationInvalid([...at, "travel", plane], "The least travel is not above the most.")];
  });
  if (support.form === "pads") {
    return [
      ...travel,
      ...duplicates(
        support.pads.map(({ id }) => id),
        (k) => [...at, "pads", k, "id"],
      ),
      ...support.pads.flatMap(({ stack }, k) => stackFaults(stack, [...at, "pads", k, "stack"], offset)),
    ];
  }
  const stacks: Readonly<Record<string, StackRequest | undefined>> = support.stacks ?? {};
  const pair = support.form === "feet" ? (["left", "right"] as const) : (["key-left", "key-right"] as const);
  return [
    ...travel,
    ...pairFaults(stacks, pair, [...at, "stacks"]),
    ...Object.entries(stacks).flatMap(([place, stack]) =>
      stack ? stackFaults(stack, [...at, "stacks", place], offset) : [],
    ),
  ];
}

/** The two that carry the height are shimmed together, or the part would roll. */
function pairFaults(
  stacks: Readonly<Record<string, StackRequest | undefined>>,
  [left, right]: readonly [string, string],
  at: Path,
): Fault[] {
  if ((stacks[left] === undefined) === (stacks[right] === undefined)) return [];
  const [present, absent] = stacks[left] ? [left, right] : [right, left];
  return [combinationInvalid(at, `${present} is given without ${absent}: send both or neither.`)];
}

function stackFaults({ thickness, min, max, shims }: StackRequest, at: Path, offset: Converter): Fault[] {
  const faults: Fault[] = [];
  if (max !== null && max !== undefined && max < (min ?? 0)) {
    faults.push(combinationInvalid([...at, "max"], "The most thickness is not below the least."));
  }
  if (shims) {
    const sum = shims.reduce((total, piece) => total + piece, 0);
    const offMm = Math.abs(offset.toMm(sum) - offset.toMm(thickness));
    if (offMm > sumSlackMm + 1e-9 * offset.toMm(thickness)) {
      const detail = `The pieces add up to ${sum}, not to the thickness of ${thickness}.`;
      faults.push({ ...combinationInvalid([...at, "shims"], detail), value: sum });
    }
  }
  return faults;
}
