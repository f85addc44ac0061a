import type { ProblemCode } from "../../../shared/error-codes.ts";

/** A cell as it stands in the file; null where it is empty, which is missing and never 0. */
export type Cell = string | number | null;

/** A file's rows: the first is the head. */
export interface Table {
  readonly head: readonly string[];
  readonly rows: readonly { readonly line: number; readonly cells: readonly Cell[] }[];
  /** What stands between cells; null in a workbook. */
  readonly delimiter: string | null;
}

/** What is wrong with a file, where: the line as a spreadsheet counts it, and the head of the column. */
export interface TableFault {
  readonly line: number;
  readonly column: string | null;
  readonly code: ProblemCode;
  readonly detail: string;
}

/** A file that cannot be read at all. */
export class UnreadableFile extends Error {
  constructor(readonly fault: TableFault) {
    super(`${fault.code}: ${fault.detail}`);
    this.name = "UnreadableFile";
  }
}
