import type { ComponentRequest, StackRequest, SupportRequest } from "../../schemas/move-components.ts";
import type { MachineDocument } from "../../schemas/machines.ts";
import {
  numberCell,
  numberColumn,
  textCell,
  textColumn,
  type Cell,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, writeSigned } from "../write-number.ts";

type Machine = Pick<MachineDocument, "units" | "components">;
const none = textCell("–");

/** The parts that carry the bores, and what each rests in; null without any. */
export function tabulateMachineComponents({ components = [] }: Machine): FigureTable | null {
  if (components.length === 0) return null;
  return {
    caption: "Components",
    columns: ["component", "kind", "stations", "supports", "rests in", "may move"].map(textColumn),
    rows: components.map((component) => [
      textCell(component.id),
      textCell(component.kind ?? "other"),
      textCell((component.stations ?? []).join(", ") || "–"),
      textCell((component.supports ?? []).map(({ id }) => id).join(", ") || "–"),
      component.carriedBy ? textCell(component.carriedBy) : none,
      textCell(movesWords(component)),
    ]),
  };
}

function movesWords({ fixed, allowReferenceMove }: ComponentRequest): string {
  if (fixed === true) return "no, fixed";
  return allowReferenceMove === true ? "yes, with its reference station" : "yes";
}

/** Where every component rests, and how far it can be moved there; null without any. */
export function tabulateMachineSupports({ units, components = [] }: Machine): FigureTable | null {
  const rows = components.flatMap(({ id, supports = [] }) =>
    supports.map((support): Cell[] => [
      textCell(id),
      textCell(support.id),
      textCell(support.form.replaceAll("_", " ")),
      numberCell(support.z, decimalsAlong(units.axial)),
      textCell(travelWords(support, "h", decimalsAcross(units.offset))),
      textCell(travelWords(support, "v", decimalsAcross(units.offset))),
    ]),
  );
  if (rows.length === 0) return null;
  return {
    caption: "Supports",
    columns: [
      textColumn("component"),
      textColumn("support"),
      textColumn("form"),
      numberColumn("z", units.axial),
      { ...textColumn("travel h"), unit: units.offset },
      { ...textColumn("travel v"), unit: units.offset },
    ],
    rows,
  };
}

function travelWords({ blocked = [], travel }: SupportRequest, plane: "h" | "v", decimals: number): string {
  if (blocked.includes(plane)) return "blocked";
  const range = travel?.[plane];
  return range ? range.map((bound) => writeSigned(bound, decimals)).join(" to ") : "unlimited";
}

/** Every stack as it stands, with what it may become; null without any. */
export function tabulateMachineStacks({ units, components = [] }: Machine): FigureTable | null {
  const decimals = Math.max(0, decimalsAcross(units.offset) - 1);
  const rows = components.flatMap(({ id, supports = [] }) =>
    supports.flatMap((support) =>
      stacksOf(support).map(([place, stack]): Cell[] => [
        textCell(id),
        textCell(support.id),
        textCell(place),
        numberCell(stack.thickness, decimals),
        textCell(stack.shims ? stack.shims.join(" + ") || "empty" : "not known"),
        numberCell(stack.min ?? null, decimals),
        numberCell(stack.max, decimals),
        numberCell(stack.maxCount, 0),
      ]),
    ),
  );
  if (rows.length === 0) return null;
  return {
    caption: "Shim stacks as they stand",
    columns: [
      textColumn("component"),
      textColumn("support"),
      textColumn("place"),
      numberColumn("thickness", units.offset),
      { ...textColumn("pieces"), unit: units.offset },
      numberColumn("least", units.offset),
      numberColumn("most", units.offset),
      numberColumn("most pieces", null),
    ],
    rows,
  };
}

function stacksOf(support: SupportRequest): [string, StackRequest][] {
  if (support.form === "pads")
    return support.pads.map(({ id, clockDeg, stack }) => [`${id}, ${clockDeg}°`, stack]);
  return Object.entries(support.stacks ?? {}).flatMap(([place, stack]) =>
    stack === undefined ? [] : [[place, stack] as [string, StackRequest]],
  );
}
