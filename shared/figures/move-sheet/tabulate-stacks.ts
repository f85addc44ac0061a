import type { ShimMoveResult } from "../../schemas/shim-moves.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type Column,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor, writeNumber } from "../write-number.ts";

/** What is done to every stack, in the order of the components; null when no support has any. */
export function tabulateStacks(result: ShimMoveResult, units: Units): FigureTable | null {
  const unit = units.offset;
  const stacks = result.components.flatMap(({ id, stacks }) =>
    stacks.map((stack) => ({ ...stack, component: id })),
  );
  if (stacks.length === 0) return null;
  const decimals = decimalsFor(
    stacks.flatMap(({ from, to, ideal, change }) => [from, to, ideal, change]),
    decimalsAcross(unit),
  );
  const pieceDecimals = decimalsNeeded(
    stacks.flatMap(({ add, remove }) => [...add, ...remove]),
    decimals,
  );
  const pieces = (thicknesses: readonly number[]) => textCell(writePieces(thicknesses, pieceDecimals));
  const piecesColumn = (heading: string): Column => ({ heading, unit, align: "start" });
  return {
    caption: "Shims",
    columns: [
      textColumn("component"),
      textColumn("support"),
      textColumn("place"),
      numberColumn("from", unit),
      numberColumn("ideal", unit),
      numberColumn("change", unit),
      numberColumn("to", unit),
      piecesColumn("add"),
      piecesColumn("remove"),
      numberColumn("misfit", unit),
    ],
    rows: stacks.map((stack) => [
      textCell(stack.component),
      textCell(stack.support),
      textCell(stack.place),
      numberCell(stack.from, decimals),
      signedCell(stack.ideal, decimals),
      signedCell(stack.change, decimals),
      numberCell(stack.to, decimals),
      pieces(stack.add),
      pieces(stack.remove),
      signedCell(stack.misfit, decimals),
    ]),
  };
}

/** Piece by piece, all with as many decimals as the finest piece needs: "1.00 + 0.05". */
function writePieces(thicknesses: readonly number[], decimals: number): string {
  if (thicknesses.length === 0) return "–";
  return thicknesses.map((thickness) => writeNumber(thickness, decimals)).join(" + ");
}

/** The fewest decimals that write all of `values` as `most` decimals would. */
function decimalsNeeded(values: readonly number[], most: number): number {
  const needed = values.map(
    (value) =>
      writeNumber(value, most)
        .replace(/\.?0+$/, "")
        .split(".")[1]?.length,
  );
  return Math.max(0, ...needed.map((length = 0) => length));
}
