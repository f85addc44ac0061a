import type { Tolerance } from "../conformity/tolerance.ts";
import { limitsOf } from "../moves/ideal-move.ts";
import { planes, type MoveStation, type Plane } from "../moves/move-problem.ts";
import { excessOver, type Limit } from "../moves/quadratic-program.ts";
import { modeAt, modesOf, type Mode } from "../moves/rigid-freedom.ts";
import { carriersOf } from "../moves/solving-order.ts";
import { placesOf } from "../moves/support-places.ts";
import { axisFloatOf, type AxisFloat } from "./axis-float.ts";
import type { CostedComponent, FewestMovesProblem, LimitSource } from "./fewest-moves-problem.ts";
import type { RoundLimit } from "./round-program.ts";
import { windowOf } from "./station-window.ts";

/** A part that may move: its unknowns are those from `first` on, the amounts of its modes. */
export interface Block {
  readonly component: number;
  readonly cost: number;
  readonly first: number;
  readonly modes: readonly Mode[];
  /** Its limits leave out staying where it is. */
  readonly mustMove: boolean;
  /** Some station follows its move and that of another part that may move. */
  readonly shared: boolean;
}

export interface ModelLimit extends Limit {
  readonly source: LimitSource;
  /** Of the part whose limit it is, by its block; null: it always holds. */
  readonly block: number | null;
}

/** A station that has to conform. Its deviation from the new axis, moved, is from + rows·x. */
export interface Demand {
  readonly station: number;
  /** Blocks whose moves it follows. */
  readonly movers: readonly number[];
  readonly rows: Readonly<Record<Plane, readonly number[]>>;
  readonly within: Tolerance;
}

/** The machine as linear forms of its unknowns x: the axis first (axis-float.ts), then the blocks. All in mm. */
export interface MachineModel {
  readonly problem: FewestMovesProblem;
  readonly size: number;
  readonly axis: AxisFloat;
  readonly blocks: readonly Block[];
  readonly demands: readonly Demand[];
  /** Float of the axis, limits of the parts, stations with a tolerance in planes. */
  readonly limits: readonly ModelLimit[];
  /** Stations with a round tolerance, and which demand each is. */
  readonly rounds: readonly (RoundLimit & { readonly demand: number })[];
  /** What a station does as x moves, in h and in v: one without a tolerance too. */
  readonly rowsOf: (station: MoveStation) => Readonly<Record<Plane, readonly number[]>>;
}

/**
 * The linear forms of a problem. A part may move that is not fixed and holds no reference station, unless allowed. A
 * station follows the part that carries it, and every part that this one rests in. O(stations × unknowns).
 * @throws ComputeError tolerance_invalid, result_overflow
 */
