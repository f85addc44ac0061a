import { ComputeError } from "../compute-error.ts";
import { highs } from "../moves/highs.ts";
import { planes } from "../moves/move-problem.ts";
import type { MachineModel } from "./machine-model.ts";
import { cutOf, type Tangent } from "./round-program.ts";

/** What the program knows beside the model. */
export interface ProgramCuts {
  readonly tangents: readonly Tangent[];
  /** Blocks whose own moves and limits are in the program; the others can, so far, make any move. */
  readonly detailed: ReadonlySet<number>;
  /** Choices that cannot do: one block more than these has to move. */
  readonly tooFew: readonly ReadonlySet<number>[];
  /** Choices known already: another is asked for. */
  readonly known: readonly ReadonlySet<number>[];
  readonly costMost: number;
}

export interface ProgramChoice {
  readonly moved: ReadonlySet<number>;
  /** False where the time limit ended it. */
  readonly optimal: boolean;
}

/** Near the tightest that the solver takes. */
const tolerance = 1e-9;
/** The program is solved in micrometres, its limits looser by this many: it never loses a choice by rounding. */
const looserUm = 1e-6;
const umPerMm = 1e3;
/** Beyond these the solver refuses a factor, and reads a limit as infinite. */
const largestFactor = 1e15;
const largestLimit = 1e19;

interface Term {
  readonly name: string;
  readonly factor: number;
}

/**
 * The blocks to move at least cost so that axis and moves exist within all limits and the tangents given: a mixed-integer
 * linear program, one binary y for each block (HiGHS, branch and cut); null where there are none. Stations inside: for a
 * direction u of a window, u·d ≤ w after the moves; and before them, u·d ≤ w + M·y, where their part may stay, M the most
 * by which any axis within its float passes w: no larger constant is needed. A part that moves stations together
 * with another has its limits a·x ≤ b as a·x ≤ b·y: it stays where y = 0, and its hull is as tight as can be.
 * @throws ComputeError not_converged, result_overflow
 */
export function solveMovesProgram(
  model: MachineModel,
  cuts: ProgramCuts,
  seconds: number,
): ProgramChoice | null {
  const { blocks, size } = model;
  const costly = Math.max(...blocks.map(({ cost }) => cost));
  const names = blocks.map((_, b) => `y${b}`);
  const costs = blocks.map(({ cost }, b) => ({ name: names[b]!, factor: cost / costly }));
  const rows = [
    ...movesRows(model, cuts.detailed),
    ...windowRows(model, cuts),
    ...blocks.flatMap(({ mustMove }, b) => (mustMove ? [rowOf([{ name: names[b]!, factor: -1 }], -1)] : [])),
    ...cuts.tooFew.map((moved) => rowOf(negative(names.filter((_, b) => !moved.has(b))), -1)),
    ...cuts.known.map((moved) =>
      rowOf(
        names.map((name, b) => ({ name, factor: moved.has(b) ? 1 : -1 })),
        moved.size - 1,
      ),
    ),
    ...(cuts.costMost < Infinity ? [rowOf(costs, (cuts.costMost / costly) * (1 + tolerance))] : []),
  ];
  const text = [
    `Minimize\n obj: ${textOf(costs)}\nSubject To`,
    ...rows.map((row, k) => ` r${k}: ${row}`),
    "Bounds",
    ...Array.from({ length: size }, (_, k) => ` x${k} free`),
    `Binary\n ${names.join("\n ")}\nEnd\n`,
  ].join("\n");
  const answer = highs.solve(text, {
    output_flag: false,
    mip_rel_gap: 0,
    mip_abs_gap: 0,
    mip_feasibility_tolerance: tolerance,
    primal_feasibility_tolerance: tolerance,
    time_limit: seconds,
  });
  if (answer.Status === "Infeasible") return null;
  if (answer.Status !== "Optimal" && answer.Status !== "Time limit reached") {
    throw new ComputeError("not_converged", `The program of fewest moves ended as ${answer.Status}.`);
  }
  const valueOf = (name: string) => {
    const column = answer.Columns[name];
    return column && "Primal" in column ? column.Primal : 1;
  };
  const moved = new Set([...blocks.keys()].filter((b) => !(valueOf(names[b]!) < 0.5)));
  return { moved, optimal: answer.Status === "Optimal" };
}

