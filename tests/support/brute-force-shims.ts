import { Matrix, pseudoInverse } from "ml-matrix";
import type { ShimStack } from "../../server/compute/moves/move-problem.ts";

/** Change of a stack for a move of the part by 1 in h and in v at z. */
export interface BrutePlace {
  readonly zMm: number;
  readonly h: number;
  readonly v: number;
}

/** Equal stacks that are changed alike: each by its own sign times the change. */
export interface BruteGroup {
  readonly stack: ShimStack;
  readonly places: readonly (BrutePlace & { readonly sign: 1 | -1 })[];
}

export interface BruteStation {
  readonly zMm: number;
  readonly hMm: number;
  readonly vMm: number;
  readonly toleranceMm: number;
}

export interface BruteTask {
  readonly groups: readonly BruteGroup[];
  /** Upper pads: each takes the way nearest to what the realised move asks of it. */
  readonly followers?: readonly { readonly stack: ShimStack; readonly place: BrutePlace }[];
  readonly stations: readonly BruteStation[];
  /** What the part can do: shift and tilt (about z = 0) in the planes named. */
  readonly freedoms: readonly ("h" | "v" | "tilt-h" | "tilt-v")[];
  readonly incrementMm: number;
  readonly maximumMisfitMm: number;
  /** Changes up to this far from none are tried. */
  readonly windowMm: number;
  /** Least and most move in v, at every place. */
  readonly travelV?: readonly [min: number, max: number];
}

export interface BruteBest {
  readonly cost: number;
  /** Of the choices whose cost is equal within 1e-9·(1 + the smaller). */
  readonly fewestHandled: number;
  /** Of those with fewest handled. */
  readonly leastTotalMm: number;
  readonly atEdge: boolean;
  readonly choices: number;
}

interface Way {
  readonly changeMm: number;
  readonly handled: number;
}

/**
 * Every way to change a stack: any of its pieces out, none or one new piece in; by definition, without cleverness.
 * Several new pieces to one stack never handle fewer than one cut to their sum.
 */
export function everyWay(stack: ShimStack, incrementMm: number, windowMm: number): Way[] {
  const pieces = stack.piecesMm ?? (stack.thicknessMm > 0 ? [stack.thicknessMm] : []);
  const ways = new Map<number, Way>();
  for (let subset = 0; subset < 2 ** pieces.length; subset++) {
    const out = pieces.filter((_, k) => (subset >> k) % 2 === 1);
    const outMm = out.reduce((sum, piece) => sum + piece, 0);
    for (let added = 0; added * incrementMm - outMm <= windowMm + 1e-9; added++) {
      const changeMm = added * incrementMm - outMm;
      const toMm = stack.thicknessMm + changeMm;
      const count = pieces.length - out.length + Math.min(added, 1);
      if (changeMm < -windowMm - 1e-9 || count > stack.maxCount) continue;
      if (toMm < stack.minMm - 1e-9 || toMm > stack.maxMm + 1e-9) continue;
      const handled = out.length + Math.min(added, 1);
      const key = Math.round(changeMm * 1e7);
      if ((ways.get(key)?.handled ?? Infinity) > handled) ways.set(key, { changeMm, handled });
    }
  }
  return [...ways.values()];
}

/** Changes that all stacks of a group can make, with the pieces handled in all of them. */
function waysTogether({ stack, places }: BruteGroup, incrementMm: number, windowMm: number): Way[] {
  const ways = everyWay(stack, incrementMm, windowMm);
  return ways.flatMap(({ changeMm }) => {
    const each = places.map(({ sign }) =>
      ways.find((way) => Math.abs(way.changeMm - sign * changeMm) < 1e-9),
    );
    if (each.some((way) => way === undefined)) return [];
    return [{ changeMm, handled: each.reduce((sum, way) => sum + way!.handled, 0) }];
  });
}

