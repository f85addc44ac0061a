import type { MoveProblem, StockItem } from "../../server/compute/moves/move-problem.ts";
import type { MovePlan } from "../../server/compute/moves/move-plan.ts";
import { solveMoves } from "../../server/compute/moves/solve-moves.ts";
import { feetAt, moveProblem, partOn, stackOf, stationOff } from "../support/move-problems.ts";
import { seededRandom } from "../support/seeded-random.ts";
import { solveByHighs, type Program, type Row, type Solved } from "./linear-program.ts";
import { timeOnce } from "./time-it.ts";

const toleranceMm = 0.05;
const pieces = [2, 0.5, 0.5];
const maxCount = 6;
const thicknesses = [0.025, 0.05, 0.1, 0.25];
const limitSeconds = 20;

/** Casings on two pairs of feet with two stations each; an odd pair of feet is a part by itself. */
function machine(stacks: number, quantity: number, seed: number, aim: MoveProblem["aim"]): MoveProblem {
  const random = seededRandom(seed);
  const parts = Array.from({ length: Math.ceil(stacks / 4) }, (_, k) => {
    const zMm = 2500 * k;
    const stack = stackOf(3, { piecesMm: pieces, maxCount });
    const feet = { stacks: { left: stack, right: stack } };
    const pairs = [feetAt("forward", zMm, feet), feetAt("aft", zMm + 1500, feet)];
    const supports = pairs.slice(0, Math.min(2, (stacks - 4 * k) / 2));
    const low = -0.35 * random.uniform();
    const stations = [0, 1].map((i) =>
      stationOff(`s${k}-${i}`, zMm + 300 + 700 * i, 0, low + 0.05 * random.normal(), null, {
        tolerance: {
          form: "planes",
          h: { minMm: -toleranceMm, maxMm: toleranceMm },
          v: { minMm: -toleranceMm, maxMm: toleranceMm },
        },
      }),
    );
    const ids = stations.map(({ id }) => id);
    return { stations, part: partOn(`part-${k}`, ids, supports) };
  });
  const stock: StockItem[] = thicknesses.map((thicknessMm) => ({ thicknessMm, quantity }));
  return moveProblem(
    parts.flatMap(({ stations }) => stations),
    parts.map(({ part }) => part),
    { stock, aim },
  );
}

/** Pieces put into, and taken out of, every stack as whole variables; what every station's v then is. */
function stacksOf({ components, stations, stock }: MoveProblem) {
  const rows: Row[] = [];
  const whole: Record<string, number> = {};
  const taken = thicknesses.map((): Record<string, number> => ({}));
  const predicted = new Map<string, { terms: Record<string, number>; constant: number }>();
  for (const [c, { supports, stationIds }] of components.entries()) {
    const changes = supports.map((_, s) =>
      ["left", "right"].map((side) => {
        const terms: Record<string, number> = {};
        const count: Record<string, number> = {};
        for (const [l, mm] of thicknesses.entries()) {
          const name = `add_${c}_${s}_${side}_${l}`;
          whole[name] = maxCount;
          [terms[name], count[name]] = [mm, 1];
          taken[l]![name] = 1;
        }
        for (const [p, mm] of pieces.entries()) {
          const name = `out_${c}_${s}_${side}_${p}`;
          whole[name] = 1;
          [terms[name], count[name]] = [-mm, -1];
        }
        rows.push({ terms: count, is: "<=", value: maxCount - pieces.length });
        return terms;
      }),
    );
    for (const [left = {}, right = {}] of changes) {
      const apart = Object.fromEntries(Object.entries(right).map(([name, mm]) => [name, -mm]));
      rows.push({ terms: { ...left, ...apart }, is: "=", value: 0 });
    }
    const [first, second] = supports;
    for (const id of stationIds) {
      const station = stations.find((each) => each.id === id)!;
      const share = second ? (station.zMm - first!.zMm) / (second.zMm - first!.zMm) : 0;
      const terms: Record<string, number> = {};
      for (const [s, by] of [1 - share, share].entries()) {
        for (const [name, mm] of Object.entries(changes[s]?.[0] ?? {})) terms[name] = by * mm;
      }
      predicted.set(id, { terms, constant: station.deviation.vMm });
    }
  }
  for (const [l, item] of (stock ?? []).entries()) {
    rows.push({ terms: taken[l] ?? {}, is: "<=", value: item.quantity });
  }
  return { rows, whole, predicted };
}

