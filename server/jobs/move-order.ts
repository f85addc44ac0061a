import type { JobFlag } from "../../shared/schemas/job-surveys.ts";
import type { LoggedMove } from "../../shared/schemas/job-entries.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import { flag } from "./survey-flags.ts";

type Component = NonNullable<MachineDocument["components"]>[number];

/**
 * What is out of the usual order in a move about to be logged, or logged (common practice, no source): casing sections
 * and shrouds to the axis first, bearings after; each locked before the next. `earlier` are the moves logged before it.
 */
export function moveOrderFlags(
  machine: MachineDocument,
  plan: ShimMoveResult | null,
  earlier: readonly LoggedMove[],
  move: LoggedMove,
): JobFlag[] {
  const components = machine.components ?? [];
  const isBearing = (id: string) => components.find((one) => one.id === id)?.kind === "bearing";
  const finished = new Set(earlier.filter((one) => one.finished).map((one) => one.component));
  const begun = [...new Set(earlier.map((one) => one.component))];
  const flags: JobFlag[] = [];

  if (isBearing(move.component)) {
    const waiting = plannedMoves(plan).filter((id) => !isBearing(id) && !finished.has(id));
    if (waiting.length > 0) {
      flags.push(
        flag(
          "bearing_before_casing",
          `${move.component} moves before ${waiting.join(", ")}: bearings come last.`,
        ),
      );
    }
  } else {
    const bearings = begun.filter(isBearing);
    if (bearings.length > 0) {
      flags.push(flag("casing_after_bearing", `${move.component} moves after ${bearings.join(", ")}.`));
    }
  }
  const unlocked = begun.filter((id) => id !== move.component && !finished.has(id));
  if (unlocked.length > 0) {
    flags.push(flag("previous_not_locked", `${unlocked.join(", ")} was not finished and locked before.`));
  }
  return flags;
}

/** What else a reader of a move must know. */
export function moveEffectFlags(
  machine: MachineDocument,
  reference: readonly string[],
  { component }: Pick<LoggedMove, "component">,
): JobFlag[] {
  return stationsMovedBy(machine, component)
    .filter((station) => reference.includes(station))
    .map((station) =>
      flag(
        "reference_moved",
        `${component} holds the reference station ${station}: the axis must be surveyed anew.`,
        station,
      ),
    );
}

/** The stations that a component takes along: its own, and those of what it carries. */
export function stationsMovedBy(machine: MachineDocument, component: string): string[] {
  const components = machine.components ?? [];
  const seen = new Set<string>();
  const visit = (id: string): Component[] => {
    if (seen.has(id)) return [];
    seen.add(id);
    return components
      .filter((one) => one.id === id || one.carriedBy === id)
      .flatMap((one) => (one.id === id ? [one] : visit(one.id)));
  };
  return [...new Set(visit(component).flatMap(({ stations }) => stations ?? []))];
}

/** Components that a plan moves, or turns. */
function plannedMoves(plan: ShimMoveResult | null): string[] {
  return (plan?.components ?? [])
    .filter(
      ({ realised, roll }) =>
        roll?.found !== roll?.predicted || realised.some(({ h, v }) => h !== 0 || v !== 0),
    )
    .map(({ id }) => id);
}
