import type { FigureTable } from "../../../../shared/figures/figure-table.ts";

/** Room between two columns, in characters. */
const gap = 2;

/**
 * Parts a table that no sheet is wide enough for. Each part begins with the first column, so that a row keeps its name;
 * an h and the v after it stay together. `widths` and `room` in characters.
 */
export function splitColumns(table: FigureTable, widths: readonly number[], room: number): FigureTable[] {
  const widthOf = (indices: readonly number[]): number =>
    indices.reduce((total, index) => total + (widths[index] ?? 0) + gap, 0);
  const parts: number[][] = [];
  for (const unit of pairs(table)) {
    const last = parts.at(-1);
    if (last && widthOf([0, ...last, ...unit]) <= room) last.push(...unit);
    else parts.push([...unit]);
  }
  return parts.map((part, number) => {
    const pick = <Item>(items: readonly Item[]): Item[] =>
      items.filter((_, index) => index === 0 || part.includes(index));
    return {
      caption: `${table.caption} (part ${number + 1} of ${parts.length})`,
      columns: pick(table.columns),
      rows: table.rows.map(pick),
    };
  });
}

function pairs({ columns }: FigureTable): number[][] {
  const units: number[][] = [];
  columns.forEach(({ heading }, index) => {
    if (index === 0) return;
    const last = units.at(-1);
    const before = columns[index - 1]?.heading ?? "";
    if (last && heading.endsWith(" v") && before === `${heading.slice(0, -1)}h`) last.push(index);
    else units.push([index]);
  });
  return units;
}
