import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import { findReferenceFaults } from "../compute/axis/find-faults.ts";
import { readAxisStation } from "./axis-deviation-input.ts";
import { combinationInvalid } from "./common-faults.ts";
import { movedIdsOf } from "./confirmation-input.ts";
import type { Readable } from "./confirmation-move-faults.ts";

/**
 * What the reference stations refuse together. Those that somebody moved do not count. Told only where everything that
 * they depend on could be read.
 */
export function referenceStationFaults(
  { before, after, components, moves, log, reference, sameSetUp, axis }: Readable,
  convert: Record<Dimension, Converter>,
): Fault[] {
  const axisFaults =
    sameSetUp === false && axis?.method === "line_of_sight"
      ? [
          combinationInvalid(
            ["axis", "method"],
            "With a new set-up the beam is another one: the axis goes through the reference stations.",
          ),
        ]
      : [];
  const all = [...before.stations, ...after.stations, ...components, ...moves, ...log];
  if (sameSetUp === null || all.some((part) => part === null)) return axisFaults;
  const present = <T>(parts: readonly (T | null)[]) => parts.flatMap((part) => part ?? []);
  const moved = movedIdsOf({
    moves: present(moves),
    components: present(components),
    log: present(log),
  });
  const usable = [...new Set(reference)].flatMap((id) => {
    const [earlier, later] = [before.ids.indexOf(id), after.ids.indexOf(id)];
    return earlier < 0 || later < 0 || moved.has(id) ? [] : [{ earlier, later }];
  });
  return [
    ...axisFaults,
    ...(sameSetUp || usable.length >= 2 ? [] : [tooFew(usable.length)]),
    ...spanFaults(
      usable.map(({ later }) => ({
        index: later,
        station: readAxisStation(after.stations[later]!, convert),
      })),
    ),
    ...coverageFaults([
      ...usable.map(({ earlier }) => ({
        at: ["before", "stations", earlier],
        station: before.stations[earlier],
      })),
      ...usable.map(({ later }) => ({ at: ["after", "stations", later], station: after.stations[later] })),
    ]),
  ];
}

function tooFew(reached: number): Fault {
  return {
    pointer: "/reference",
    code: "reference_count",
    detail: `A new set-up is compared from two reference stations or more, in both surveys and not moved; ${reached} named.`,
    value: reached,
    allowed: { min: 2 },
  };
}

/** Reference stations at one z lay no axis. */
function spanFaults(
  usable: readonly { readonly index: number; readonly station: ReturnType<typeof readAxisStation> }[],
): Fault[] {
  const bare = usable.map(({ index, station }) => ({ index, station: { ...station, covariance: null } }));
  return findReferenceFaults("least_squares", bare).map(({ code, message }) => ({
    pointer: "/reference",
    code,
    detail: message,
  }));
}

/** Covariances of some reference stations, in one survey or the other, and not of all. */
function coverageFaults(
  stations: readonly {
    readonly at: readonly PropertyKey[];
    readonly station: Readable["before"]["stations"][number] | undefined;
  }[],
): Fault[] {
  const unstated = stations.filter(({ station }) => !station?.covariance);
  if (unstated.length === stations.length) return [];
  return unstated.map(({ at }) => ({
    pointer: pointerOf([...at, "covariance"]),
    code: "weights_incomplete" as const,
    detail: "Covariances are given for other reference stations of the two surveys, not for this one.",
  }));
}
