import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { ComponentRequest } from "../../shared/schemas/move-components.ts";
import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import { combinationInvalid, duplicates, unknownReference } from "./common-faults.ts";

type Path = readonly PropertyKey[];
type Couplings = NonNullable<ShimMoveRequest["couplings"]>;

/** A carrier that is not there, and a ring of parts that carry each other. `ids` are those of all components sent. */
export function carrierFaults(
  components: readonly (ComponentRequest | null)[],
  ids: readonly (string | null)[],
): Fault[] {
  const carrierOf = (index: number): number => {
    const carrier = components[index]?.carriedBy ?? null;
    return carrier === null ? -1 : ids.indexOf(carrier);
  };
  return components.flatMap((component, index) => {
    const at: Path = ["components", index, "carriedBy"];
    if ((component?.carriedBy ?? null) === null) return [];
    if (carrierOf(index) < 0) return [unknownReference(at, "component")];
    let above = carrierOf(index);
    for (let steps = 0; above >= 0 && above !== index && steps < components.length; steps++) {
      above = carrierOf(above);
    }
    return above === index ? [combinationInvalid(at, "Components carry each other in a ring.")] : [];
  });
}

/** Couplings that refer to nothing, or to a station that moves with the component itself. */
export function couplingFaults(
  couplings: Couplings,
  components: readonly (ComponentRequest | null)[],
  ids: { readonly components: readonly (string | null)[]; readonly stations: ReadonlySet<string | null> },
): Fault[] {
  return couplings.flatMap(({ component: id, support, station }, index) => {
    const at = (member: string): Path => ["couplings", index, member];
    const component = components[ids.components.indexOf(id)];
    const faults: Fault[] = [];
    if (!ids.components.includes(id)) faults.push(unknownReference(at("component"), "component"));
    if (component && !(component.supports ?? []).some((each) => each.id === support)) {
      faults.push(unknownReference(at("support"), "support of that component"));
    }
    if (!ids.stations.has(station)) faults.push(unknownReference(at("station"), "station"));
    if (component?.stations?.includes(station)) {
      faults.push(combinationInvalid(at("station"), "The component carries this station: it moves with it."));
    }
    return faults;
  });
}

/** A tilt of a part that has no two stations apart along z. Where a station was not sent well, nothing is said. */
export function tiltFaults(
  { tilt, stations = [] }: ComponentRequest,
  at: Path,
  zOf: ReadonlyMap<string, number>,
): Fault[] {
  const z = stations.flatMap((id) => zOf.get(id) ?? []);
  if (!tilt || z.length < stations.length || Math.max(...z) > Math.min(...z)) return [];
  return [combinationInvalid([...at, "tilt"], "A tilt needs two stations of the component, apart along z.")];
}

/** Feet of a roll that are not there, stand twice, or all stand at one h. */
export function rollFaults({ roll, supports = [] }: ComponentRequest, at: Path): Fault[] {
  if (!roll) return [];
  const feet: Path = [...at, "roll", "feet"];
  const spread = new Set(roll.feet.map(({ h }) => h)).size > 1;
  return [
    ...roll.feet.flatMap(({ support, place }, index) => {
      const found = supports.find(({ id }) => id === support);
      if (!found) return [unknownReference([...feet, index, "support"], "support of the component")];
      if (carriesHeight(found, place)) return [];
      const detail = "No foot or joint key of that support carries the height there.";
      return [{ pointer: pointerOf([...feet, index, "place"]), code: "unknown_reference" as const, detail }];
    }),
    ...duplicates(
      roll.feet.map(({ support, place }) => `${support} ${place}`),
      (index) => [...feet, index],
    ),
    ...(spread ? [] : [combinationInvalid(feet, "Feet at one h take out no roll.")]),
  ];
}

function carriesHeight(support: NonNullable<ComponentRequest["supports"]>[number], place: string): boolean {
  switch (support.form) {
    case "feet":
      return (place === "left" || place === "right") && support.stacks?.[place] !== undefined;
    case "joint_keys":
      return (place === "key-left" || place === "key-right") && support.stacks?.[place] !== undefined;
    case "pads":
      return false;
  }
}
