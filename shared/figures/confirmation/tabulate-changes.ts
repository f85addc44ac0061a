import type { ConfirmationResult } from "../../schemas/confirmation-answers.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type Cell,
  type Column,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";

type Pair = { readonly h: number; readonly v: number } | null;
interface Test {
  readonly statistic: number | null;
  readonly limit: number | null;
  readonly dof: number | null;
}

const testColumns: readonly Column[] = [
  numberColumn("statistic", null),
  numberColumn("limit", null),
  numberColumn("dof", null),
];
const testCells = ({ statistic, limit, dof }: Test): Cell[] => [
  numberCell(statistic, 3),
  numberCell(limit, 3),
  // Hundreds of them are as good as any number: a tenth says nothing.
  numberCell(dof, dof !== null && dof >= 100 ? 0 : 1),
];
const pairColumns = (name: string, unit: string) => [
  numberColumn(`${name} h`, unit),
  numberColumn(`${name} v`, unit),
];
const pairCells = (pair: Pair, decimals: number): Cell[] => [
  signedCell(pair?.h, decimals),
  signedCell(pair?.v, decimals),
];
const wordCell = (known: boolean | null, yes: string, no: string) =>
  textCell(known === null ? "not shown" : known ? yes : no);

function decimalsOf(pairs: readonly Pair[], units: Units): number {
  return decimalsFor(
    pairs.flatMap((pair) => (pair === null ? [] : [pair.h, pair.v])),
    decimalsAcross(units.offset),
  );
}

/** What the reference stations did between the surveys; null when there are none. */
export function tabulateReference({ reference }: ConfirmationResult, units: Units): FigureTable | null {
  const { perStation } = reference;
  if (perStation.length === 0) return null;
  const decimals = decimalsOf(
    perStation.flatMap(({ change, deviation }) => [change, deviation]),
    units,
  );
  return {
    caption: "Reference stations, after less before",
    columns: [
      textColumn("station"),
      textColumn("outcome"),
      ...pairColumns("as read", units.offset),
      ...pairColumns("as tested", units.offset),
      ...testColumns,
    ],
    rows: perStation.map((station) => [
      textCell(station.id),
      wordCell(station.repeats, "repeats", "does not repeat"),
      ...pairCells(station.change, decimals),
      ...pairCells(station.deviation, decimals),
      ...testCells(station),
    ]),
  };
}

/** The shift and tilt that the reference stations share; null where they tell none. */
export function tabulateCommonChange({ reference }: ConfirmationResult, units: Units): FigureTable | null {
  const { shift, tilt } = reference;
  if (shift === null) return null;
  const decimals = decimalsOf([shift], units);
  const slopeDecimals = decimalsFor([tilt?.h, tilt?.v], decimalsAcross(units.offset) + 2);
  return {
    caption: "What the reference stations share",
    columns: [
      textColumn("plane"),
      numberColumn("shift at z = 0", units.offset),
      numberColumn("tilt", `${units.offset} per ${units.axial}`),
    ],
    rows: (["h", "v"] as const).map((plane) => [
      textCell(plane),
      signedCell(shift[plane], decimals),
      signedCell(tilt?.[plane], slopeDecimals),
    ]),
  };
}

/** Planned against achieved, of every station that moved; null when none did. */
export function tabulateMoved({ moved }: ConfirmationResult, units: Units): FigureTable | null {
  if (moved.length === 0) return null;
  const decimals = decimalsOf(
    moved.flatMap(({ planned, achieved }) => [planned, achieved]),
    units,
  );
  return {
    caption: "Stations moved, planned and achieved",
    columns: [
      textColumn("station"),
      textColumn("outcome"),
      ...pairColumns("planned", units.offset),
      ...pairColumns("achieved", units.offset),
      numberColumn("ratio", null),
      ...pairColumns("difference", units.offset),
      ...testColumns,
    ],
    rows: moved.map((station) => [
      textCell(station.id),
      wordCell(station.agrees, "as planned", "not as planned"),
      ...pairCells(station.planned, decimals),
      ...pairCells(station.achieved, decimals),
      numberCell(station.ratio, 3),
      ...pairCells(station.difference, decimals),
      ...testCells(station),
    ]),
  };
}

/** Stations that nobody meant to move; null when there are none. */
export function tabulateUnmoved({ unmoved }: ConfirmationResult, units: Units): FigureTable | null {
  if (unmoved.length === 0) return null;
  const decimals = decimalsOf(
    unmoved.map(({ change }) => change),
    units,
  );
  return {
    caption: "Other stations, after less before",
    columns: [
      textColumn("station"),
      textColumn("outcome"),
      ...pairColumns("change", units.offset),
      numberColumn("radial", units.offset),
      ...testColumns,
    ],
    rows: unmoved.map((station) => [
      textCell(station.id),
      wordCell(station.changed, "moved", "stayed"),
      ...pairCells(station.change, decimals),
      numberCell(station.change.radial, decimals),
      ...testCells(station),
    ]),
  };
}
