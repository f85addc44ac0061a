import type { FigureTable } from "../../../../shared/figures/figure-table.ts";
import type { Figure, Tone } from "../../../../shared/figures/shape.ts";

/** What a section is made of, before anything has a place. */
export type Block =
  | { readonly kind: "heading"; readonly text: string }
  | { readonly kind: "text"; readonly text: string; readonly tone?: Tone }
  | { readonly kind: "list"; readonly items: readonly string[]; readonly tone?: Tone }
  | { readonly kind: "fields"; readonly fields: readonly (readonly [name: string, value: string])[] }
  | { readonly kind: "table"; readonly table: FigureTable }
  /** Drawn as large as it is, or smaller where that leaves no room for what belongs under it, `under` millimetres high. */
  | { readonly kind: "figure"; readonly figure: Figure; readonly under: number }
  /** On to the next column, or sheet. */
  | { readonly kind: "break" };

/** A part of the report that begins on a sheet of its own. */
export interface Section {
  readonly title: string;
  readonly columns: 1 | 2;
  readonly blocks: readonly Block[];
}

export const headingBlock = (text: string): Block => ({ kind: "heading", text });
export const textBlock = (text: string, tone: Tone = "ink"): Block => ({ kind: "text", text, tone });
export const listBlock = (items: readonly string[], tone: Tone = "ink"): Block => ({
  kind: "list",
  items,
  tone,
});

/** A table under a heading of its own; nothing where there is no table, or none of its rows. */
export function tableBlocks(table: FigureTable | null): Block[] {
  return table === null || table.rows.length === 0
    ? []
    : [headingBlock(table.caption), { kind: "table", table }];
}
