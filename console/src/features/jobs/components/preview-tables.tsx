import type { ReadingPreview } from "../../../../../shared/schemas/reading-files.ts";
import {
  numberCell,
  numberColumn,
  textCell,
  textColumn,
} from "../../../../../shared/figures/figure-table.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { readingForms } from "./job-words.ts";

/** What a file is taken for: every fault by its line, then its columns and readings. */
export function PreviewTables({ preview }: { preview: ReadingPreview }) {
  const { faults, columns, readings, file, decimal } = preview;
  return (
    <section aria-label={`Preview of ${file.name}`} className="sheet-stack">
      <p>
        {file.name}, {file.bytes} bytes
        {decimal !== null && `, decimal ${decimal}`}: {readings.length} readings, {faults.length}{" "}
        {faults.length === 1 ? "fault" : "faults"}.
      </p>
      {faults.length > 0 && (
        <NumberTable
          table={{
            caption: "Faults by line",
            columns: [numberColumn("line", null), textColumn("column"), textColumn("fault")],
            rows: faults.map(({ line, column, detail }) => [
              numberCell(line, 0),
              textCell(column ?? "–"),
              textCell(detail),
            ]),
          }}
        />
      )}
      <NumberTable
        table={{
          caption: "Columns",
          columns: [textColumn("in the file"), textColumn("taken for"), textColumn("unit")],
          rows: columns.map(({ header, column, unit }) => [
            textCell(header === "" ? "(no name)" : header),
            textCell(column ?? "left out"),
            textCell(unit ?? "–"),
          ]),
        }}
      />
      {readings.length > 0 && (
        <NumberTable
          table={{
            caption: "Readings",
            columns: [
              textColumn("station"),
              textColumn("read with"),
              textColumn("taken at, UTC"),
              numberColumn("values", null),
            ],
            rows: readings.map((reading) => [
              textCell(reading.closing ? `${reading.station}, closing` : reading.station),
              textCell(readingForms[reading.form]),
              textCell(reading.takenAt.slice(0, 16).replace("T", " ")),
              numberCell(countOf(reading), 0),
            ]),
          }}
        />
      )}
    </section>
  );
}

function countOf(reading: ReadingPreview["readings"][number]): number {
  switch (reading.form) {
    case "points":
      return reading.points.length;
    case "turned_gauge":
      return reading.readings.length;
    case "rotating_target":
      return reading.spots.length;
    case "wire":
      return [reading.wire.left, reading.wire.right, reading.wire.bottom, reading.wire.top].filter(
        (value) => value !== null && value !== undefined,
      ).length;
  }
}
