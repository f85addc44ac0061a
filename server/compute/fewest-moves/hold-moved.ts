import type { LeastSquares } from "../moves/least-squares-in-order.ts";
import { lengthOf } from "../moves/least-squares-in-order.ts";
import { remainderOf } from "../moves/minimax-program.ts";
import { planes } from "../moves/move-problem.ts";
import { modeAt } from "../moves/rigid-freedom.ts";
import type { LimitSource } from "./fewest-moves-problem.ts";
import type { Demand, MachineModel } from "./machine-model.ts";
import { solveRoundProgram, type RoundOptimum, type Tangent } from "./round-program.ts";

export type Held =
  | {
      readonly feasible: true;
      /** Of every unknown; 0 for parts that stay. */
      readonly x: readonly number[];
      /** Σ(|d|/T)² over all stations with a tolerance. */
      readonly pull: number;
      /** Σ of the squares of all moves at supports and of the float at the reference stations, mm². */
      readonly movement: number;
    }
  | {
      readonly feasible: false;
      /** Cannot all be met; without any one of them the others can. */
      readonly sources: readonly LimitSource[];
      readonly tangents: readonly Tangent[];
    };

/** An unknown below this is rounding, mm. */
const noMoveMm = 1e-12;

/**
 * With the parts that move held, the axis and the moves that minimise Σ(|d|/T)², every station inside its window: of
 * these the least moves and float, Σδ² over the supports moved and the reference stations. Exact but for rounding.
 * @throws ComputeError not_converged
 */
export function solveHeld(model: MachineModel, moved: ReadonlySet<number>): Held {
  const { columns, limits, rounds } = reducedTo(model, moved);
  const pick = ({ rows, targets }: LeastSquares): LeastSquares => ({
    rows: rows.map((row) => columns.map((k) => row[k]!)),
    targets,
  });
  const [first, second] = [pick(pullOf(model)), pick(movementOf(model, moved))];
  return heldOf(
    model,
    columns,
    limits,
    solveRoundProgram(columns.length, first, second, limits, rounds),
    moved,
  );
}

function reducedTo(model: MachineModel, moved: ReadonlySet<number>) {
  const columns = [
    ...Array.from({ length: model.axis.size }, (_, k) => k),
    ...model.blocks.flatMap(({ first, modes }, b) => (moved.has(b) ? modes.map((_, k) => first + k) : [])),
  ];
  const pick = (row: readonly number[]) => columns.map((k) => row[k]!);
  const limits = model.limits
    .filter(({ block }) => block === null || moved.has(block))
    .map((limit) => ({ ...limit, row: pick(limit.row) }));
  const rounds = model.rounds.map((round) => ({
    ...round,
    rows: [pick(round.rows[0]), pick(round.rows[1])] as const,
  }));
  return { columns, limits, rounds };
}

function heldOf(
  model: MachineModel,
  columns: readonly number[],
  limits: readonly { readonly source: LimitSource }[],
  best: RoundOptimum,
  moved: ReadonlySet<number>,
): Held {
  if (!best.feasible) {
    const round = best.tangents.map((each) => model.demands[model.rounds[each.round]!.demand]!.station);
    return {
      feasible: false,
      sources: [
        ...best.limits.map((k) => limits[k]!.source),
        ...[...new Set(round)].map(
          (station) => ({ of: "station", station, plane: null, side: "max" }) as const,
        ),
      ],
      tangents: best.tangents,
    };
  }
  const x = new Array<number>(model.size).fill(0);
  columns.forEach((column, k) => {
    const value = best.point[k]!;
    x[column] = Math.abs(value) < noMoveMm ? 0 : value;
  });
  const sizeOf = (problem: LeastSquares) => lengthOf(remainderOf(problem, x)) ** 2;
  return { feasible: true, x, pull: sizeOf(pullOf(model)), movement: sizeOf(movementOf(model, moved)) };
}

/** What the stations ask: (d − middle)/T in each plane. */
function pullOf({ problem, demands }: MachineModel): LeastSquares {
  const parts = demands.flatMap(({ station, rows }: Demand) => {
    const { tolerance, deviation } = problem.stations[station]!;
    if (tolerance === null) return [];
    return planes.map((plane) => {
      const range =
        tolerance.form === "radial"
          ? { minMm: 0 - tolerance.halfWidthMm, maxMm: tolerance.halfWidthMm }
          : tolerance[plane];
      const halfWidthMm = (range.maxMm - range.minMm) / 2;
      const found = plane === "h" ? deviation.hMm : deviation.vMm;
      return {
        row: rows[plane].map((value) => value / halfWidthMm),
        target: ((range.minMm + range.maxMm) / 2 - found) / halfWidthMm,
      };
    });
  });
  return { rows: parts.map(({ row }) => row), targets: parts.map(({ target }) => target) };
}

function movementOf(model: MachineModel, moved: ReadonlySet<number>): LeastSquares {
  const { axis, blocks, problem, size } = model;
  const empty = () => new Array<number>(size).fill(0);
  const ofAxis = axis.zMm.flatMap((zMm) =>
    planes.map((_, p) => {
      const row = empty();
      axis.sharesAt(zMm).forEach((share, k) => (row[2 * p + k] = share));
      return row;
    }),
  );
  const ofParts = blocks.flatMap(({ component, first, modes }, b) => {
    if (!moved.has(b)) return [];
    return problem.components[component]!.supports.flatMap(({ zMm }) =>
      planes.map((plane) => {
        const row = empty();
        modes.forEach((mode, k) => (row[first + k] = mode.plane === plane ? modeAt(mode, zMm) : 0));
        return row;
      }),
    );
  });
  const rows = [...ofAxis, ...ofParts];
  return { rows, targets: rows.map(() => 0) };
}
