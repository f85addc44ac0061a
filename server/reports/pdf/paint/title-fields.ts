import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import { dateOf, draftMark, type ReportContext } from "../../report-format.ts";
import { creatorOf, ownerOf } from "../../report-words.ts";
import { titleBlock } from "../layout/sheet-geometry.ts";

/** One cell of the title block: millimetres from its own top left. */
export interface TitleCell {
  readonly name: string;
  readonly value: string;
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly isOpen?: boolean;
}

export const titleRowHeight = (titleBlock.bottom - titleBlock.top) / 4;
export const reportType = "Alignment record";

/** The fields that ISO 7200 names, those it makes compulsory first, in four rows. */
export function titleCells(
  record: JobRecord,
  { sheet, sheets }: { readonly sheet: number; readonly sheets: number },
): TitleCell[] {
  const { signature, machine } = record;
  const rows: readonly (readonly Omit<TitleCell, "x" | "y">[])[] = [
    [
      { name: "Legal owner", value: ownerOf(record) ?? "not stated", width: 90 },
      { name: "Identification number", value: `${record.id} / ${record.revision}`, width: 90 },
    ],
    [
      {
        name: "Title",
        value: machine.plantTag ? `${machine.name} (${machine.plantTag})` : machine.name,
        width: 90,
      },
      { name: "Supplementary title", value: record.title, width: 90 },
    ],
    [
      { name: "Creator", value: creatorOf(record) ?? "not stated", width: 45 },
      {
        name: "Approval person",
        value: signature?.name ?? "none yet",
        width: 45,
        isOpen: signature === null,
      },
      { name: "Document type", value: reportType, width: 45 },
      { name: "Status", value: signature ? "Signed" : draftMark, width: 45, isOpen: signature === null },
    ],
    [
      { name: "Date of issue", value: dateOf(record).toISOString().slice(0, 10), width: 45 },
      { name: "Order number", value: record.details.orderNumber ?? "not stated", width: 45 },
      { name: "Revision", value: String(record.revision), width: 30 },
      { name: "Language", value: "en", width: 30 },
      { name: "Sheet", value: `${sheet} of ${sheets}`, width: 30 },
    ],
  ];
  return rows.flatMap((row, index) => {
    let x = 0;
    return row.map((cell) => {
      const placed = { ...cell, x, y: index * titleRowHeight };
      x += cell.width;
      return placed;
    });
  });
}

/** What a sheet was made from, beside its title block. */
export function recordLines(record: JobRecord, { recordHash, engineVersion }: ReportContext): string[] {
  const { axial, bore, offset } = record.machine.units;
  return [
    `Record ${recordHash}`,
    `Machine revision ${record.machineRevision}, ${record.machineHash}`,
    `Engine version ${engineVersion}. Times are UTC.`,
    `Lengths along z in ${axial}, bores in ${bore}, offsets in ${offset}. Seen downstream: h to the right, v up.`,
  ];
}
