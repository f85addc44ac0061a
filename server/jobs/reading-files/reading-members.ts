import type { ReadingColumn } from "./reading-columns.ts";

export type Value = string | number | boolean;
export type Values = Partial<Record<ReadingColumn, Value>>;

/** A reading as its rows tell it: what holds for the whole, and what each row says. */
export interface GatheredValues {
  readonly whole: Values;
  readonly rows: readonly { readonly line: number; readonly values: Values }[];
}

/** Member on the wire → column of the file. */
type Members = Readonly<Record<string, ReadingColumn>>;

export const wholeMembers: Members = {
  station: "station",
  form: "form",
  takenAt: "taken at",
  person: "person",
  upperHalf: "upper half",
  instrument: "instrument",
  closing: "closing",
  seen: "seen",
  sense: "sense",
  zero: "zero",
  method: "method",
  nominalDiameter: "nominal diameter",
  readingUncertainty: "reading uncertainty",
  gaugeSag: "gauge sag",
};
export const wireMembers: Members = {
  left: "left",
  right: "right",
  bottom: "bottom",
  top: "top",
  sag: "sag",
  wireDiameter: "wire diameter",
  measuredTo: "measured to",
};
export const rowMembers: Members = { clockDeg: "clock", reading: "reading", h: "h", v: "v", z: "z", u: "u" };
/** By form, the list that its rows make, and the members of each. */
const rowLists: Readonly<Record<string, { readonly list: string; readonly members: Members }>> = {
  points: { list: "points", members: { h: "h", v: "v", z: "z", u: "u" } },
  turned_gauge: { list: "readings", members: { clockDeg: "clock", reading: "reading", u: "u" } },
  rotating_target: { list: "spots", members: { clockDeg: "clock", h: "h", v: "v", u: "u" } },
};

/** The members of a reading, by the names of the wire. */
export function bodyOf({ whole, rows }: GatheredValues): Record<string, unknown> {
  const form = typeof whole.form === "string" ? whole.form : "";
  const own = rowLists[form];
  return {
    ...named(whole, wholeMembers),
    ...(own ? { [own.list]: rows.map(({ values }) => named(values, own.members)) } : {}),
    ...(form === "wire" ? { wire: named(whole, wireMembers) } : {}),
  };
}

function named(values: Values, names: Members): Record<string, Value> {
  return Object.fromEntries(
    Object.entries(names).flatMap(([member, column]) => {
      const value = values[column];
      return value === undefined ? [] : [[member, value]];
    }),
  );
}
