/** The numbers of a figure as a table: what stands beside it, on the screen and on paper. */
export type Cell =
  | { readonly kind: "text"; readonly text: string }
  | {
      readonly kind: "number";
      readonly value: number | null;
      readonly decimals: number;
      readonly signed?: boolean;
    }
  | { readonly kind: "verdict"; readonly verdict: "conforms" | "undecided" | "exceeds" };

export interface Column {
  readonly heading: string;
  /** Written under the heading; null where a number has none. */
  readonly unit: string | null;
  readonly align: "start" | "end";
}

export interface FigureTable {
  readonly caption: string;
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly Cell[])[];
}

export const textCell = (text: string): Cell => ({ kind: "text", text });
export const numberCell = (value: number | null | undefined, decimals: number): Cell => ({
  kind: "number",
  value: value ?? null,
  decimals,
});
export const signedCell = (value: number | null | undefined, decimals: number): Cell => ({
  kind: "number",
  value: value ?? null,
  decimals,
  signed: true,
});
export const numberColumn = (heading: string, unit: string | null): Column => ({
  heading,
  unit,
  align: "end",
});
export const textColumn = (heading: string): Column => ({ heading, unit: null, align: "start" });
