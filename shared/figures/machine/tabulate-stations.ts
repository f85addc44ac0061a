import type { MachineDocument, MachineStation } from "../../schemas/machines.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, decimalsFor, writeNumber, writeSigned } from "../write-number.ts";

/** Every bore of a machine along z, with where it should lie and how far from there it may. */
export function tabulateStations({
  units,
  stations,
  reference = [],
}: Pick<MachineDocument, "units" | "stations" | "reference">): FigureTable {
  const targets = stations.flatMap(({ target }) => (target ? [target.h, target.v] : []));
  const decimals = decimalsFor(targets, decimalsAcross(units.offset));
  const diameterDecimals = Math.max(0, decimalsAcross(units.bore) - 2);
  const hasUncertainty = stations.some(({ targetUncertainty }) => targetUncertainty);
  return {
    caption: "Stations",
    columns: [
      textColumn("station"),
      textColumn("label"),
      textColumn("kind"),
      numberColumn("z", units.axial),
      numberColumn("diameter", units.bore),
      numberColumn("target h", units.offset),
      numberColumn("target v", units.offset),
      ...(hasUncertainty
        ? [numberColumn("u of target h", units.offset), numberColumn("u of target v", units.offset)]
        : []),
      { ...textColumn("tolerance"), unit: units.offset },
    ],
    rows: stations.map(({ id, label, kind, z, nominalDiameter, target, targetUncertainty, tolerance }) => [
      textCell(reference.includes(id) ? `${id} (ref.)` : id),
      textCell(label ?? "–"),
      textCell(kind),
      numberCell(z, decimalsAlong(units.axial)),
      numberCell(nominalDiameter, diameterDecimals),
      signedCell(target?.h ?? 0, decimals),
      signedCell(target?.v ?? 0, decimals),
      ...(hasUncertainty
        ? [numberCell(targetUncertainty?.h, decimals), numberCell(targetUncertainty?.v, decimals)]
        : []),
      textCell(toleranceWords(tolerance ?? null, decimals)),
    ]),
  };
}

/** "radial 0.1", or each plane by itself: "h ±0.1, v −0.1 to +0.05". */
export function toleranceWords(
  tolerance: NonNullable<MachineStation["tolerance"]> | null,
  decimals: number,
): string {
  if (tolerance === null) return "none";
  if ("radial" in tolerance) return `radial ${writeNumber(tolerance.radial, decimals)}`;
  const side = (bounds: number | number[]): string =>
    typeof bounds === "number"
      ? `\u00b1${writeNumber(bounds, decimals)}`
      : bounds.map((bound) => writeSigned(bound, decimals)).join(" to ");
  return `h ${side(tolerance.h)}, v ${side(tolerance.v)}`;
}
