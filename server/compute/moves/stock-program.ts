import { ComputeError } from "../compute-error.ts";
import { highs } from "./highs.ts";

/** One way to serve a unit whole: what it costs and what it takes of the lines that are short. */
export interface Column {
  readonly cost: number;
  readonly handled: number;
  readonly totalMm: number;
  /** Net pieces of each short line. */
  readonly net: readonly number[];
  /** Pieces taken of every line, for the order of equals. */
  readonly taken: readonly number[];
}

/** What shares the stock: its columns, the component it belongs to (in the order they are moved). */
export interface Unit {
  readonly component: number;
  readonly columns: readonly Column[];
}

/** One column for each unit, no short line overdrawn after any component, of least Σ of(column). */
export interface StockProgram {
  readonly units: readonly Unit[];
  readonly quantities: readonly number[];
  readonly of: (column: Column, unit: number) => number;
  /** Further sums that must not pass `most`. */
  readonly within: readonly {
    readonly of: (column: Column, unit: number) => number;
    readonly most: number;
  }[];
  readonly allowed: (column: Column) => boolean;
}

const timeLimitSeconds = 20;
/** Near the tightest that the solver takes. */
const feasibilityTolerance = 1e-9;

/**
 * Solves the program with whole columns (HiGHS, branch and cut); null when nothing fits. `bound` is 0 where the time
 * limit ended it.
 * @throws ComputeError not_converged when the solver ends in a way that says nothing
 */
export function solveStockProgram(
  program: StockProgram,
  seconds = timeLimitSeconds,
): { readonly picks: readonly number[]; readonly optimal: boolean; readonly bound: number } | null {
  const names = namesOf(program);
  if (names.some((own) => own.length === 0)) return null;
  const binaries = names.flatMap((own) => own.map(({ name }) => name));
  const answer = highs.solve(`${textOf(program, names)}Binary\n ${binaries.join("\n ")}\nEnd\n`, {
    output_flag: false,
    mip_rel_gap: 0,
    mip_abs_gap: 0,
    mip_feasibility_tolerance: feasibilityTolerance,
    primal_feasibility_tolerance: feasibilityTolerance,
    time_limit: seconds,
  });
  if (answer.Status === "Infeasible") return null;
  if (answer.Status !== "Optimal" && answer.Status !== "Time limit reached") {
    throw new ComputeError("not_converged", `The program of shared stock ended as ${answer.Status}.`);
  }
  const shareOf = (name: string) => {
    const column = answer.Columns[name];
    return column && "Primal" in column ? column.Primal : 0;
  };
  const picks = names.map((own) => own.find(({ name }) => shareOf(name) > 0.5)?.c ?? -1);
  const optimal = answer.Status === "Optimal";
  if (picks.includes(-1) || !keepsStock(program, picks)) {
    if (optimal) throw new ComputeError("not_converged", "The program of shared stock lost a unit.");
    return null;
  }
  return { picks, optimal, bound: optimal ? answer.ObjectiveValue : 0 };
}

/**
 * What a piece of each short line is worth to each unit while columns may be mixed in shares: the duals of the linear
 * program, one list for each unit. A bound that is made with them is valid whatever they are (share-by-prices.ts).
 * @throws ComputeError not_converged
 */
export function pricesOf(
  program: StockProgram,
): { readonly byRow: readonly number[]; readonly value: number } | null {
  const names = namesOf(program);
  if (names.some((own) => own.length === 0)) return null;
  const answer = highs.solve(`${textOf(program, names)}End\n`, { output_flag: false });
  if (answer.Status === "Infeasible") return null;
  if (answer.Status !== "Optimal") {
    throw new ComputeError("not_converged", `The program of shared stock ended as ${answer.Status}.`);
  }
  const duals = answer.Rows.flatMap((row) => ("Dual" in row ? [row.Dual] : []));
  const rows = program.quantities.length * componentsOf(program).length;
  const first = program.units.length;
  return {
    // A line that takes no more binds from above: its dual is 0 or less.
    byRow: duals.slice(first, first + rows).map((dual) => Math.max(0, 0 - dual)),
    value: answer.ObjectiveValue,
  };
}

/** Components in the order of their units. */
export const componentsOf = ({ units }: Pick<StockProgram, "units">): number[] => [
  ...new Set(units.map(({ component }) => component)),
];

type Names = readonly (readonly { readonly name: string; readonly column: Column; readonly c: number }[])[];

const namesOf = ({ units, allowed }: StockProgram): Names =>
  units.map(({ columns }, u) =>
    columns.flatMap((column, c) => (allowed(column) ? [{ name: `x${u}_${c}`, column, c }] : [])),
  );

/** The program in the format LP. Rows: one for each unit; then for each line, one for each component; then the others. */
function textOf(program: StockProgram, names: Names): string {
  const { units, quantities, of, within } = program;
  const sum = (value: (column: Column, unit: number) => number) => {
    const terms = names.flatMap((own, u) =>
      own.flatMap(({ name, column }) => {
        const factor = value(column, u);
        return factor === 0 ? [] : [`${factor < 0 ? "-" : "+"} ${Math.abs(factor)} ${name}`];
      }),
    );
    return terms.length > 0 ? terms.join("\n ") : `0 ${names[0]?.[0]?.name ?? "x"}`;
  };
  const components = componentsOf(program);
  const rows = [
    ...names.map((own, u) => `one${u}: ${own.map(({ name }) => name).join("\n + ")} = 1`),
    ...quantities.flatMap((quantity, k) =>
      components.map((_, at) => {
        const soFar = new Set(components.slice(0, at + 1));
        const taken = sum((column, u) => (soFar.has(units[u]?.component ?? -1) ? (column.net[k] ?? 0) : 0));
        return `line${k}_${at}: ${taken} <= ${quantity}`;
      }),
    ),
    ...within.map((row, k) => `within${k}: ${sum(row.of)} <= ${row.most}`),
  ];
  return `Minimize\n obj: ${sum(of)}\nSubject To\n ${rows.join("\n ")}\n`;
}

function keepsStock({ units, quantities }: StockProgram, picks: readonly number[]): boolean {
  const net = quantities.map(() => 0);
  return units.every(({ component, columns }, u) => {
    for (const k of net.keys()) net[k] = (net[k] ?? 0) + (columns[picks[u] ?? -1]?.net[k] ?? 0);
    const ends = units[u + 1]?.component !== component;
    return !ends || net.every((count, k) => count <= (quantities[k] ?? Infinity));
  });
}