function nearestWay(ways: readonly Way[], needMm: number): Way & { readonly offMm: number } {
  const none: Way & { readonly offMm: number } = { changeMm: 0, handled: 0, offMm: Infinity };
  return ways.reduce<typeof none>((best, way) => {
    const offMm = Math.abs(way.changeMm - needMm);
    const nearer = offMm < best.offMm - 1e-9;
    const asNear = offMm < best.offMm + 1e-9 && way.handled < best.handled;
    return nearer || asNear ? { ...way, offMm } : best;
  }, none);
}

/** Tries every choice of changes for all groups, and judges each by the definition of the realised move. */
export function bruteForceShims(task: BruteTask): BruteBest | null {
  const { groups, stations, freedoms, incrementMm, maximumMisfitMm, windowMm } = task;
  const places = groups.flatMap((group) => group.places);
  const rowAt = ({ zMm, h, v }: BrutePlace) =>
    freedoms.map((freedom) => ({ h, v, "tilt-h": h * zMm, "tilt-v": v * zMm })[freedom]);
  const rows = places.map(rowAt);
  const fit = pseudoInverse(new Matrix(rows)).to2DArray();
  const asked = stations.flatMap(({ zMm, hMm, vMm, toleranceMm }) => [
    { row: rowAt({ zMm, h: 1, v: 0 }), offMm: hMm, toleranceMm },
    { row: rowAt({ zMm, h: 0, v: 1 }), offMm: vMm, toleranceMm },
  ]);
  const travelRows = places.map(({ zMm }) => rowAt({ zMm, h: 0, v: 1 }));
  const waysOf = groups.map((group) => waysTogether(group, incrementMm, windowMm));
  const followers = (task.followers ?? []).map(({ stack, place }) => ({
    row: rowAt(place),
    ways: everyWay(stack, incrementMm, windowMm),
  }));
  const times = (row: readonly number[], x: readonly number[]) =>
    row.reduce((sum, value, k) => sum + value * x[k]!, 0);

  const all: { cost: number; handled: number; totalMm: number; largestMm: number }[] = [];
  const chosen: Way[] = [];
  const judgeChoice = () => {
    const changes = groups.flatMap((group, g) => group.places.map(({ sign }) => sign * chosen[g]!.changeMm));
    const amounts = fit.map((row) => times(row, changes));
    if (rows.some((row, j) => Math.abs(times(row, amounts) - changes[j]!) > maximumMisfitMm + 1e-9)) return;
    const [least, most] = task.travelV ?? [-Infinity, Infinity];
    const moves = travelRows.map((row) => times(row, amounts));
    if (moves.some((v) => v < least - 1e-9 || v > most + 1e-9)) return;
    const following = followers.map(({ row, ways }) => nearestWay(ways, times(row, amounts)));
    if (following.some(({ offMm }) => offMm > maximumMisfitMm + 1e-9)) return;
    all.push({
      cost: asked.reduce((sum, { row, offMm, toleranceMm }) => {
        return sum + ((offMm + times(row, amounts)) / toleranceMm) ** 2;
      }, 0),
      handled: [...chosen, ...following].reduce((sum, { handled }) => sum + handled, 0),
      totalMm: [...changes, ...following.map(({ changeMm }) => changeMm)].reduce(
        (sum, change) => sum + Math.abs(change),
        0,
      ),
      largestMm: Math.max(...changes.map(Math.abs)),
    });
  };
  const choose = (depth: number) => {
    if (depth === groups.length) return judgeChoice();
    for (const way of waysOf[depth]!) {
      chosen[depth] = way;
      choose(depth + 1);
    }
  };
  choose(0);
  if (all.length === 0) return null;
  const cost = all.reduce((least, one) => Math.min(least, one.cost), Infinity);
  const equal = all.filter((one) => one.cost <= cost + 1e-9 * (1 + cost));
  const fewestHandled = Math.min(...equal.map(({ handled }) => handled));
  const fewest = equal.filter(({ handled }) => handled === fewestHandled);
  const leastTotalMm = Math.min(...fewest.map(({ totalMm }) => totalMm));
  const atEdge = fewest.some(({ largestMm }) => largestMm > windowMm - incrementMm);
  return { cost, fewestHandled, leastTotalMm, atEdge, choices: all.length };
}
