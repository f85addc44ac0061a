import type { ShimMoveResult } from "../../schemas/shim-moves.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";

type Step = ShimMoveResult["steps"][number];

/** One table a step, one row a part of it: how far each support has come, and what each indicator should then read. */
export function tabulateSteps(result: ShimMoveResult, units: Units): FigureTable[] {
  return result.steps.map((step) => tabulateStep(step, units));
}

function tabulateStep(step: Step, units: Units): FigureTable {
  const { increments } = step;
  const supports = [...new Set(increments.flatMap(({ moves }) => moves.map(({ support }) => support)))];
  const indicators = [...new Set(increments.flatMap((part) => part.indicators.map(({ id }) => id)))];
  const decimals = decimalsFor(
    increments.flatMap((part) => [
      ...part.moves.flatMap(({ h, v }) => [h, v]),
      ...part.indicators.map(({ reading }) => reading),
    ]),
    decimalsAcross(units.offset),
  );
  return {
    caption: `Step ${step.order}: ${step.component}, ${increments.length === 1 ? "in one part" : `in ${increments.length} parts`}`,
    columns: [
      numberColumn("part", null),
      ...supports.flatMap((support) => [
        numberColumn(`${support} h`, units.offset),
        numberColumn(`${support} v`, units.offset),
      ]),
      ...indicators.map((id) => numberColumn(`${id} reads`, units.offset)),
    ],
    rows: increments.map((part, index) => [
      numberCell(index + 1, 0),
      ...supports.flatMap((id) => {
        const move = part.moves.find(({ support }) => support === id);
        return [signedCell(move?.h, decimals), signedCell(move?.v, decimals)];
      }),
      ...indicators.map((id) =>
        signedCell(part.indicators.find((indicator) => indicator.id === id)?.reading, decimals),
      ),
    ]),
  };
}

/** The neighbours to read while a component moves, and the changes at which to stop; null when no step has any. */
export function tabulateWatch(result: ShimMoveResult, units: Units): FigureTable | null {
  const unit = units.offset;
  const watched = result.steps.flatMap(({ order, component, watch }) =>
    watch.map((one) => ({ ...one, order, component })),
  );
  if (watched.length === 0) return null;
  const decimals = decimalsFor(
    watched.flatMap(({ stopAt }) => [...stopAt.h, ...stopAt.v]),
    decimalsAcross(unit),
  );
  return {
    caption: "Watch while moving: change of each station, and where to stop",
    columns: [
      numberColumn("step", null),
      textColumn("component"),
      textColumn("station"),
      numberColumn("h", unit),
      numberColumn("stop under", unit),
      numberColumn("stop over", unit),
      numberColumn("v", unit),
      numberColumn("stop under", unit),
      numberColumn("stop over", unit),
    ],
    rows: watched.map(({ order, component, station, change, stopAt }) => [
      numberCell(order, 0),
      textCell(component),
      textCell(station),
      ...(["h", "v"] as const).flatMap((plane) => [
        signedCell(change[plane], decimals),
        signedCell(stopAt[plane][0], decimals),
        signedCell(stopAt[plane][1], decimals),
      ]),
    ]),
  };
}
