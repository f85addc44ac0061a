import type { Figure, Tone } from "../../../../shared/figures/shape.ts";
import type { LaidRow, LaidTable } from "./lay-out-table.ts";

/** What stands on a sheet, and where: millimetres from its top left, y of the top edge. */
export type Placed =
  | { readonly kind: "heading"; readonly x: number; readonly y: number; readonly text: string }
  | {
      readonly kind: "lines";
      readonly x: number;
      readonly y: number;
      readonly lines: readonly string[];
      readonly tone: Tone;
      /** Of a list: the mark before its first line, which then stands to the right of it. */
      readonly mark: string | null;
    }
  | {
      readonly kind: "field";
      readonly x: number;
      readonly y: number;
      readonly name: string;
      readonly lines: readonly string[];
    }
  | {
      readonly kind: "figure";
      readonly x: number;
      readonly y: number;
      readonly scale: number;
      readonly figure: Figure;
    }
  | {
      readonly kind: "table";
      readonly x: number;
      readonly y: number;
      /** The same object on every sheet that a table goes over. */
      readonly table: LaidTable;
      readonly rows: readonly LaidRow[];
      readonly continued: boolean;
    };

export interface LaidSheet {
  /** The section's, for the reader's outline. */
  readonly section: string;
  /** Whether the section begins here. */
  readonly first: boolean;
  readonly items: readonly Placed[];
}
