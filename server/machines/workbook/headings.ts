import type { MachineDocument } from "../../../shared/schemas/machines.ts";
import type { CellUnit, Field } from "./layout.ts";

type LengthUnits = Pick<MachineDocument["units"], "axial" | "bore" | "offset">;

/** The unit as it stands in a heading. */
export function unitWords(unit: CellUnit, { axial, bore, offset }: LengthUnits): string {
  return { axial, bore, offset, slope: `${offset}/${axial}`, deg: "deg", rad: "rad" }[unit];
}

export function headingOf({ heading, unit }: Field, units: LengthUnits): string {
  return unit ? `${heading} (${unitWords(unit, units)})` : heading;
}

/** A heading as somebody may have written it: its words, and the unit in brackets at its end. */
export function readHeading(text: string): { readonly words: string; readonly unit: string | null } {
  const [, words = text, unit = null] = /^(.*?)\s*\(([^()]*)\)\s*$/s.exec(text) ?? [];
  return { words: words.trim().toLowerCase().replaceAll(/\s+/g, " "), unit: unit?.trim() ?? null };
}

export const sameWords = (heading: string, words: string): boolean => heading.toLowerCase() === words;
