import { useState } from "react";
import type { Cell, FigureTable } from "../../../../shared/figures/figure-table.ts";
import { writeNumber, writeSigned } from "../../../../shared/figures/write-number.ts";
import { Button } from "./button.tsx";
import { joinClasses } from "./join-classes.ts";
import { VerdictWord } from "./verdict-mark.tsx";

/** A long table begins with this many rows. */
const rowsAtFirst = 100;

/** The numbers of a figure: one column one unit and one count of decimals, so that points stand under points. */
export function NumberTable({ table }: { table: FigureTable }) {
  const [all, setAll] = useState(false);
  const rows = all ? table.rows : table.rows.slice(0, rowsAtFirst);
  const hidden = table.rows.length - rows.length;
  return (
    <div className="min-w-0">
      <div className="scroll-x overflow-x-auto" tabIndex={0} role="region" aria-label={table.caption}>
        <table className="w-full border-collapse text-[0.8125rem]">
          <caption className="pb-2 text-left font-semibold">{table.caption}</caption>
          <thead>
            <tr className="border-y border-rule align-bottom">
              {table.columns.map((column) => (
                <th key={column.heading} scope="col" className={joinClasses("px-2 py-1 font-normal whitespace-nowrap", side(column.align))}>
                  {column.heading}
                  {column.unit !== null && <span className="block text-xs text-muted">{column.unit}</span>}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row, rowIndex) => (
              <tr key={rowIndex} className="border-b border-hair">
                {row.map((cell, index) => {
                  const look = joinClasses("px-2 py-1 font-normal whitespace-nowrap", side(table.columns[index]?.align));
                  const content = <CellContent cell={cell} />;
                  return index === 0 ? (
                    <th key={index} scope="row" className={look}>
                      {content}
                    </th>
                  ) : (
                    <td key={index} className={look}>
                      {content}
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {hidden > 0 && (
        <Button className="mt-3" onClick={() => setAll(true)}>
          Show {hidden} more {hidden === 1 ? "row" : "rows"}
        </Button>
      )}
    </div>
  );
}

function side(align: "start" | "end" | undefined): string {
  return align === "end" ? "text-right" : "text-left";
}

function CellContent({ cell }: { cell: Cell }) {
  switch (cell.kind) {
    case "text":
      return cell.text;
    case "verdict":
      return <VerdictWord verdict={cell.verdict} />;
    case "number":
      if (cell.value === null) return <span className="text-muted">–</span>;
      return cell.signed ? writeSigned(cell.value, cell.decimals) : writeNumber(cell.value, cell.decimals);
  }
}
