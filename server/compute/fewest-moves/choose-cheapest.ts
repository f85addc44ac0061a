import { ComputeError } from "../compute-error.ts";
import type { FewestSearch, LimitSource } from "./fewest-moves-problem.ts";
import { solveHeld, type Held } from "./hold-moved.ts";
import type { MachineModel } from "./machine-model.ts";
import { solveMovesProgram } from "./moves-program.ts";
import type { Tangent } from "./round-program.ts";

/** How long the search may last: the first program that takes longer ends it. */
export interface Effort {
  readonly firstSeconds: number;
  /** Of each program after the first: they differ by a few rows. */
  readonly nextSeconds: number;
  /** Programs until the cheapest is proved. */
  readonly programsMost: number;
  /** Further choices at the same cost that are compared. */
  readonly tiedMost: number;
}

export const effortDefault: Effort = { firstSeconds: 20, nextSeconds: 5, programsMost: 60, tiedMost: 20 };

type HeldChoice = Held & { readonly feasible: true };
type Choice = ReadonlySet<number>;

/** Directions in which a round tolerance has its first tangents. */
const firstTangents = 8;
/** Sums of |d|/T squared, and of moves, that differ by no more are equal. */
const equalWithin = 1e-9;

/**
 * The blocks to move at least cost, all of which together can bring every station inside, and those of `must` alone
 * cannot. The program gives a choice and a bound; whether that choice does is found exactly. Where it does not, the
 * tangents that prove it come into the program, with the moves of the parts that take part, and that more has to move: so its
 * bound rises until a choice does. Then
 * all other choices at that cost, as far as `tiedMost` goes, are compared by what `solveHeld` makes least.
 * @throws ComputeError not_converged
 */
export function chooseCheapest(
  model: MachineModel,
  must: Choice,
  effort: Effort,
): { readonly moved: Choice; readonly best: HeldChoice; readonly search: FewestSearch } {
  const costOf = (moved: Choice) => sumOf([...moved].map((b) => model.blocks[b]!.cost));
  let tangents: readonly Tangent[] = tangentsAround(model);
  const tooFew: Choice[] = [must];
  const detailed = new Set([...model.blocks.keys()].filter((b) => model.blocks[b]!.shared));
  // Something beyond what must move has to.
  let bound = costOf(must) + leastOf(model.blocks.flatMap(({ cost }, b) => (must.has(b) ? [] : [cost])));

  /** What `moved` comes to; null where it does not do, and then the program learns why. */
  const tryChoice = (moved: Choice): HeldChoice | null => {
    const best = solveHeld(model, moved);
    if (best.feasible) return best;
    tangents = [...tangents, ...best.tangents];
    for (const block of blocksIn(model, best.sources)) detailed.add(block);
    tooFew.push(moved);
    return null;
  };
  const searchOf = (proved: boolean, cost: number, tied: number): FewestSearch => ({
    method: "mixed_integer_program",
    proved,
    betterBy: proved ? 0 : Math.max(0, cost - bound),
    cuts: tangents.length,
    tied,
  });

  for (let program = 0; program < effort.programsMost; program++) {
    const seconds = program === 0 ? effort.firstSeconds : effort.nextSeconds;
    const cuts = { tangents, detailed, tooFew, known: [], costMost: Infinity };
    const found = solveMovesProgram(model, cuts, seconds);
    if (found === null) throw new ComputeError("not_converged", "The program of fewest moves lost a choice.");
    if (!found.optimal) break;
    bound = Math.max(bound, costOf(found.moved));
    const best = tryChoice(found.moved);
    if (best === null) continue;
    const tied = tiedWith(found.moved, best);
    return { ...tied.best, search: searchOf(true, costOf(tied.best.moved), tied.others) };
  }
  const moved = thinnedOut(model, must);
  const best = solveHeld(model, moved);
  if (!best.feasible) throw new ComputeError("not_converged", "The moves found could not be settled.");
  return { moved, best, search: searchOf(costOf(moved) <= bound, costOf(moved), 0) };

  function tiedWith(moved: Choice, best: HeldChoice) {
    let winner = { moved, best };
    const known: Choice[] = [moved];
    for (let tries = 0; tries < 2 * effort.tiedMost && known.length <= effort.tiedMost; tries++) {
      const cuts = { tangents, detailed, tooFew, known, costMost: costOf(moved) };
      const next = solveMovesProgram(model, cuts, effort.nextSeconds);
      if (next === null || !next.optimal) break;
      const held = tryChoice(next.moved);
      if (held === null) continue;
      known.push(next.moved);
      if (isBetter({ moved: next.moved, best: held }, winner)) winner = { moved: next.moved, best: held };
    }
    return { best: winner, others: known.length - 1 };
  }
}

/** Blocks that take part in a contradiction, by their own limits or by a station that follows them. */
function blocksIn({ blocks, demands }: MachineModel, sources: readonly LimitSource[]): number[] {
  return sources.flatMap((source) => {
    switch (source.of) {
      case "float":
        return [];
      case "station":
        return demands.find(({ station }) => station === source.station)?.movers ?? [];
      case "component":
        return [...blocks.keys()].filter((b) => blocks[b]!.component === source.component);
    }
  });
}

/** From all parts, those left out one by one, the costliest first, without which the others still do. */
function thinnedOut(model: MachineModel, must: Choice): Choice {
  const moved = new Set(model.blocks.keys());
  const costliest = [...moved].sort((a, b) => model.blocks[b]!.cost - model.blocks[a]!.cost || b - a);
  for (const block of costliest) {
    if (must.has(block)) continue;
    moved.delete(block);
    if (!solveHeld(model, moved).feasible) moved.add(block);
  }
  return moved;
}

interface Candidate {
  readonly moved: Choice;
  readonly best: HeldChoice;
}

function isBetter(a: Candidate, b: Candidate): boolean {
  for (const of of [({ best }: Candidate) => best.pull, ({ best }: Candidate) => best.movement]) {
    const [left, right] = [of(a), of(b)];
    if (Math.abs(left - right) > equalWithin * (1 + Math.min(left, right))) return left < right;
  }
  const [first, second] = [a, b].map(({ moved }) => [...moved].sort((x, y) => x - y));
  const at = first!.findIndex((block, k) => block !== second![k]);
  return at >= 0 && first![at]! < (second![at] ?? Infinity);
}

/** Tangents to every round tolerance, evenly round it. */
function tangentsAround({ rounds }: MachineModel): Tangent[] {
  return rounds.flatMap((_, round) =>
    Array.from({ length: firstTangents }, (_each, k): Tangent => {
      const angle = (2 * Math.PI * k) / firstTangents;
      return { round, direction: [Math.sin(angle), Math.cos(angle)] };
    }),
  );
}

const sumOf = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0);
const leastOf = (values: readonly number[]): number => Math.min(...values);
