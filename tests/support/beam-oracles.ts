import { Matrix, solve } from "ml-matrix";
import type { BeamInput } from "../../server/compute/beam/beam-input.ts";

/** Height and slope of a bent beam at a place. */
export interface Bent {
  readonly zMm: number;
  readonly upMm: number;
  readonly slope: number;
}

/**
 * A second method: Hermite finite elements in stiffness form, dense, with the consistent loads of an even load, nodes at
 * every step, force and support (any text on the finite element method). Exact at its nodes but for rounding.
 */
export function bendByFiniteElements({ startMm, pieces, loads, supports }: BeamInput): Bent[] {
  const ends = pieces.reduce((list, { lengthMm }) => [...list, list.at(-1)! + lengthMm], [startMm]);
  const places = [...ends, ...loads.map(({ zMm }) => zMm), ...supports.map(({ zMm }) => zMm)];
  const nodes = [...new Set(places)].sort((a, b) => a - b);
  const size = 2 * nodes.length;
  const stiffness = Matrix.zeros(size, size);
  const force = new Array<number>(size).fill(0);
  for (let e = 0; e + 1 < nodes.length; e++) {
    const [a, b] = [nodes[e]!, nodes[e + 1]!];
    const h = b - a;
    const piece = pieces[ends.findIndex((end, i) => a >= end && (ends[i + 1] ?? Infinity) > a)]!;
    const k = piece.stiffnessNmm2 / h ** 3;
    const local = [
      [12, 6 * h, -12, 6 * h],
      [6 * h, 4 * h * h, -6 * h, 2 * h * h],
      [-12, -6 * h, 12, -6 * h],
      [6 * h, 2 * h * h, -6 * h, 4 * h * h],
    ];
    const even = -piece.loadNPerMm * h;
    const nodal = [even / 2, (even * h) / 12, even / 2, (-even * h) / 12];
    for (let i = 0; i < 4; i++) {
      force[2 * e + i]! += nodal[i]!;
      for (let j = 0; j < 4; j++) {
        stiffness.set(2 * e + i, 2 * e + j, stiffness.get(2 * e + i, 2 * e + j) + k * local[i]![j]!);
      }
    }
  }
  for (const { zMm, downN } of loads) force[2 * nodes.indexOf(zMm)]! -= downN;
  const known = new Map(supports.map(({ zMm, upMm }) => [2 * nodes.indexOf(zMm), upMm]));
  const free = [...force.keys()].filter((i) => !known.has(i));
  const reduced = new Matrix(free.map((i) => free.map((j) => stiffness.get(i, j))));
  const right = free.map((i) => [
    [...known].reduce((sum, [j, upMm]) => sum - stiffness.get(i, j) * upMm, force[i]!),
  ]);
  const found = solve(reduced, new Matrix(right)).getColumn(0);
  const at = (dof: number) => known.get(dof) ?? found[free.indexOf(dof)]!;
  return nodes.map((zMm, i) => ({ zMm, upMm: at(2 * i), slope: at(2 * i + 1) }));
}

/**
 * A third method, for one stiffness and one load all along: Macaulay's brackets, EI·v = C₀ + C₁z + Σ R⟨z − s⟩³/6 −
 * Σ P⟨z − p⟩³/6 − w·z⁴/24, with the constants and reactions from the heights of the supports and two balances
 * (W. H. Macaulay, Messenger of Mathematics 48, 1919). Reactions in the order of the supports.
 */
export function bendByBrackets({ startMm, pieces, loads, supports }: BeamInput): {
  readonly reactionsN: number[];
  readonly upMm: (zMm: number) => number;
} {
  const { stiffnessNmm2, loadNPerMm } = pieces[0]!;
  const lengthMm = pieces.reduce((sum, piece) => sum + piece.lengthMm, 0);
  // Lengths over the whole length and forces over EI/L³, so that the dense system is of one size.
  const scale = lengthMm ** 3 / stiffnessNmm2;
  const along = (zMm: number) => (zMm - startMm) / lengthMm;
  const bracket = (x: number, at: number) => Math.max(0, x - at) ** 3 / 6;
  const w = loadNPerMm * lengthMm;
  const loaded = (x: number) =>
    scale *
    ((w * x ** 4) / 24 + loads.reduce((sum, { zMm, downN }) => sum + downN * bracket(x, along(zMm)), 0));
  const rows = supports.map(({ zMm }) => [
    1,
    along(zMm),
    ...supports.map((other) => bracket(along(zMm), along(other.zMm))),
  ]);
  const total = loads.reduce((sum, { downN }) => sum + downN, w);
  const moment = loads.reduce((sum, { zMm, downN }) => sum + downN * along(zMm), w / 2);
  const system = new Matrix([
    ...rows,
    [0, 0, ...supports.map(() => 1)],
    [0, 0, ...supports.map(({ zMm }) => along(zMm))],
  ]);
  const right = [
    ...supports.map(({ zMm, upMm }) => upMm + loaded(along(zMm))),
    scale * total,
    scale * moment,
  ];
  const [c0, c1, ...reactions] = solve(system, Matrix.columnVector(right)).getColumn(0);
  return {
    reactionsN: reactions.map((reaction) => reaction / scale),
    upMm: (zMm) => {
      const x = along(zMm);
      return supports.reduce(
        (sum, support, i) => sum + reactions[i]! * bracket(x, along(support.zMm)),
        c0! + c1! * x - loaded(x),
      );
    },
  };
}
