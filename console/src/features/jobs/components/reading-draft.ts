import { z } from "zod";
import type { Reading } from "../../../../../shared/schemas/job-entries.ts";
import { fromLocalMoment } from "../../../lib/local-moment.ts";
import { readDecimal } from "../../../lib/read-decimal.ts";

/** Forms that can be typed in; a rotating target's spots come as a file. */
export type TypedForm = Exclude<Reading["form"], "rotating_target">;

/** What was typed of a reading, as typed. */
export interface ReadingDraft {
  readonly station: string;
  readonly form: TypedForm;
  readonly takenAt: string;
  readonly person: string;
  readonly upperHalf: string;
  readonly closing: boolean;
  readonly sense: string;
  readonly zero: string;
  readonly gaugeSag: string;
  readonly measuredTo: string;
  readonly wireDiameter: string;
  readonly sag: string;
  /** One cell a column of the form, one row a reading; each form keeps its own. */
  readonly rows: Readonly<Record<TypedForm, readonly (readonly string[])[]>>;
}

const text = z.string();
const rows = z.array(z.array(text)).readonly();
const draftSchema: z.ZodType<ReadingDraft> = z.object({
  station: text,
  form: z.enum(["turned_gauge", "points", "wire"]),
  takenAt: text,
  person: text,
  upperHalf: text,
  closing: z.boolean(),
  sense: text,
  zero: text,
  gaugeSag: text,
  measuredTo: text,
  wireDiameter: text,
  sag: text,
  rows: z.object({ turned_gauge: rows, points: rows, wire: rows }),
});

/** A draft as it was kept; `beginning` where it was kept by another version of the console. */
export function readKeptDraft(kept: string, beginning: string): ReadingDraft {
  const parsed = draftSchema.safeParse(JSON.parse(kept));
  return parsed.success ? parsed.data : (JSON.parse(beginning) as ReadingDraft);
}

/** The columns of the table that is typed in, each with the dimension whose unit stands in its head. */
export const columnsOfForm: Record<
  TypedForm,
  readonly { readonly name: string; readonly heading: string; readonly unit: "bore" | "offset" | "deg" }[]
> = {
  turned_gauge: [
    { name: "clockDeg", heading: "clock", unit: "deg" },
    { name: "reading", heading: "reading", unit: "offset" },
  ],
  points: [
    { name: "h", heading: "h", unit: "bore" },
    { name: "v", heading: "v", unit: "bore" },
  ],
  wire: [
    { name: "left", heading: "left", unit: "bore" },
    { name: "right", heading: "right", unit: "bore" },
    { name: "bottom", heading: "bottom", unit: "bore" },
    { name: "top", heading: "top", unit: "bore" },
  ],
};

/** Where a form's rows stand in its body. */
export const rowsPointer: Record<TypedForm, (row: number, column: string) => string> = {
  turned_gauge: (row, column) => `/readings/0/readings/${row}/${column}`,
  points: (row, column) => `/readings/0/points/${row}/${column}`,
  wire: (_row, column) => `/readings/0/wire/${column}`,
};

const quarters = ["0", "90", "180", "270"];
const emptyRow = (form: TypedForm): string[] => columnsOfForm[form].map(() => "");

export function emptyDraft(station: string, takenAt: string): ReadingDraft {
  return {
    station,
    form: "turned_gauge",
    takenAt,
    person: "",
    upperHalf: "on",
    closing: false,
    sense: "larger_is_farther",
    zero: "nominal",
    gaugeSag: "",
    measuredTo: "surface",
    wireDiameter: "",
    sag: "",
    rows: {
      turned_gauge: quarters.map((clock) => [clock, ""]),
      points: quarters.map(() => emptyRow("points")),
      wire: [emptyRow("wire")],
    },
  };
}

/** Rows in which something was read: a clock angle by itself is no reading. */
export function filledRows({ form, rows }: ReadingDraft): readonly (readonly string[])[] {
  return rows[form].filter((row) =>
    row.some((cell, index) => cell.trim() !== "" && columnsOfForm[form][index]?.name !== "clockDeg"),
  );
}

/** The body of the call that adds the reading: what is missing or no number is left for the schema to refuse. */
export function bodyOf(draft: ReadingDraft): unknown {
  const common = {
    station: draft.station,
    takenAt: fromLocalMoment(draft.takenAt),
    ...optional("person", draft.person.trim() === "" ? null : draft.person.trim()),
    ...optional("upperHalf", draft.upperHalf === "" ? null : draft.upperHalf),
    ...(draft.closing ? { closing: true } : {}),
  };
  const rows = filledRows(draft).map((row) => cellsOf(draft.form, row));
  switch (draft.form) {
    case "points":
      return { readings: [{ ...common, form: "points", points: rows }] };
    case "turned_gauge":
      return {
        readings: [
          {
            ...common,
            form: "turned_gauge",
            sense: draft.sense,
            zero: draft.zero,
            ...optional("gaugeSag", readDecimal(draft.gaugeSag)),
            readings: rows,
          },
        ],
      };
    case "wire":
      return {
        readings: [
          {
            ...common,
            form: "wire",
            wire: {
              ...rows[0],
              measuredTo: draft.measuredTo,
              ...optional("wireDiameter", readDecimal(draft.wireDiameter)),
              ...optional("sag", readDecimal(draft.sag)),
            },
          },
        ],
      };
  }
}

function cellsOf(form: TypedForm, row: readonly string[]): Record<string, number> {
  const cells = columnsOfForm[form].map(({ name }, index) => [name, readDecimal(row[index] ?? "")] as const);
  return Object.fromEntries(cells.flatMap(([name, value]) => (value === null ? [] : [[name, value]])));
}

function optional<Value>(name: string, value: Value | null): Record<string, Value> {
  return value === null ? {} : { [name]: value };
}

/**
 * Rows with text pasted at a cell: lines and tabs as a spreadsheet copies them, semicolons too. Cells beyond the last
 * column are left out, rows beyond the last one added.
 */
export function pasteRows(
  form: TypedForm,
  rows: readonly (readonly string[])[],
  at: { readonly row: number; readonly column: number },
  text: string,
): string[][] {
  const next = rows.map((row) => [...row]);
  const width = columnsOfForm[form].length;
  text
    .replace(/\r?\n$/, "")
    .split(/\r?\n/)
    .forEach((line, down) => {
      const row = (next[at.row + down] ??= emptyRow(form));
      line.split(/[\t;]/).forEach((cell, across) => {
        if (at.column + across < width) row[at.column + across] = cell.trim();
      });
    });
  return next;
}
