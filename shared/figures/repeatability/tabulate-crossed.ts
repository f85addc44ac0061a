import type { CrossedResult } from "../../schemas/repeatability-answers.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsForSmallest } from "../significant-decimals.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";
import { probabilityCell, significanceCell } from "./probability-cell.ts";

const componentNames = [
  "repeatability",
  "person",
  "interaction",
  "reproducibility",
  "reading",
  "station",
] as const satisfies readonly (keyof CrossedResult["components"])[];
const componentWords: Partial<Record<(typeof componentNames)[number], string>> = {
  reproducibility: "reproducibility (person and interaction)",
  reading: "one reading by anybody",
  station: "the stations themselves",
};

/** The analysis of variance, one table a plane. */
export function tabulateVariance({ table }: CrossedResult, units: Units): FigureTable[] {
  return (["h", "v"] as const).map((plane) => {
    const lines = table[plane];
    const decimals = decimalsForSmallest(
      lines.flatMap(({ sumOfSquares, meanSquare }) => [sumOfSquares, meanSquare]),
      decimalsAcross(units.offset),
    );
    return {
      caption: `Analysis of variance, ${plane}`,
      columns: [
        textColumn("source"),
        numberColumn("sum of squares", `${units.offset}²`),
        numberColumn("dof", null),
        numberColumn("mean square", `${units.offset}²`),
        numberColumn("F", null),
        numberColumn("probability", null),
        textColumn("outcome"),
      ],
      rows: lines.map(({ source, sumOfSquares, dof, meanSquare, f, pValue, significant }) => [
        textCell(source),
        numberCell(sumOfSquares, decimals),
        numberCell(dof, 0),
        numberCell(meanSquare, decimals),
        numberCell(f, 2),
        probabilityCell(pValue),
        significanceCell(significant),
      ]),
    };
  });
}

/** What each source adds to a single reading, as standard deviations. */
export function tabulateComponents({ components }: CrossedResult, units: Units): FigureTable {
  const unit = units.offset;
  const decimals = decimalsFor(
    componentNames.flatMap((name) => [components[name].h, components[name].v]),
    decimalsAcross(unit),
  );
  return {
    caption: "Standard deviations of a single reading, by source",
    columns: [
      textColumn("source"),
      numberColumn("h", unit),
      numberColumn("v", unit),
      numberColumn("worst direction", unit),
    ],
    rows: componentNames.map((name) => [
      textCell(componentWords[name] ?? name),
      numberCell(components[name].h, decimals),
      numberCell(components[name].v, decimals),
      numberCell(components[name].radial, decimals),
    ]),
  };
}

/** How far each person's mean lies from the mean of all. */
export function tabulatePeople({ personOffsets }: CrossedResult, units: Units): FigureTable {
  const decimals = decimalsFor(
    personOffsets.flatMap(({ h, v }) => [h, v]),
    decimalsAcross(units.offset),
  );
  return {
    caption: "People, from the mean of all",
    columns: [textColumn("person"), numberColumn("h", units.offset), numberColumn("v", units.offset)],
    rows: personOffsets.map(({ person, h, v }) => [
      textCell(person),
      signedCell(h, decimals),
      signedCell(v, decimals),
    ]),
  };
}