/** Float of the axis, and the limits of the parts. */
function movesRows({ blocks, limits }: MachineModel, detailed: ReadonlySet<number>): string[] {
  return limits.flatMap(({ row, most, block, source }) => {
    if (source.of === "station" || (block !== null && !detailed.has(block))) return [];
    const terms = termsOf(row);
    if (block === null || !blocks[block]!.shared) return [lengthRow(terms, most)];
    return [lengthRow([...terms, { name: `y${block}`, factor: 0 - umPerMm * most }], 0)];
  });
}

/** Stations inside, after the moves; and where their one part may stay, before. */
function windowRows(model: MachineModel, { tangents, detailed }: ProgramCuts): string[] {
  const { limits, rounds, demands, blocks } = model;
  const asked = [
    ...limits.flatMap(({ row, most, source }) =>
      source.of === "station" ? [{ row, most, station: source.station }] : [],
    ),
    ...tangents.map((tangent) => ({
      ...cutOf(rounds, tangent),
      station: demands[rounds[tangent.round]!.demand]!.station,
    })),
  ];
  const demandOf = new Map(demands.map((demand) => [demand.station, demand]));
  return asked.flatMap(({ row, most, station }) => {
    const movers = demandOf.get(station)?.movers ?? [];
    const after = movers.every((mover) => detailed.has(mover)) ? [lengthRow(termsOf(row), most)] : [];
    const [mover] = movers;
    if (mover === undefined || blocks[mover]!.shared) return after;
    const still = row.slice(0, model.axis.size);
    const passes = mostOverAxis(model, still, station) - most;
    if (passes <= 0) return after;
    return [
      ...after,
      lengthRow([...termsOf(still), { name: `y${mover}`, factor: 0 - umPerMm * passes }], most),
    ];
  });
}

/** The most that a form of the axis alone, which it sees at a station's z, comes to within its float. */
function mostOverAxis({ axis, problem }: MachineModel, form: readonly number[], station: number): number {
  if (axis.size === 0) return 0;
  const { zMm } = problem.stations[station]!;
  const shares = axis.sharesAt(zMm);
  const [k, share] = Math.abs(shares[0]) > Math.abs(shares[1]) ? [0, shares[0]] : [1, shares[1]];
  return planes.reduce((sum, plane, p) => {
    const factor = form[2 * p + k]! / share;
    const { minMm, maxMm } = axis.rangeAt(zMm, plane);
    return sum + Math.max(factor * minMm, factor * maxMm);
  }, 0);
}

const termsOf = (row: readonly number[]): Term[] =>
  row.flatMap((factor, k) => (factor === 0 ? [] : [{ name: `x${k}`, factor }]));

const negative = (names: readonly string[]): Term[] => names.map((name) => ({ name, factor: -1 }));

/** A limit on lengths: in micrometres, a little looser, its largest factor of a length 1. */
function lengthRow(terms: readonly Term[], mostMm: number): string {
  const lengths = terms.filter(({ name }) => name.startsWith("x"));
  const scale = Math.max(...lengths.map(({ factor }) => Math.abs(factor)));
  const size = lengths.length > 0 && scale > 0 ? scale : 1;
  const scaled = terms.map(({ name, factor }) => ({ name, factor: factor / size }));
  return rowOf(scaled, (umPerMm * mostMm) / size + looserUm);
}

function rowOf(terms: readonly Term[], most: number): string {
  return `${textOf(terms)} <= ${readable(most, largestLimit)}`;
}

function textOf(terms: readonly Term[]): string {
  const named = terms.map(
    ({ name, factor }) => `${factor < 0 ? "-" : "+"} ${readable(Math.abs(factor), largestFactor)} ${name}`,
  );
  return named.length > 0 ? named.join(" ") : "0 y0";
}

function readable(value: number, largest: number): number {
  if (Math.abs(value) < largest) return value;
  throw new ComputeError("result_overflow", "A number of the program of fewest moves is too large.");
}
