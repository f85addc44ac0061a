import type { MonteCarloFigure } from "../../schemas/monte-carlo.ts";
import { fromMillimetres, toMillimetres, type Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  textCell,
  textColumn,
  type Cell,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross } from "../write-number.ts";

/** What trials tell of one bore or station: the fields that bores and stations have alike, and a bore's diameter. */
interface Trials {
  readonly trials: number;
  readonly failed: number;
  readonly h: MonteCarloFigure | null;
  readonly v: MonteCarloFigure | null;
  readonly diameter?: MonteCarloFigure | null;
}

interface Tried {
  readonly id: string;
  readonly monteCarlo?: Trials | undefined;
}

const words = new Map<boolean | null, string>([
  [true, "confirmed"],
  [false, "refuted"],
  [null, "left open"],
]);

/** One row for each figure that was tried, in the order sent; null where no trials were asked for. */
export function tabulateTrials(
  results: readonly Tried[],
  units: Units,
  what: "bore" | "station",
): FigureTable | null {
  const rows = results.flatMap(({ id, monteCarlo }) => (monteCarlo ? rowsOf(id, monteCarlo, units) : []));
  if (rows.length === 0) return null;
  return {
    caption: "By trials (JCGM 101)",
    columns: [
      textColumn(what),
      textColumn("figure"),
      numberColumn("mean", units.offset),
      numberColumn("standard uncertainty", units.offset),
      numberColumn("interval from", units.offset),
      numberColumn("to", units.offset),
      textColumn("first-order interval"),
      numberColumn("trials", null),
      numberColumn("failed", null),
    ],
    rows,
  };
}

function rowsOf(id: string, { trials, failed, h, v, diameter }: Trials, units: Units): Cell[][] {
  const decimals = decimalsAcross(units.offset) + 1;
  // Mean and interval of a diameter come in bore units; the table is in offset units throughout.
  const fromBore = (value: number) => fromMillimetres(toMillimetres(value, units.bore), units.offset);
  const tried = [
    { name: "h", figure: h, told: (value: number) => value },
    { name: "v", figure: v, told: (value: number) => value },
    { name: "diameter", figure: diameter ?? null, told: fromBore },
  ];
  return tried.flatMap(({ name, figure, told }) => {
    if (!figure) return [];
    const [from = null, to = null] = figure.interval ?? [];
    const position = (value: number | null) => numberCell(value === null ? null : told(value), decimals);
    return [
      [
        textCell(id),
        textCell(name),
        position(figure.mean),
        numberCell(figure.standardUncertainty, decimals),
        position(from),
        position(to),
        textCell(words.get(figure.confirmed) ?? ""),
        numberCell(trials, 0),
        numberCell(failed, 0),
      ],
    ];
  });
}
