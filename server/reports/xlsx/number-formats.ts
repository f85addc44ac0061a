import { decimalsAcross, decimalsAlong } from "../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { fixed } from "../../spreadsheets/cell.ts";

/** Formats of numbers along the machine and across it, by its units. */
export function formatsOf({ machine: { units } }: JobRecord): {
  readonly along: string;
  readonly across: string;
} {
  return { along: fixed(decimalsAlong(units.axial)), across: fixed(decimalsAcross(units.offset)) };
}
