import { ComputeError } from "../compute-error.ts";
import type { SearchBudget } from "./search-budget.ts";
import { sameThicknessMm } from "./shim-changes.ts";

/** Pieces of one thickness, of which one stack may take up to `most`. */
export interface SumLine {
  readonly line: number;
  readonly thicknessMm: number;
  readonly most: number;
}

/** The fewest pieces that make a thickness: so many of a line, and the rest; or one piece cut to size, and the rest. */
export interface SumEntry {
  readonly pieces: number;
  /** Of the stock; null for the piece cut to size. */
  readonly line: number | null;
  readonly count: number;
  readonly thicknessMm: number;
  readonly rest: SumEntry | null;
}

/** Sums held in a table by their unit; beyond that they are held one by one, and up to `sumsMost` of them. */
const tableMost = 2_000_000;
const sumsMost = 200_000;
/** Sums tried that count as one trial of the search. */
const sumsPerTrial = 40;

const nothing: SumEntry = { pieces: 0, line: null, count: 0, thicknessMm: 0, rest: null };

/**
 * Every thickness up to `mostMm` that pieces from stock make, and one more piece cut to a multiple of the increment if
 * there is one, with the fewest pieces for each; of equally few, as many as can be of the first line, then of the second,
 * and so on. Dynamic programming over the lines, last to first (the bounded change-making problem; S. Martello and
 * P. Toth, Knapsack Problems, 1990, chapter 5, from memory), in the largest unit of which every thickness is a multiple.
 * Work: lines × sums.
 * @throws ComputeError too_many_choices
 */
export class StockSums {
  readonly unitMm: number;
  readonly mostMm: number;
  private entries: Entries;
  private readonly keys: readonly number[] | null;

  constructor(
    lines: readonly SumLine[],
    private readonly incrementMm: number | null,
    mostMm: number,
    budget: SearchBudget,
  ) {
    const sizes = [
      ...lines.map(({ thicknessMm }) => thicknessMm),
      ...(incrementMm === null ? [] : [incrementMm]),
    ];
    const unit = sizes.map((mm) => Math.round(mm / sameThicknessMm)).reduce(commonDivisor, 0);
    this.unitMm = (unit === 0 ? 1e9 : unit) * sameThicknessMm;
    this.mostMm = mostMm;
    const last = Math.floor((mostMm + sameThicknessMm) / this.unitMm);
    const inTable = last < tableMost;
    this.entries = inTable ? new Table(last + 1) : new Map<number, SumEntry>();
    this.entries.set(0, nothing);
    for (const line of [...lines].reverse()) {
      const size = Math.round(line.thicknessMm / this.unitMm);
      const most = Math.min(line.most, Math.floor(last / size));
      if (most < 1) continue;
      const unlimited = inTable && most >= Math.floor(last / size);
      budget.spend(Math.ceil((this.entries.size * (unlimited ? 1 : most)) / sumsPerTrial));
      this.entries = withLine(this.entries, line, size, most, last, inTable);
      if (!inTable && this.entries.size > sumsMost) throw tooManySums();
    }
    if (incrementMm !== null && inTable) this.addCutPiece(Math.round(incrementMm / this.unitMm), last);
    this.keys = inTable ? null : [...this.entries.keys()].sort((a, b) => a - b);
  }

  /** The sums from `fromMm` to `toMm`, thinnest first. */
  within(
    fromMm: number,
    toMm: number,
    budget: SearchBudget,
  ): { readonly sumMm: number; readonly entry: SumEntry }[] {
    const found: { sumMm: number; entry: SumEntry }[] = [];
    if (toMm < -sameThicknessMm) return found;
    const first = Math.max(0, Math.ceil((fromMm - sameThicknessMm) / this.unitMm));
    const last = Math.floor((Math.min(toMm, this.mostMm) + sameThicknessMm) / this.unitMm);
    if (this.keys === null) {
      budget.spend(Math.max(0, last - first) / 10);
      for (let at = first; at <= last; at++) this.push(found, at);
      return found;
    }
    if (this.incrementMm !== null) return this.withCutPiece(fromMm, toMm, budget);
    for (const at of this.keys) {
      if (at > last) break;
      if (at >= first) this.push(found, at);
    }
    budget.spend(found.length / 10 + 1);
    return found;
  }

  private push(found: { sumMm: number; entry: SumEntry }[], at: number): void {
    const entry = this.entries.get(at);
    if (entry) found.push({ sumMm: at * this.unitMm, entry });
  }

  /** One piece cut to a whole number of increments beside the fewest from stock that leave such a rest. */
  private addCutPiece(size: number, last: number): void {
    const made = new Table(last + 1);
    const bases = new Map<number, { readonly at: number; readonly entry: SumEntry }>();
    for (let at = 0; at <= last; at++) {
      const own = this.entries.get(at);
      const base = bases.get(at % size);
      if (own && (!base || own.pieces <= base.entry.pieces)) bases.set(at % size, { at, entry: own });
      const cut = base && cutBeside(base.entry, (at - base.at) * this.unitMm);
      const best = own && (!cut || own.pieces <= cut.pieces) ? own : cut;
      if (best) made.set(at, best);
    }
    this.entries = made;
  }

