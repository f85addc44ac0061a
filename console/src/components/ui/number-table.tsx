import { useState } from "react";
import type { Cell, FigureTable } from "../../../../shared/figures/figure-table.ts";
import { writeNumber, writeSigned } from "../../../../shared/figures/write-number.ts";
import { Button } from "./button.tsx";
import { joinClasses } from "./join-classes.ts";
import { VerdictWord } from "./verdict-mark.tsx";

/** A long table begins with this many rows. */
const rowsAtFirst = 100;
const fewColumns = 6;
/** A table up to this long is not parted between two sheets of paper. */
const rowsTogether = 12;

/** The numbers of a figure: one column one unit and one count of decimals, so that points stand under points. */
export function NumberTable({ table }: { table: FigureTable }) {
  const [all, setAll] = useState(false);
  const rows = all ? table.rows : table.rows.slice(0, rowsAtFirst);
  // A few columns across a wide sheet would part a row's numbers from its name.
  const isNarrow = table.columns.length <= fewColumns;
  const hidden = table.rows.length - rows.length;
  return (
    <div className={joinClasses("min-w-0", table.rows.length <= rowsTogether && "keep-together")}>
      <div className="scroll-x overflow-x-auto" tabIndex={0} role="region" aria-label={table.caption}>
        <table className={joinClasses("border-collapse text-[0.8125rem]", isNarrow ? "w-fit" : "w-full")}>
          <caption className="pb-2 text-left font-semibold">{table.caption}</caption>
          <thead>
            <tr className="border-y border-rule align-bottom">
              {table.columns.map((column, index) => (
                <th
                  key={index}
                  scope="col"
                  className={joinClasses(
                    "max-w-36 px-3 py-1 font-normal first:pl-0 last:pr-0",
                    side(column.align),
                  )}
                >
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
                  const look = joinClasses(
                    "px-3 py-1 font-normal whitespace-nowrap first:pl-0 last:pr-0",
                    side(table.columns[index]?.align),
                  );
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
