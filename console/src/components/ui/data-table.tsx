import type { ReactNode } from "react";
import { joinClasses } from "./join-classes.ts";

export interface DataColumn<Row> {
  readonly heading: string;
  /** Null where the row has nothing to say: a stacked row then leaves the field out. */
  readonly cell: (row: Row) => ReactNode;
  readonly align?: "end";
  /** Takes the whole line when rows are stacked on a narrow screen. */
  readonly lead?: boolean;
}

interface DataTableProps<Row> {
  caption: string;
  columns: readonly DataColumn<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
}

/**
 * A list as a table; on a narrow screen each row becomes a block of named fields. The roles are written out because
 * some browsers drop a table's meaning when its display changes.
 */
export function DataTable<Row>({ caption, columns, rows, rowKey }: DataTableProps<Row>) {
  return (
    <table role="table" className="w-full border-collapse max-lg:block">
      <caption className="sr-only">{caption}</caption>
      <thead role="rowgroup" className="max-lg:sr-only">
        <tr role="row" className="border-y border-rule">
          {columns.map((column) => (
            <th
              key={column.heading}
              role="columnheader"
              scope="col"
              className={joinClasses(
                "field-name px-2 py-2 font-normal first:pl-0 last:pr-0",
                column.align === "end" ? "text-right" : "text-left",
              )}
            >
              {column.heading}
            </th>
          ))}
        </tr>
      </thead>
      <tbody role="rowgroup" className="max-lg:block max-lg:border-t max-lg:border-rule">
        {rows.map((row) => (
          <tr
            key={rowKey(row)}
            role="row"
            className="border-b border-hair align-baseline max-lg:grid max-lg:grid-cols-[auto_1fr] max-lg:gap-x-4 max-lg:gap-y-1 max-lg:py-3"
          >
            {columns.map((column) => {
              const cell = column.cell(row);
              return (
                <td
                  key={column.heading}
                  role="cell"
                  className={joinClasses(
                    "min-w-0 lg:px-2 lg:py-2.5 lg:first:pl-0 lg:last:pr-0",
                    column.align === "end" && "lg:text-right",
                    cell === null ? "max-lg:hidden" : column.lead ? "max-lg:col-span-2" : "max-lg:contents",
                  )}
                >
                  {!column.lead && (
                    <span className="field-name pt-0.5 lg:hidden" aria-hidden="true">
                      {column.heading}
                    </span>
                  )}
                  <div className="min-w-0">{cell}</div>
                </td>
              );
            })}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
