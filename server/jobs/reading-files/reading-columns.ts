import { unitChoices, type Dimension, type LengthUnit } from "../../../shared/units.ts";
import type { TableFault } from "./table.ts";

/** What a column holds: one value of the whole reading, or one of each row. */
export interface Column {
  readonly of: "reading" | "row";
  readonly as: "text" | "moment" | "boolean" | "number";
  /** Of a length: the dimension whose unit it is converted into. */
  readonly dimension?: Dimension;
}

const text = { of: "reading", as: "text" } as const;
const lengthOf = (of: Column["of"], dimension: Dimension): Column => ({ of, as: "number", dimension });

/** Every column a file of readings may have, by the name that stands in its head. */
export const readingColumns = {
  station: text,
  form: text,
  "taken at": { of: "reading", as: "moment" },
  person: text,
  "upper half": text,
  instrument: text,
  closing: { of: "reading", as: "boolean" },
  seen: text,
  sense: text,
  zero: text,
  method: text,
  "nominal diameter": lengthOf("reading", "bore"),
  "reading uncertainty": lengthOf("reading", "offset"),
  "gauge sag": lengthOf("reading", "offset"),
  "measured to": text,
  left: lengthOf("reading", "bore"),
  right: lengthOf("reading", "bore"),
  bottom: lengthOf("reading", "bore"),
  top: lengthOf("reading", "bore"),
  "wire diameter": lengthOf("reading", "bore"),
  sag: lengthOf("reading", "offset"),
  clock: { of: "row", as: "number" },
  reading: lengthOf("row", "offset"),
  h: lengthOf("row", "bore"),
  v: lengthOf("row", "bore"),
  z: lengthOf("row", "axial"),
  u: lengthOf("row", "offset"),
} as const satisfies Record<string, Column>;

export type ReadingColumn = keyof typeof readingColumns;

/** A column of a file, and what it is taken for. */
export interface MappedColumn {
  readonly header: string;
  readonly column: ReadingColumn | null;
  /** Of a length. */
  readonly unit: LengthUnit | null;
}

const lengthUnits = [...new Set(Object.values(unitChoices).flat())] as LengthUnit[];

/**
 * Tells what each column of a head is: by its own name, `reading (mm)`, or by what the caller says its name stands for.
 * Names are compared without case, spaces and underscores. A column that is nothing known is a fault, unless it is to be
 * ignored: a misspelt reading must not be dropped in silence.
 */
export function mapColumns(
  head: readonly string[],
  {
    names,
    ignored,
  }: { readonly names: ReadonlyMap<string, ReadingColumn>; readonly ignored: readonly string[] },
): { readonly columns: readonly MappedColumn[]; readonly faults: readonly TableFault[] } {
  const faults: TableFault[] = [];
  const at = (header: string, code: TableFault["code"], detail: string) =>
    faults.push({ line: 1, column: header, code, detail });
  const theirs = new Map([...names].map(([header, column]) => [plain(header), column]));
  const taken = new Set<ReadingColumn>();
  const columns = head.map((header): MappedColumn => {
    const nothing = { header, column: null, unit: null };
    if (header === "" || ignored.some((name) => plain(name) === plain(header))) return nothing;
    const [, name = header, unitText = null] = /^(.*?)\s*[([]([^)\]]*)[)\]]$/.exec(header) ?? [];
    const column = theirs.get(plain(header)) ?? theirs.get(plain(name)) ?? known(name);
    if (!column) {
      at(
        header,
        "unknown_field",
        "No column has this name; say what it stands for, or that it is to be ignored.",
      );
      return nothing;
    }
    if (taken.has(column)) at(header, "duplicate_id", `Another column stands for ${column}, too.`);
    taken.add(column);
    return { header, column, unit: unitOf(column, unitText, (code, detail) => at(header, code, detail)) };
  });
  for (const needed of ["station", "form", "taken at"] as const) {
    if (!taken.has(needed)) at(needed, "required", `The file has no column ${needed}.`);
  }
  return { columns, faults };
}

function unitOf(
  column: ReadingColumn,
  unitText: string | null,
  fault: (code: TableFault["code"], detail: string) => void,
): LengthUnit | null {
  const { dimension } = readingColumns[column] as Column;
  if (!dimension) {
    if (column === "clock" && unitText !== null && !/^(deg|°)$/i.test(unitText)) {
      fault("choice_unknown", "Clock angles are in degrees: clock (deg).");
    }
    return null;
  }
  const unit = lengthUnits.find((one) => one === unitText?.trim().toLowerCase());
  if (unit) return unit;
  if (unitText === null) fault("units_missing", `State the unit in the head: ${column} (mm).`);
  else fault("choice_unknown", `The unit is one of ${lengthUnits.join(", ")}.`);
  return null;
}

const plain = (name: string): string => name.toLowerCase().replaceAll(/[\s_-]+/g, "");
const known = (name: string): ReadingColumn | undefined =>
  (Object.keys(readingColumns) as ReadingColumn[]).find((column) => plain(column) === plain(name));
