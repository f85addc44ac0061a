import type { ConfirmationComponent, ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { SurveyEvent } from "../compute/confirmation/find-outstanding.ts";
import { rigidMove, type RigidMove } from "../compute/confirmation/planned-move.ts";
import type { ComparedStation, MeasuredCentre } from "../compute/confirmation/survey-change.ts";
import type { PlaneVector } from "../compute/plane.ts";
import { readAxisStation } from "./axis-deviation-input.ts";

type Converters = Record<Dimension, Converter>;
type SurveyStation = ConfirmationRequest["after"]["stations"][number];

/** Two surveys side by side, station by station. */
export interface PairedSurveys {
  /** Ids of every station of either survey, in the order sent: the earlier survey's, then what the later one adds. */
  readonly ids: readonly string[];
  /** Of those that both measured. */
  readonly compared: readonly ComparedStation[];
  readonly comparedIds: readonly string[];
  readonly measuredAfter: ReadonlySet<string>;
  readonly zMmOf: ReadonlyMap<string, number>;
}

export function pairSurveys(
  { before, after }: Pick<ConfirmationRequest, "before" | "after">,
  convert: Converters,
): PairedSurveys {
  const earlier = new Map(before.stations.map((station) => [station.id, station]));
  const later = new Map(after.stations.map((station) => [station.id, station]));
  const ids = [...new Set([...earlier.keys(), ...later.keys()])];
  const comparedIds = ids.filter((id) => earlier.has(id) && later.has(id));
  return {
    ids,
    comparedIds,
    compared: comparedIds.map((id) => {
      const [one, other] = [earlier.get(id)!, later.get(id)!];
      return {
        zMm: convert.axial.toMm(other.z),
        before: readMeasured(one, convert),
        after: readMeasured(other, convert),
      };
    }),
    measuredAfter: new Set(later.keys()),
    zMmOf: new Map(ids.map((id) => [id, convert.axial.toMm((later.get(id) ?? earlier.get(id))!.z)])),
  };
}

function readMeasured(station: SurveyStation, convert: Converters): MeasuredCentre {
  const { centre, covariance, dof } = readAxisStation(station, convert);
  return { centre, covariance, dof };
}

/** How far stations were to move, and how far a rigid part could not follow what was stated at its supports. */
export interface Plan {
  /** Only of those that something was planned for. */
  readonly plannedOf: ReadonlyMap<string, PlaneVector>;
  readonly misfits: readonly { readonly componentId: string; readonly misfitMm: number }[];
}

export function readPlan(
  { moves = [], components = [] }: Pick<ConfirmationRequest, "moves" | "components">,
  zMmOf: ReadonlyMap<string, number>,
  { axial, offset }: Converters,
): Plan {
  const vector = ({ h, v }: { readonly h: number; readonly v: number }): PlaneVector => ({
    hMm: offset.toMm(h),
    vMm: offset.toMm(v),
  });
  const rigid = new Map<string, RigidMove>();
  for (const { id, supports = [] } of components) {
    const stated = moves
      .filter(({ component }) => component === id)
      .flatMap((move) => {
        const support = supports.find((each) => each.id === move.support);
        return support ? [{ zMm: axial.toMm(support.z), move: vector(move) }] : [];
      });
    if (stated.length > 0) rigid.set(id, rigidMove(stated));
  }
  const plannedOf = new Map<string, PlaneVector>();
  for (const { station, ...move } of moves) if (station !== undefined) plannedOf.set(station, vector(move));
  for (const { id, stations = [] } of components) {
    const carrying = carriersOf(id, components).flatMap((part) => rigid.get(part) ?? []);
    if (carrying.length === 0) continue;
    for (const station of stations) plannedOf.set(station, sumAt(carrying, zMmOf.get(station) ?? 0));
  }
  const misfits = [...rigid].map(([componentId, { misfitMm }]) => ({ componentId, misfitMm }));
  return { plannedOf, misfits };
}

function sumAt(moves: readonly RigidMove[], zMm: number): PlaneVector {
  return moves
    .map((move) => move.at(zMm))
    .reduce((sum, { hMm, vMm }) => ({ hMm: sum.hMm + hMm, vMm: sum.vMm + vMm }));
}

/** A component and, outward, what it is carried by. A ring of carriers ends where it closes. */
export function carriersOf(id: string, components: readonly ConfirmationComponent[]): string[] {
  const chain = [id];
  for (;;) {
    const next = components.find((component) => component.id === chain.at(-1))?.carriedBy;
    if (!next || chain.includes(next)) return chain;
    chain.push(next);
  }
}

/** The log in the order of time, each entry with the stations it is about. */
export function readLog({
  log = [],
  components = [],
}: Pick<ConfirmationRequest, "log" | "components">): SurveyEvent[] {
  const movedWith = new Map(
    components.map(({ id }) => [
      id,
      components.flatMap((other) =>
        carriersOf(other.id, components).includes(id) ? (other.stations ?? []) : [],
      ),
    ]),
  );
  const own = new Map(components.map(({ id, stations = [] }) => [id, stations]));
  return log
    .map((entry, order) => ({ entry, order, time: Date.parse(entry.at) }))
    .sort((one, other) => one.time - other.time || one.order - other.order)
    .map(({ entry: { event, station, component = "" } }) => {
      if (station !== undefined) return { event, stationIds: [station] };
      const stations = event === "moved" ? movedWith.get(component) : own.get(component);
      return { event, stationIds: stations ?? [] };
    });
}

/** Ids of the stations that the plan moves, other than by 0, or that the log has as moved. */
export function movedIdsOf(
  request: Pick<ConfirmationRequest, "moves" | "components" | "log">,
): ReadonlySet<string> {
  const { moves = [], components = [] } = request;
  const isMove = ({ h, v }: { readonly h: number; readonly v: number }) => h !== 0 || v !== 0;
  const parts = new Set(
    moves.flatMap((move) => (move.component !== undefined && isMove(move) ? [move.component] : [])),
  );
  return new Set([
    ...moves.flatMap((move) => (move.station !== undefined && isMove(move) ? [move.station] : [])),
    ...components.flatMap(({ id, stations = [] }) =>
      carriersOf(id, components).some((part) => parts.has(part)) ? stations : [],
    ),
    ...readLog(request).flatMap(({ event, stationIds }) => (event === "moved" ? stationIds : [])),
  ]);
}
