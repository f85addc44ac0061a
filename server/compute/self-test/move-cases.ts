import { dot } from "../moves/least-squares-in-order.ts";
import type { MoveProblem, MoveStation, MoveSupport, ShimStack, StockItem } from "../moves/move-problem.ts";
import { solveQuadraticProgram, type Limit } from "../moves/quadratic-program.ts";
import { solveMoves } from "../moves/solve-moves.ts";
import type { SelfCase } from "./self-case.ts";

const negative = (row: readonly number[]): number[] => row.map((value) => 0 - value);
const unit = (k: number): number[] => [0, 1, 2, 3].map((i) => (i === k ? 1 : 0));

/** MATLAB's example of lsqlin with limits, an equation and bounds. */
function boundedLeastSquares(): Readonly<Record<string, number>> {
  const rows = [
    [0.9501, 0.762, 0.6153, 0.4057],
    [0.2311, 0.4564, 0.7919, 0.9354],
    [0.6068, 0.0185, 0.9218, 0.9169],
    [0.4859, 0.8214, 0.7382, 0.4102],
    [0.8912, 0.4447, 0.1762, 0.8936],
  ];
  const targets = [0.0578, 0.3528, 0.8131, 0.0098, 0.1388];
  const equation = [3, 5, 7, 9];
  const limits: Limit[] = [
    { row: [0.2027, 0.2721, 0.7467, 0.4659], most: 0.5251 },
    { row: [0.1987, 0.1988, 0.445, 0.4186], most: 0.2026 },
    { row: [0.6037, 0.0152, 0.9318, 0.8462], most: 0.6721 },
    { row: equation, most: 4 },
    { row: negative(equation), most: -4 },
    ...[0, 1, 2, 3].flatMap((k) => [
      { row: unit(k), most: 2 },
      { row: negative(unit(k)), most: 0.1 },
    ]),
  ];
  const optimum = solveQuadraticProgram(4, [{ rows, targets }], limits);
  const x = optimum.feasible ? optimum.point : [];
  return {
    ...Object.fromEntries(x.map((value, k) => [`x${k + 1}`, value])),
    squares: rows.reduce((sum, row, i) => sum + (dot(row, x) - (targets[i] ?? Number.NaN)) ** 2, 0),
  };
}

const anywhere = {
  travel: { h: { minMm: -Infinity, maxMm: Infinity }, v: { minMm: -Infinity, maxMm: Infinity } },
  blocked: [],
};
const endless: ShimStack = { thicknessMm: 0, minMm: 0, maxMm: Infinity, maxCount: Infinity, piecesMm: [] };

const stationAt = (id: string, zMm: number, vMm: number, halfWidthMm: number): MoveStation => ({
  id,
  zMm,
  deviation: { hMm: 0, vMm },
  covariance: null,
  dof: null,
  tolerance: { form: "radial", halfWidthMm },
});

const problemOf = (
  stations: readonly MoveStation[],
  supports: readonly MoveSupport[],
  rest: Partial<MoveProblem>,
): MoveProblem => ({
  stations,
  referenceIds: [],
  components: [
    {
      id: "part",
      kind: "bearing",
      stationIds: stations.map(({ id }) => id),
      fixed: false,
      allowReferenceMove: false,
      supports,
      carriedById: null,
      tiltTolerance: null,
      roll: null,
    },
  ],
  couplings: [],
  aim: "least_squares",
  cutIncrementMm: null,
  stock: null,
  reuse: false,
  maximumMisfitMm: 0.02,
  maximumIncrementMm: null,
  incrementsMax: 2000,
  indicators: [],
  level: 0.95,
  ...rest,
});

