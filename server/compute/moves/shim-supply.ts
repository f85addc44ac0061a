import type { MoveProblem, ShimStack } from "./move-problem.ts";
import type { SearchBudget } from "./search-budget.ts";
import { changesWithin, piecesOf, sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import { stockChangesWithin } from "./stock-changes.ts";
import { StockSums, type SumLine } from "./stock-sums.ts";

/** Pieces of one thickness at hand, of which there are `quantity` (Infinity: unlimited). */
export interface StockLine {
  readonly thicknessMm: number;
  readonly quantity: number;
  /** Such pieces in the stacks of the call, where pieces taken out are used again. */
  readonly returnable: number;
}

/** One change of a stack, and the ways to make it: one, unless lines of the stock are counted. */
export interface ChangeWays {
  readonly changeMm: number;
  readonly ways: readonly ShimChange[];
}

/** Pieces that go in, by line of the stock, and pieces that come out. */
type Exchange = Pick<ShimChange, "stockLines" | "removeMm">;

/** Shims finer than this apart are one step to the search; what it finds does not depend on it. */
const leastStepMm = 1e-4;

/** What shims can be had for a choice: cut to size, from stock, or both, and how many of each. */
export class ShimSupply {
  private tables: StockSums | null = null;
  /** Changes found before, by stack and range: rounds of prices ask for the same again. */
  private readonly found = new Map<string, readonly ChangeWays[]>();

  constructor(
    readonly incrementMm: number | null,
    readonly lines: readonly StockLine[],
    readonly reuse: boolean,
    /** Of each line, how many pieces may be taken, less those given back. */
    readonly available: readonly number[],
    /** Lines whose pieces are counted over all stacks of a choice; of the others one stack alone keeps the number. */
    readonly counted: readonly number[] = [],
  ) {}

  /** The same with other numbers available, or other lines counted. */
  with(rest: { readonly available?: readonly number[]; readonly counted?: readonly number[] }): ShimSupply {
    const { incrementMm, lines, reuse, available, counted } = this;
    return new ShimSupply(incrementMm, lines, reuse, rest.available ?? available, rest.counted ?? counted);
  }

  /** The same with no more than `most` of each line for any one stack, nothing counted over several. */
  limitedTo(most: readonly number[]): ShimSupply {
    const { incrementMm, lines, reuse } = this;
    const limited = lines.map((line, k) => ({ ...line, quantity: most[k] ?? 0, returnable: 0 }));
    return new ShimSupply(
      incrementMm,
      limited,
      reuse,
      limited.map(() => Infinity),
    );
  }

  /** About how far apart the changes of a stack lie. */
  get stepMm(): number {
    const sizes = this.lines.map(({ thicknessMm }) => thicknessMm).sort((a, b) => a - b);
    const gaps = sizes.map((mm, k) => Math.max(leastStepMm, mm - (sizes[k - 1] ?? 0)));
    return Math.min(this.incrementMm ?? Infinity, ...gaps, 1);
  }

  /** The thickest piece that can be put in; Infinity where it can be cut to size. */
  get thickestMm(): number {
    return this.incrementMm === null
      ? Math.max(0, ...this.lines.map(({ thicknessMm }) => thicknessMm))
      : Infinity;
  }

  /**
   * The changes of one stack within `from` to `to`, thinnest first.
   * @throws ComputeError too_many_choices
   */
  changesWithin(stack: ShimStack, from: number, to: number, budget: SearchBudget): readonly ChangeWays[] {
    if (this.lines.length === 0 && this.incrementMm !== null) {
      const cut = changesWithin(stack, this.incrementMm, from, to, budget);
      return cut.map((change) => ({ changeMm: change.changeMm, ways: [change] }));
    }
    if (this.counted.length === 0) return stockChangesWithin(this, stack, from, to, budget);
    const { thicknessMm, minMm, maxMm, maxCount, piecesMm } = stack;
    const key = [from, to, thicknessMm, minMm, maxMm, maxCount, piecesMm === null, ...(piecesMm ?? [])].join(
      " ",
    );
    const known = this.found.get(key);
    if (known) return known;
    const changes = stockChangesWithin(this, stack, from, to, budget);
    this.found.set(key, changes);
    return changes;
  }

  /** What uncounted pieces make, up to `mostMm` at least. */
  sumsUpTo(mostMm: number, budget: SearchBudget): StockSums {
    if (!this.tables || this.tables.mostMm < mostMm) {
      const lines = this.lines.flatMap(({ thicknessMm }, line): SumLine[] => {
        const most = this.mostFor(line);
        return this.counted.includes(line) ? [] : [{ line, thicknessMm, most }];
      });
      this.tables = new StockSums(lines, this.incrementMm, mostMm * 1.25, budget);
    }
    return this.tables;
  }

  /** Pieces of a line that one stack could have, whatever the others take. */
  mostFor(line: number): number {
    const { quantity = 0, returnable = 0 } = this.lines[line] ?? {};
    return quantity + returnable;
  }

  /** The line of pieces of that thickness; −1 without one. */
  lineOf(thicknessMm: number): number {
    return this.lines.findIndex((line) => Math.abs(line.thicknessMm - thicknessMm) <= sameThicknessMm);
  }

  /** Per line, the pieces that changes take from stock. */
  takenBy(changes: readonly Exchange[]): number[] {
    const taken = this.lines.map(() => 0);
    for (const { stockLines = [] } of changes)
      for (const line of stockLines) taken[line] = (taken[line] ?? 0) + 1;
    return taken;
  }

  /** Per line, the pieces that changes take, less those that they give back. */
  netOf(changes: readonly Exchange[]): number[] {
    const net = this.takenBy(changes);
    if (!this.reuse) return net;
    for (const { removeMm } of changes) {
      for (const mm of removeMm) {
        const line = this.lineOf(mm);
        if (line >= 0) net[line] = (net[line] ?? 0) - 1;
      }
    }
    return net;
  }

  /** The same of the counted lines alone. */
  countedOf(changes: readonly Exchange[]): number[] {
    if (this.counted.length === 0) return [];
    const net = this.netOf(changes);
    return this.counted.map((line) => net[line] ?? 0);
  }

  /** Lines of which `net` takes more than there are. */
  overdrawn(net: readonly number[]): number[] {
    return [...net.keys()].filter((line) => (net[line] ?? 0) > (this.available[line] ?? 0));
  }
}

/**
 * The supply of a problem, with all of the stock available; null when it chooses no shims. Lines of one thickness are
 * one; where pieces are used again, every thickness that a stack of the call holds is a line of its own after those sent.
 */
export function supplyOf({ cutIncrementMm, stock, reuse, components }: MoveProblem): ShimSupply | null {
  if (cutIncrementMm === null && stock === null) return null;
  const lines: StockLine[] = [];
  const add = ({ thicknessMm, quantity, returnable }: StockLine) => {
    const k = lines.findIndex((line) => Math.abs(line.thicknessMm - thicknessMm) <= sameThicknessMm);
    const known = lines[k];
    if (!known) lines.push({ thicknessMm, quantity, returnable });
    else {
      const sum = { quantity: known.quantity + quantity, returnable: known.returnable + returnable };
      lines[k] = { ...known, ...sum };
    }
  };
  for (const item of stock ?? []) add({ ...item, returnable: 0 });
  if (reuse) {
    const stacks = components
      .filter(({ fixed }) => !fixed)
      .flatMap(({ supports }) => supports)
      .flatMap((support) =>
        support.form === "pads" ? support.pads.map(({ stack }) => stack) : Object.values(support.stacks),
      );
    for (const stack of stacks) {
      for (const thicknessMm of piecesOf(stack)) add({ thicknessMm, quantity: 0, returnable: 1 });
    }
  }
  return new ShimSupply(
    cutIncrementMm,
    lines,
    reuse,
    lines.map(({ quantity }) => quantity),
  );
}
