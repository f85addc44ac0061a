import type { MachineDocument } from "../../schemas/machines.ts";
import { numberCell, numberColumn, textCell, textColumn, type FigureTable } from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, decimalsFor } from "../write-number.ts";

/** Shims at hand, thickest first; null where none are listed. */
export function tabulateStock({
  units,
  shims,
}: Pick<MachineDocument, "units" | "shims">): FigureTable | null {
  const stock = shims?.stock ?? [];
  if (stock.length === 0) return null;
  const decimals = decimalsFor(
    stock.map(({ thickness }) => thickness),
    Math.max(0, decimalsAcross(units.offset) - 1),
  );
  return {
    caption: "Shims in stock",
    columns: [numberColumn("thickness", units.offset), numberColumn("pieces", null)],
    rows: [...stock]
      .sort((one, other) => other.thickness - one.thickness)
      .map(({ thickness, quantity }) => [
        numberCell(thickness, decimals),
        quantity === null || quantity === undefined ? textCell("unlimited") : numberCell(quantity, 0),
      ]),
  };
}

/** What is said of shims beside the stock, in sentences. */
export function shimSentences({
  units,
  shims,
  maximumIncrement,
  maximumMisfit,
}: Pick<MachineDocument, "units" | "shims" | "maximumIncrement" | "maximumMisfit">): string[] {
  const unit = units.offset;
  return [
    ...(shims?.cutToSize
      ? [`Shims are cut to whole multiples of ${shims.cutToSize.increment} ${unit}.`]
      : []),
    ...(shims?.reuse === true ? ["Pieces taken out go back to stock."] : []),
    ...(maximumIncrement ? [`At most ${maximumIncrement} ${unit} is moved at once.`] : []),
    ...(maximumMisfit === undefined
      ? []
      : [`At most ${maximumMisfit} ${unit} of misfit is left at a place.`]),
  ];
}

/** Indicators that watch the components; null without any. */
export function tabulateIndicators({
  units,
  indicators = [],
}: Pick<MachineDocument, "units" | "indicators">): FigureTable | null {
  if (indicators.length === 0) return null;
  return {
    caption: "Indicators",
    columns: [
      textColumn("indicator"),
      textColumn("on"),
      numberColumn("z", units.axial),
      numberColumn("clock", "°"),
      textColumn("contact"),
    ],
    rows: indicators.map(({ id, component, z, clockDeg, contact }) => [
      textCell(id),
      textCell(component),
      numberCell(z, decimalsAlong(units.axial)),
      numberCell(clockDeg, 0),
      textCell(contact ?? "outside"),
    ]),
  };
}
