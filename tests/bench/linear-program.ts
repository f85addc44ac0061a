import { highs } from "../../server/compute/moves/highs.ts";

export interface Row {
  /** Factor of each variable, by its name. */
  readonly terms: Readonly<Record<string, number>>;
  readonly is: "<=" | ">=" | "=";
  readonly value: number;
}

/** Minimise Σ factor·variable within rows and bounds; the whole variables are integers. */
export interface Program {
  readonly least: Readonly<Record<string, number>>;
  readonly rows: readonly Row[];
  /** Variables that may be negative; all others are 0 or more. */
  readonly free: readonly string[];
  /** Whole variables with the most that each may be. */
  readonly whole: Readonly<Record<string, number>>;
}

export interface Solved {
  readonly status: string;
  /** Value of each variable; empty where none was found. */
  readonly values: Readonly<Record<string, number>>;
}

const sum = (terms: Readonly<Record<string, number>>): string =>
  Object.entries(terms)
    .filter(([, factor]) => factor !== 0)
    .map(([name, factor]) => `${factor < 0 ? "-" : "+"} ${Math.abs(factor)} ${name}`)
    .join("\n ");

/** The program as the HiGHS of npm reads it, solved to its own tolerances within a limit of time. */
export function solveByHighs({ least, rows, free, whole }: Program, seconds: number): Solved {
  const names = Object.keys(whole);
  const text = [
    "Minimize",
    ` obj: ${sum(least)}`,
    "Subject To",
    ...rows.map((row, k) => ` r${k}: ${sum(row.terms)} ${row.is} ${row.value}`),
    "Bounds",
    ...free.map((name) => ` ${name} free`),
    ...names.map((name) => ` 0 <= ${name} <= ${whole[name] ?? 0}`),
    ...(names.length > 0 ? ["General", ...names.map((name) => ` ${name}`)] : []),
    "End\n",
  ].join("\n");
  const answer = highs.solve(text, { output_flag: false, time_limit: seconds, mip_rel_gap: 1e-9 });
  const values = Object.entries(answer.Columns).flatMap(([name, column]) =>
    "Primal" in column && Number.isFinite(column.Primal) ? [[name, column.Primal] as const] : [],
  );
  return { status: answer.Status, values: Object.fromEntries(values) };
}