/** Least largest |v|/T: the very objective of `minimax`, without the order of equals. */
function largestProgram(problem: MoveProblem): Program {
  const { rows, whole, predicted } = stacksOf(problem);
  const limits = [...predicted.values()].flatMap(({ terms, constant }): Row[] => [
    { terms: { ...terms, most: -toleranceMm }, is: "<=", value: -constant },
    { terms: { ...terms, most: toleranceMm }, is: ">=", value: -constant },
  ]);
  return { least: { most: 1 }, rows: [...rows, ...limits], free: [], whole };
}

/** Least Σ(v/T)² as a linear program can say it: each square above its tangents, 0.1 T apart near 0. */
function squaresProgram(problem: MoveProblem): Program {
  const { rows, whole, predicted } = stacksOf(problem);
  const least: Record<string, number> = {};
  const tangents = [...predicted.values()].flatMap(({ terms, constant }, k): Row[] => {
    least[`square${k}`] = 1;
    return Array.from({ length: 101 }, (_, i): Row => {
      const at = (i - 50) ** 3 / 12_500 + (i - 50) / 10;
      const slope = (2 * at) / toleranceMm;
      const scaled = Object.fromEntries(Object.entries(terms).map(([name, mm]) => [name, -slope * mm]));
      return { terms: { ...scaled, [`square${k}`]: 1 }, is: ">=", value: slope * constant - at * at };
    });
  });
  return { least, rows: [...rows, ...tangents], free: [], whole };
}

/** Largest |v|/T and Σ(v/T)² of what HiGHS chose, from its whole numbers. */
function judge({ predicted }: ReturnType<typeof stacksOf>, { values }: Solved) {
  const ratios = [...predicted.values()].map(
    ({ terms, constant }) =>
      Object.entries(terms).reduce((v, [name, mm]) => v + mm * Math.round(values[name] ?? NaN), constant) /
      toleranceMm,
  );
  return {
    largest: Math.max(...ratios.map(Math.abs)),
    squares: ratios.reduce((sum, ratio) => sum + ratio * ratio, 0),
  };
}

function judgePlan({ predicted }: MovePlan) {
  const ratios = predicted.map(({ deviation }) => deviation.vMm / toleranceMm);
  return {
    largest: Math.max(...ratios.map(Math.abs)),
    squares: ratios.reduce((sum, ratio) => sum + ratio * ratio, 0),
  };
}

/** One casing on four stacks: the engine's whole plan, and the mixed-integer program alone. */
export function timeStockChoice(): void {
  console.log(
    "\nPieces from stock for the four stacks of one casing, least largest deviation; HiGHS: its program",
  );
  console.log("instance   engine ms   HiGHS ms   HiGHS ÷ engine   largest |d|/T: engine, HiGHS");
  for (const seed of [1, 2, 3]) {
    const problem = machine(4, 8, seed, "minimax");
    const program = largestProgram(problem);
    solveMoves(problem);
    const engine = timeOnce(() => solveMoves(problem));
    const highs = timeOnce(() => solveByHighs(program, limitSeconds));
    const [own, other] = [judgePlan(engine.result), judge(stacksOf(problem), highs.result)];
    console.log(
      [
        String(seed).padStart(8),
        (engine.seconds * 1000).toFixed(1).padStart(11),
        (highs.seconds * 1000).toFixed(1).padStart(10),
        (highs.seconds / engine.seconds).toFixed(1).padStart(16),
        `${own.largest.toFixed(9)}, ${other.largest.toFixed(9)}`.padStart(30),
      ].join(" "),
    );
  }
}

/** Thirty stacks that share a stock: the engine, and HiGHS with the squares as tangents, within one limit of time. */
export function timeSharedStock(): void {
  console.log(
    `\nThirty stacks on shared stock, least squares; HiGHS: squares as tangents, limit ${limitSeconds} s`,
  );
  console.log("of each   engine s   proved   HiGHS s   ended as             Σ(d/T)²: engine, HiGHS");
  for (const [quantity, seed] of [
    [4, 1],
    [8, 1],
    [8, 2],
    [20, 1],
  ] as const) {
    const problem = machine(30, quantity, seed, "least_squares");
    const engine = timeOnce(() => solveMoves(problem));
    const highs = timeOnce(() => solveByHighs(squaresProgram(problem), limitSeconds));
    const [own, other] = [judgePlan(engine.result), judge(stacksOf(problem), highs.result)];
    console.log(
      [
        String(quantity).padStart(7),
        engine.seconds.toFixed(2).padStart(10),
        (engine.result.search?.proved ? "yes" : "no").padStart(8),
        highs.seconds.toFixed(2).padStart(9),
        `  ${highs.result.status}`.padEnd(22),
        `${own.squares.toFixed(6)}, ${other.squares.toFixed(6)}`.padStart(24),
      ].join(" "),
    );
  }
}
