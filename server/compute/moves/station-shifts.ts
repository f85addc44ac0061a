import type { PlaneVector } from "../plane.ts";
import type { MoveProblem, MoveStation } from "./move-problem.ts";
import type { RigidMove } from "./rigid-freedom.ts";
import { carriersOf } from "./solving-order.ts";

const none: PlaneVector = { hMm: 0, vMm: 0 };
const sum = (a: PlaneVector, b: PlaneVector): PlaneVector => ({ hMm: a.hMm + b.hMm, vMm: a.vMm + b.vMm });

/** How a component's move shifts a station: one it carries, one of a part that rests in it, one it is coupled to. */
export type StationShift = (component: number, move: RigidMove, station: MoveStation) => PlaneVector;

/** The shifts of a machine: who carries what, and how moving one part shifts the stations of others. */
export function stationShiftsOf({ components, couplings }: MoveProblem): StationShift {
  const carriedWith = new Map<string, ReadonlySet<number>>();
  for (const [index, { stationIds }] of components.entries()) {
    const moving = new Set([index, ...carriersOf(components, index)]);
    for (const id of stationIds) carriedWith.set(id, moving);
  }
  const coupled = new Map<string, { component: number; zMm: number; h: number; v: number }[]>();
  for (const { componentId, supportId, stationId, h, v } of couplings) {
    const component = components.findIndex(({ id }) => id === componentId);
    const support = components[component]?.supports.find(({ id }) => id === supportId);
    if (support) {
      const known = coupled.get(stationId) ?? [];
      coupled.set(stationId, [...known, { component, zMm: support.zMm, h, v }]);
    }
  }
  return (component, move, { id, zMm }) => {
    const carried = carriedWith.get(id)?.has(component) ? move(zMm) : none;
    return (coupled.get(id) ?? [])
      .filter((each) => each.component === component)
      .reduce((total, each) => {
        const there = move(each.zMm);
        return sum(total, { hMm: each.h * there.hMm, vMm: each.v * there.vMm });
      }, carried);
  };
}

/** A station where several moves leave it. */
export function shiftedBy(station: MoveStation, shifts: readonly PlaneVector[]): MoveStation {
  return { ...station, deviation: shifts.reduce(sum, station.deviation) };
}