  private withCutPiece(fromMm: number, toMm: number, budget: SearchBudget) {
    const found = new Map<number, { sumMm: number; entry: SumEntry }>();
    const step = this.incrementMm ?? 1;
    const keep = (sumMm: number, entry: SumEntry) => {
      const key = Math.round(sumMm / sameThicknessMm);
      if (entry.pieces < (found.get(key)?.entry.pieces ?? Infinity)) found.set(key, { sumMm, entry });
    };
    for (const at of this.keys ?? []) {
      const baseMm = at * this.unitMm;
      const entry = this.entries.get(at);
      if (!entry || baseMm > toMm + sameThicknessMm) continue;
      if (baseMm >= fromMm - sameThicknessMm) keep(baseMm, entry);
      const first = Math.max(1, Math.ceil((fromMm - baseMm - sameThicknessMm) / step));
      const last = Math.floor((toMm - baseMm + sameThicknessMm) / step);
      budget.spend(Math.max(0, last - first) + 1);
      for (let count = first; count <= last; count++) {
        keep(baseMm + count * step, cutBeside(entry, count * step));
      }
    }
    return [...found.values()].sort((a, b) => a.sumMm - b.sumMm);
  }
}

/** The pieces of an entry: lines of the stock, one for each piece, and the thickness of the piece cut to size (or 0). */
export function piecesOfEntry(entry: SumEntry): {
  readonly lines: readonly number[];
  readonly cutMm: number;
} {
  const lines: number[] = [];
  let cutMm = 0;
  for (let at: SumEntry | null = entry; at; at = at.rest) {
    if (at.line === null) cutMm += at.thicknessMm;
    else for (let k = 0; k < at.count; k++) lines.push(at.line);
  }
  return { lines, cutMm };
}

interface Entries {
  readonly size: number;
  get(at: number): SumEntry | undefined;
  set(at: number, entry: SumEntry): unknown;
  keys(): Iterable<number>;
}

class Table implements Entries {
  private readonly held: (SumEntry | undefined)[];
  constructor(readonly size: number) {
    this.held = new Array<SumEntry | undefined>(size).fill(undefined);
  }
  get(at: number): SumEntry | undefined {
    return this.held[at];
  }
  set(at: number, entry: SumEntry): void {
    this.held[at] = entry;
  }
  keys(): Iterable<number> {
    return this.held.keys();
  }
}

/** Sums with up to `most` pieces of one more line: of equally few pieces in all, as many of it as can be. */
function withLine(
  before: Entries,
  { line, thicknessMm }: SumLine,
  size: number,
  most: number,
  last: number,
  inTable: boolean,
): Entries {
  const made: Entries = inTable ? new Table(last + 1) : new Map<number, SumEntry>();
  if (inTable && most >= Math.floor(last / size))
    return withUnlimited(before, made, { line, thicknessMm }, size, last);
  for (const at of before.keys()) {
    const rest = before.get(at);
    if (!rest) continue;
    for (let count = 0; count <= most && at + count * size <= last; count++) {
      const pieces = rest.pieces + count;
      const known = made.get(at + count * size);
      const fewer = !known || pieces < known.pieces;
      const asFew = known?.pieces === pieces && count > (known.line === line ? known.count : 0);
      if (fewer || asFew)
        made.set(at + count * size, count === 0 ? rest : { pieces, line, count, thicknessMm, rest });
    }
  }
  return made;
}

/** The same without a bound on the pieces: each sum from the one a piece below. */
function withUnlimited(
  before: Entries,
  made: Entries,
  { line, thicknessMm }: Pick<SumLine, "line" | "thicknessMm">,
  size: number,
  last: number,
): Entries {
  for (let at = 0; at <= last; at++) {
    const without = before.get(at);
    const below = made.get(at - size);
    if (below && (!without || below.pieces + 1 <= without.pieces)) {
      const same = below.line === line;
      const count = (same ? below.count : 0) + 1;
      made.set(at, { pieces: below.pieces + 1, line, count, thicknessMm, rest: same ? below.rest : below });
    } else if (without) made.set(at, without);
  }
  return made;
}

const cutBeside = (rest: SumEntry, thicknessMm: number): SumEntry => ({
  pieces: rest.pieces + 1,
  line: null,
  count: 1,
  thicknessMm,
  rest,
});

function tooManySums(): ComputeError {
  const detail = `The pieces in stock make more than ${sumsMost} thicknesses.`;
  return new ComputeError("too_many_choices", detail, { limit: sumsMost });
}

function commonDivisor(a: number, b: number): number {
  let [x, y] = [a, b];
  while (y > 0) [x, y] = [y, x % y];
  return x;
}
