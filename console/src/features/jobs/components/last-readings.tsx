import { useState } from "react";
import { decimalsAcross, writeSigned } from "../../../../../shared/figures/write-number.ts";
import type { IndicationAnswer } from "../../../../../shared/schemas/indications.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { wordsOfReading } from "./indication-draft.ts";

type Unit = JobRecord["machine"]["units"]["offset"];
const shownAtFirst = 8;

/** What was read of one component, the newest first, and what was left then. */
export function LastReadings({ answers, unit }: { answers: readonly IndicationAnswer[]; unit: Unit }) {
  const [all, setAll] = useState(false);
  if (answers.length === 0) return null;
  const hidden = answers.length - shownAtFirst;
  return (
    <div className="grid min-w-0 gap-3">
      <h3 className="font-semibold">Last readings</h3>
      <DataTable
        caption="Last readings"
        columns={columnsIn(unit)}
        rows={all ? answers : answers.slice(0, shownAtFirst)}
        rowKey={({ id }) => id}
      />
      {!all && hidden > 0 && (
        <div>
          <Button onClick={() => setAll(true)}>
            Show {hidden} earlier {hidden === 1 ? "reading" : "readings"}
          </Button>
        </div>
      )}
    </div>
  );
}

function columnsIn(unit: Unit): DataColumn<IndicationAnswer>[] {
  const decimals = decimalsAcross(unit);
  const write = (value: number | null): string => (value === null ? "\u2013" : writeSigned(value, decimals));
  return [
    { heading: "read at", cell: ({ at }) => <Instant at={at} /> },
    { heading: "by", cell: ({ person }) => person },
    {
      heading: `read, ${unit}`,
      cell: (answer) => <Lines lines={wordsOfReading(answer, decimals)} />,
    },
    {
      heading: `left, ${unit}`,
      cell: ({ supports }) =>
        supports.length === 0 ? null : (
          <Lines
            lines={supports.map(({ support, left }) => `${support} h ${write(left.h)} v ${write(left.v)}`)}
          />
        ),
    },
    {
      heading: "stop",
      cell: ({ stop }) =>
        stop.length === 0 ? null : (
          <Lines
            lines={stop.map(({ code, station, support }) => `${code} ${station ?? support ?? ""}`.trim())}
          />
        ),
    },
  ];
}

function Lines({ lines }: { lines: readonly string[] }) {
  return (
    <ul>
      {lines.map((line) => (
        <li key={line} className="break-words">
          {line}
        </li>
      ))}
    </ul>
  );
}
