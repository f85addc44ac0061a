import type { ColdTargetRequest, ColdTargetResult } from "../../schemas/cold-targets.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type Cell,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, decimalsFor } from "../write-number.ts";

type Pair = { readonly h: number; readonly v: number };

/** Every station's cold target with what it was made of: rotor or line, less growth, less closing. */
export function tabulateTargets(result: ColdTargetResult, units: ColdTargetRequest["units"]): FigureTable {
  const { stations } = result;
  const unit = units.offset;
  const hasUncertainty = stations.some(({ uncertainty }) => uncertainty !== undefined);
  const hasWire = stations.some(({ wireSag }) => wireSag !== undefined);
  const decimals = decimalsFor(
    stations.flatMap(({ target, parts }) => [target, baseOf(parts), parts.growth]).flatMap(bothOf),
    decimalsAcross(unit),
  );
  const pair = (value: Pair): Cell[] => bothOf(value).map((number) => signedCell(number, decimals));
  const columns = (name: string) => [numberColumn(`${name} h`, unit), numberColumn(`${name} v`, unit)];
  return {
    caption: "Cold targets, relative to the axis",
    columns: [
      textColumn("station"),
      textColumn("follows"),
      numberColumn("z", units.axial),
      ...columns("target"),
      ...(hasUncertainty ? [numberColumn("u of h", unit), numberColumn("u of v", unit)] : []),
      ...columns("rotor or line"),
      ...columns("growth"),
      ...columns("closing"),
      ...(hasWire ? [numberColumn("wire sag", unit)] : []),
    ],
    rows: stations.map(({ id, z, follows, target, uncertainty, parts, wireSag }) => [
      textCell(id),
      textCell(follows === "rotor" ? "rotor" : "bearing line"),
      numberCell(z, decimalsAlong(units.axial)),
      ...pair(target),
      ...(hasUncertainty ? [numberCell(uncertainty?.h, decimals), numberCell(uncertainty?.v, decimals)] : []),
      ...pair(baseOf(parts)),
      ...pair(parts.growth),
      ...pair(parts.closing),
      ...(hasWire ? [numberCell(wireSag, decimals)] : []),
    ]),
  };
}

function baseOf({ rotor, line }: ColdTargetResult["stations"][number]["parts"]): Pair {
  return rotor ?? line ?? { h: 0, v: 0 };
}

function bothOf({ h, v }: Pair): number[] {
  return [h, v];
}
