import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { ConfirmationComponent } from "../../shared/schemas/confirmations.ts";
import { combinationInvalid, duplicates, unknownReference } from "./common-faults.ts";
import { carriersOf } from "./confirmation-input.ts";

/** Everything that is wrong with the components of a confirmation. A broken one (null) hides what depends on it. */
export function componentPartFaults(
  components: readonly (ConfirmationComponent | null)[],
  known: ReadonlySet<string | null>,
): Fault[] {
  const ids = components.map((component) => component?.id ?? null);
  const whole = components.flatMap((component) => component ?? []);
  const allRead = whole.length === components.length;
  const owner = new Map<string, number>();
  return [
    ...duplicates(ids, (index) => ["components", index, "id"]),
    ...components.flatMap((component, index) => {
      if (!component) return [];
      const at = ["components", index];
      const { stations = [], supports = [], carriedBy } = component;
      return [
        ...duplicates(stations, (k) => [...at, "stations", k]),
        ...stations.flatMap((id, k) => {
          const place = [...at, "stations", k];
          const first = owner.get(id) ?? index;
          owner.set(id, first);
          if (!known.has(id)) return [unknownReference(place, "survey")];
          if (first === index) return [];
          const detail = `A station belongs to one component; this one is listed at ${pointerOf(["components", first])} too.`;
          return [combinationInvalid(place, detail)];
        }),
        ...duplicates(
          supports.map(({ id }) => id),
          (k) => [...at, "supports", k, "id"],
        ),
        ...(carriedBy && allRead ? carrierFaults(component, [...at, "carriedBy"], whole) : []),
      ];
    }),
  ];
}

function carrierFaults(
  { id, carriedBy }: ConfirmationComponent,
  at: readonly PropertyKey[],
  components: readonly ConfirmationComponent[],
): Fault[] {
  if (!components.some((component) => component.id === carriedBy)) {
    return [unknownReference(at, "component")];
  }
  const last = components.find((component) => component.id === carriersOf(id, components).at(-1));
  if (!last?.carriedBy) return [];
  return [combinationInvalid(at, "The components carry each other in a ring.")];
}
