import type { Units } from "../../../../../shared/units.ts";
import { Button } from "../../../components/ui/button.tsx";
import { columnsOfForm, filledRows, pasteRows, rowsPointer, type ReadingDraft } from "./reading-draft.ts";

interface ReadingRowsProps {
  draft: ReadingDraft;
  units: Units;
  fault: (pointer: string) => string | undefined;
  onChange: (rows: string[][]) => void;
}

/** The readings of one bore, typed or pasted; a decimal comma is as good as a point. */
export function ReadingRows({ draft, units, fault, onChange }: ReadingRowsProps) {
  const { form } = draft;
  const rows = draft.rows[form];
  const columns = columnsOfForm[form];
  const filled = filledRows(draft);
  const set = (row: number, column: number, text: string): void =>
    onChange(
      rows.map((cells, at) => cells.map((cell, across) => (at === row && across === column ? text : cell))),
    );
  const faults = rows.flatMap((row) => {
    const sentAs = filled.indexOf(row);
    return columns.map(({ name }) => (sentAs < 0 ? undefined : fault(rowsPointer[form](sentAs, name))));
  });
  return (
    <div className="min-w-0">
      <table className="w-full max-w-xl border-collapse">
        <caption className="field-name pb-1 text-left">
          Readings. Rows copied from a spreadsheet can be pasted in.
        </caption>
        <thead>
          <tr className="border-y border-rule text-left">
            {columns.map(({ name, heading, unit }) => (
              <th key={name} scope="col" className="px-1 py-1 font-normal">
                {heading} <span className="text-xs text-muted">{unit === "deg" ? "°" : units[unit]}</span>
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, rowIndex) => (
            <tr key={rowIndex}>
              {columns.map(({ name, heading }, column) => {
                const wrong = faults[rowIndex * columns.length + column];
                return (
                  <td key={name} className="p-1">
                    <input
                      className="control text-right"
                      aria-label={form === "wire" ? heading : `${heading}, row ${rowIndex + 1}`}
                      aria-invalid={wrong !== undefined}
                      title={wrong}
                      inputMode="decimal"
                      autoComplete="off"
                      value={row[column] ?? ""}
                      onChange={(event) => set(rowIndex, column, event.target.value)}
                      onPaste={(event) => {
                        const text = event.clipboardData.getData("text/plain");
                        if (!/[\t\n;]/.test(text)) return;
                        event.preventDefault();
                        onChange(pasteRows(form, rows, { row: rowIndex, column }, text));
                      }}
                    />
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
      {faults.some((wrong) => wrong !== undefined) && (
        <ul className="mt-1 text-xs text-signal">
          {faults.flatMap((wrong, index) =>
            wrong === undefined
              ? []
              : [
                  <li key={index}>
                    row {Math.floor(index / columns.length) + 1}, {columns[index % columns.length]?.heading}:{" "}
                    {wrong}
                  </li>,
                ],
          )}
        </ul>
      )}
      {form !== "wire" && (
        <Button
          className="mt-2"
          onClick={() => onChange([...rows.map((row) => [...row]), columns.map(() => "")])}
        >
          Add a row
        </Button>
      )}
    </div>
  );
}