/** The set of 81 gauge blocks, one of each size. */
const blocks = (): StockItem[] => {
  const series = (from: number, to: number, step: number) =>
    Array.from({ length: Math.round((to - from) / step) + 1 }, (_, k) => from + k * step);
  return [
    ...series(1001, 1009, 1),
    ...series(1010, 1490, 10),
    ...series(500, 9500, 500),
    ...series(10_000, 40_000, 10_000),
  ].map((units) => ({ thicknessMm: units / 1000, quantity: 1 }));
};

/** Raises a bearing on one pad below it, from an empty stack, by the target: what is put in makes it up. */
function blocksFor(target: number): readonly number[] {
  const stack = { ...endless, maxCount: 5 };
  const pad: MoveSupport = {
    id: "seat",
    zMm: 0,
    ...anywhere,
    form: "pads",
    pads: [{ id: "below", clockDeg: 180, stack }],
  };
  const plan = solveMoves(
    problemOf([stationAt("bore", 0, -target / 1000, 0.01)], [pad], { stock: blocks() }),
  );
  return plan.search?.proved ? (plan.components[0]?.stacks[0]?.addMm ?? []) : [];
}

/** Stations that lie −z² off on two supports: the best move takes the parabola to an eighth. */
function largestOffParabola(): Readonly<Record<string, number>> {
  const stations = Array.from({ length: 9 }, (_, k) => stationAt(`s${k}`, k / 8, -((k / 8) ** 2), 1));
  const feet = (id: string, zMm: number): MoveSupport => ({
    id,
    zMm,
    ...anywhere,
    form: "feet",
    keys: "outside",
    stacks: { left: { ...endless, thicknessMm: 5 }, right: { ...endless, thicknessMm: 5 } },
  });
  const { components, predicted } = solveMoves(
    problemOf(stations, [feet("forward", 0), feet("aft", 1)], { aim: "minimax" }),
  );
  const [forward, aft] = components[0]?.realised ?? [];
  return {
    forward: forward?.vMm ?? Number.NaN,
    aft: aft?.vMm ?? Number.NaN,
    largest: Math.max(...predicted.map(({ deviation }) => Math.hypot(deviation.hMm, deviation.vMm))),
  };
}

/** Moves of a component and choices of its shims. */
export const moveCases: readonly SelfCase[] = [
  {
    id: "move-bounded-least-squares",
    area: "shim-move",
    source:
      "MATLAB Optimization Toolbox, example of lsqlin with limits, an equation and bounds, as quoted in pracma (CRAN), lsqlincon",
    figures: [
      { figure: "x1", expected: -0.1, tolerance: 6e-8 },
      { figure: "x2", expected: -0.1, tolerance: 6e-8 },
      { figure: "x3", expected: 0.1599088, tolerance: 6e-8 },
      { figure: "x4", expected: 0.4089598, tolerance: 6e-8 },
      { figure: "squares", expected: 0.1695104, tolerance: 6e-8 },
    ],
    compute: boundedLeastSquares,
  },
  {
    id: "move-minimax-parabola",
    area: "shim-move",
    source: "Chebyshev: the best straight line to z² on [0, 1] is z − 1/8, off by 1/8 (from memory)",
    figures: [
      { figure: "forward", expected: -1 / 8, tolerance: 1e-9 },
      { figure: "aft", expected: 7 / 8, tolerance: 1e-9 },
      { figure: "largest", expected: 1 / 8, tolerance: 1e-9 },
    ],
    compute: largestOffParabola,
  },
  {
    id: "stock-gauge-blocks",
    area: "shim-move",
    source:
      "SPACEBLK, exhaustive search for the fewest gauge blocks of the inch set of 81: 1.7523 of four blocks (a thousandth of a millimetre here for its ten-thousandth)",
    figures: [
      { figure: "sum", expected: 17.523, tolerance: 1e-9 },
      { figure: "pieces", expected: 4, tolerance: 1e-12 },
    ],
    compute: () => {
      const made = blocksFor(17_523);
      return { sum: made.reduce((sum, mm) => sum + mm, 0), pieces: made.length };
    },
  },
];
