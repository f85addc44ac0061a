import type { Fault } from "../../../shared/error-codes.ts";
import { pointerOf } from "../../../shared/pointer.ts";
import { tableSheets, type Field, type TableName } from "./layout.ts";
import { putAt, valueAt, type Item, type Json } from "./nested.ts";

/** A row of a sheet as read: its members, and where each field stands, filled or not. */
export interface ReadRow {
  readonly item: Item;
  /** The address of a field's cell; null where the sheet has no such column. */
  readonly addressOf: (field: Field) => string | null;
}

export interface CellPlace {
  readonly sheet: string;
  readonly cell: string | null;
}

/** A document put together, with the cell of every member, and what did not fit. */
export interface JoinedDocument {
  readonly document: Item;
  readonly places: ReadonlyMap<string, CellPlace>;
  readonly faults: readonly (CellPlace & Pick<Fault, "code" | "detail">)[];
}

type Path = readonly (string | number)[];

/** Puts the rows of the table sheets together, under what the machine's own sheet says. */
export function joinTables(
  machine: Item,
  machinePlaces: ReadonlyMap<string, CellPlace>,
  tables: Readonly<Record<TableName, readonly ReadRow[]>>,
): JoinedDocument {
  const document = structuredClone(machine);
  const places = new Map(machinePlaces);
  const faults: (CellPlace & Pick<Fault, "code" | "detail">)[] = [];
  const place = (pointer: string, at: CellPlace) => {
    if (!places.has(pointer)) places.set(pointer, at);
  };
  /** Notes where the members of a row stand, under a path of the document. */
  const note = (table: TableName, { addressOf }: ReadRow, base: Path, from: Path = []) => {
    const { name, fields } = tableSheets[table];
    for (const field of fields as readonly Field[]) {
      if (!from.every((step, index) => field.path[index] === step)) continue;
      const at = { sheet: name, cell: addressOf(field) };
      const inside = field.path.slice(from.length);
      for (let length = 0; length <= inside.length; length += 1)
        place(pointerOf([...base, ...inside.slice(0, length)]), at);
    }
  };
  const refuse = (table: TableName, row: ReadRow, member: string, code: Fault["code"], detail: string) => {
    const { name, fields } = tableSheets[table];
    const field = (fields as readonly Field[]).find(({ path }) => path[0] === member);
    faults.push({ sheet: name, cell: field ? row.addressOf(field) : null, code, detail });
  };
  /** Adds an item to the list at a path, and answers the path that it got; null where no list can be there. */
  const append = (path: Path, item: Json): Path | null => {
    if (valueAt(document, path) === undefined && !putAt(document, path, [])) return null;
    const list = valueAt(document, path);
    if (!Array.isArray(list)) return null;
    list.push(item);
    return [...path, list.length - 1];
  };
  const plain = (table: TableName, path: Path, itemOf = ({ item }: ReadRow): Json => item) => {
    for (const row of tables[table]) {
      const at = append(path, itemOf(row));
      if (at) note(table, row, at);
    }
  };
  const indexOf = (list: unknown, id: unknown): number =>
    Array.isArray(list) ? list.findIndex((item) => valueAt(item, ["id"]) === id) : -1;
  /** The component that a row names, as a path. */
  const componentOf = (table: TableName, row: ReadRow): Path | null => {
    const at = indexOf(document["components"], row.item["component"]);
    if (at >= 0) return ["components", at];
    if (row.item["component"] !== undefined)
      refuse(table, row, "component", "unknown_reference", "No row of Components has this id.");
    return null;
  };

  plain("stations", ["stations"]);
  plain("components", ["components"]);
  for (const row of tables.supports) {
    const component = componentOf("supports", row);
    const { component: _named, ...support } = row.item;
    const at = component && append([...component, "supports"], support);
    if (at) note("supports", row, at);
  }
  for (const row of tables.stacks) {
    const component = componentOf("stacks", row);
    if (!component) continue;
    const supports = [...component, "supports"];
    const index = indexOf(valueAt(document, supports), row.item["support"]);
    if (index < 0) {
      refuse(
        "stacks",
        row,
        "support",
        "unknown_reference",
        "No row of Supports has this id in this component.",
      );
      continue;
    }
    const support = [...supports, index];
    const { place: name, clockDeg, stack = {} } = row.item;
    if (valueAt(document, [...support, "form"]) === "pads") {
      const pad = {
        ...(name === undefined ? {} : { id: name }),
        ...(clockDeg === undefined ? {} : { clockDeg }),
        stack,
      };
      const at = append([...support, "pads"], pad);
      if (!at) continue;
      place(pointerOf([...at, "id"]), { sheet: tableSheets.stacks.name, cell: row.addressOf(placeField) });
      note("stacks", row, at);
      note("stacks", row, [...at, "stack"], ["stack"]);
      continue;
    }
    if (clockDeg !== undefined)
      refuse("stacks", row, "clockDeg", "unknown_field", "Only a pad has a clock angle.");
    if (typeof name !== "string") {
      refuse("stacks", row, "place", "required", "Place is missing.");
      continue;
    }
    if (name === "__proto__") {
      refuse("stacks", row, "place", "unknown_field", "A support has no such place.");
      continue;
    }
    const at = [...support, "stacks", name];
    if (!putAt(document, at, stack))
      refuse("stacks", row, "place", "duplicate_id", "The support has this place already.");
    place(pointerOf(at), { sheet: tableSheets.stacks.name, cell: row.addressOf(placeField) });
    note("stacks", row, at, ["stack"]);
  }
  for (const row of tables.rollFeet) {
    const component = componentOf("rollFeet", row);
    const { component: _named, ...foot } = row.item;
    const at = component && append([...component, "roll", "feet"], foot);
    if (at) note("rollFeet", row, at);
  }
  plain("stock", ["shims", "stock"]);
  plain("couplings", ["couplings"]);
  plain("indicators", ["indicators"]);
  plain("cautions", ["cautions"], ({ item }) => item["text"] ?? null);
  return { document, places, faults };
}

const placeField = tableSheets.stacks.fields[2];