export function modelOf(problem: FewestMovesProblem): MachineModel {
  const axis = axisFloatOf(problem);
  const stationById = new Map(problem.stations.map((station) => [station.id, station]));
  const plain: Omit<Block, "shared">[] = [];
  const limits: ModelLimit[] = axis.limits.map((limit) => ({ ...limit, block: null }));
  let size = axis.size;
  for (const [index, component] of problem.components.entries()) {
    if (!mayMove(problem, component)) continue;
    const zMm = component.stationIds.flatMap((id) => stationById.get(id)?.zMm ?? []);
    const modes = planes.flatMap((plane) => modesOf(component.supports, zMm, plane));
    const places = component.supports.flatMap((support, at) => placesOf(support, at));
    const own = limitsOf(component, places, planes, modes);
    const still = modes.map(() => 0);
    const mustMove = own.some((limit) => excessOver(limit, still) > 0);
    const block = plain.length;
    const first = size;
    limits.push(
      ...own.map(({ row, most, place }) => ({
        row: shiftedRow(row, first),
        most,
        block,
        source: { of: "component", component: index, limit: place } as const,
      })),
    );
    plain.push({ component: index, cost: component.cost, first, modes, mustMove });
    size += modes.length;
  }
  const wide = (row: readonly number[]) => [...row, ...new Array<number>(size - row.length).fill(0)];
  const moversOf = moversByStation(problem, plain);
  const rowsOf = (station: MoveStation) => {
    const row = (plane: Plane) => stationRow(axis, plain, moversOf(station.id), station, plane, size);
    return { h: row("h"), v: row("v") };
  };
  const demands = problem.stations.flatMap((station, k): Demand[] => {
    const window = windowOf(station, problem);
    if (window === null) return [];
    return [{ station: k, movers: moversOf(station.id), rows: rowsOf(station), within: window.within }];
  });
  const shared = new Set(demands.flatMap(({ movers }) => (movers.length > 1 ? movers : [])));
  return {
    problem,
    size,
    axis,
    blocks: plain.map((block, b) => ({ ...block, shared: shared.has(b) })),
    demands,
    limits: [
      ...limits.map((limit) => ({ ...limit, row: wide(limit.row) })),
      ...windowLimits(problem, demands),
    ],
    rounds: demands.flatMap(({ station, rows, within }, demand) => {
      if (within.form !== "radial") return [];
      const { hMm, vMm } = problem.stations[station]!.deviation;
      return [{ rows: [rows.h, rows.v], from: [hMm, vMm], radiusMm: within.halfWidthMm, demand } as const];
    }),
    rowsOf,
  };
}

/** Whether a part may move: not fixed, and no reference station on it unless that is allowed. */
export function mayMove({ references }: FewestMovesProblem, component: CostedComponent): boolean {
  if (component.fixed) return false;
  const holds = component.stationIds.some((id) => references.some(({ stationId }) => stationId === id));
  return component.allowReferenceMove || !holds;
}

const shiftedRow = (row: readonly number[], by: number): number[] => [
  ...new Array<number>(by).fill(0),
  ...row,
];

function moversByStation(
  { components }: FewestMovesProblem,
  blocks: readonly Pick<Block, "component">[],
): (stationId: string) => number[] {
  const blockOf = new Map(blocks.map(({ component }, b) => [component, b]));
  const movers = new Map<string, number[]>();
  for (const [index, { stationIds }] of components.entries()) {
    const chain = [index, ...carriersOf(components, index)].flatMap((each) => blockOf.get(each) ?? []);
    for (const id of stationIds) movers.set(id, chain);
  }
  return (stationId) => movers.get(stationId) ?? [];
}

function stationRow(
  axis: AxisFloat,
  blocks: readonly Pick<Block, "first" | "modes">[],
  movers: readonly number[],
  { zMm }: MoveStation,
  plane: Plane,
  size: number,
): number[] {
  const row = new Array<number>(size).fill(0);
  if (axis.size > 0) {
    const at = plane === "h" ? 0 : 2;
    axis.sharesAt(zMm).forEach((share, k) => (row[at + k] = 0 - share));
  }
  for (const block of movers) {
    const { first, modes } = blocks[block]!;
    modes.forEach((mode, k) => (row[first + k] = mode.plane === plane ? modeAt(mode, zMm) : 0));
  }
  return row;
}

function windowLimits({ stations }: FewestMovesProblem, demands: readonly Demand[]): ModelLimit[] {
  return demands.flatMap(({ station, rows, within }) => {
    if (within.form === "radial") return [];
    const { deviation } = stations[station]!;
    return planes.flatMap((plane) => {
      const found = plane === "h" ? deviation.hMm : deviation.vMm;
      const { minMm, maxMm } = within[plane];
      const at = { of: "station", station, plane } as const;
      return [
        {
          row: rows[plane].map((value) => 0 - value),
          most: found - minMm,
          block: null,
          source: { ...at, side: "min" as const },
        },
        { row: rows[plane], most: maxMm - found, block: null, source: { ...at, side: "max" as const } },
      ];
    });
  });
}
