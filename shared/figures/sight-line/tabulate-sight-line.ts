import type { SightLineResult } from "../../schemas/sight-line-answers.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, decimalsFor } from "../write-number.ts";

const yesOrNo = (within: boolean): string => (within ? "yes" : "no");

/** Where the beam passes each station, and where it will. */
export function tabulateBeam({ stations }: SightLineResult, units: Units): FigureTable {
  const unit = units.offset;
  const least = decimalsAcross(unit);
  const decimals = decimalsFor(
    stations.flatMap(({ off }) => [off.h, off.v]),
    least,
  );
  return {
    caption: "Beam at the stations, off where it should pass",
    columns: [
      textColumn("station"),
      textColumn("from the source"),
      numberColumn("z", units.axial),
      numberColumn("off h", unit),
      numberColumn("off v", unit),
      numberColumn("radial", unit),
      numberColumn("guard", unit),
      textColumn("within"),
      numberColumn("radial when moved", unit),
      textColumn("within when moved"),
    ],
    rows: stations.map(({ id, role, z, off, guard, within, after }) => [
      textCell(id),
      textCell(role),
      numberCell(z, decimalsAlong(units.axial)),
      signedCell(off.h, decimals),
      signedCell(off.v, decimals),
      numberCell(off.radial, decimals),
      numberCell(guard, decimals),
      textCell(yesOrNo(within)),
      numberCell(after?.distance, decimals),
      textCell(after === null ? "–" : yesOrNo(after.within)),
    ]),
  };
}

/** How the source moves; null where the survey is refused. */
export function tabulateSourceMoves({ adjustment }: SightLineResult, units: Units): FigureTable | null {
  if (adjustment === null) return null;
  const { shift, tiltMilliradians, moves } = adjustment;
  const decimals = decimalsFor([shift.h, shift.v], decimalsAcross(units.offset));
  const tilt = decimalsFor([tiltMilliradians.h, tiltMilliradians.v], 4);
  return {
    caption: "Move of the source",
    columns: [textColumn("what"), textColumn("in"), numberColumn("h", null), numberColumn("v", null)],
    rows: [
      [
        textCell("shift at the source"),
        textCell(units.offset),
        signedCell(shift.h, decimals),
        signedCell(shift.v, decimals),
      ],
      [
        textCell("tilt"),
        textCell("mrad"),
        signedCell(tiltMilliradians.h, tilt),
        signedCell(tiltMilliradians.v, tilt),
      ],
      ...(moves ?? []).map(({ at, h, v }) => [
        textCell(`at ${at}`),
        textCell(units.offset),
        signedCell(h, decimals),
        signedCell(v, decimals),
      ]),
    ],
  };
}

/** What drift and air do to the beam; null where neither was stated. */
export function tabulateSightErrors({ drift, bend }: SightLineResult, units: Units): FigureTable | null {
  if (!drift && !bend) return null;
  const rows = [
    ...(drift ? [{ what: "drift, closing less opening", ...drift }] : []),
    ...(drift?.corrections ?? []).map(({ id, h, v }) => ({ what: `drift taken out at ${id}`, h, v })),
    ...(bend?.stations ?? []).map(({ id, h, v }) => ({ what: `bend in air at ${id}`, h, v })),
  ];
  const decimals = decimalsFor(
    rows.flatMap(({ h, v }) => [h, v]),
    decimalsAcross(units.offset),
  );
  return {
    caption: "Drift and air",
    columns: [textColumn("what"), numberColumn("h", units.offset), numberColumn("v", units.offset)],
    rows: rows.map(({ what, h, v }) => [textCell(what), signedCell(h, decimals), signedCell(v, decimals)]),
  };
}
