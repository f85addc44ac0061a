import type { ReactNode } from "react";
import type { StoredReading } from "../../../../../shared/schemas/job-surveys.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { authorName, readingWords } from "./job-words.ts";
import { Withdraw } from "./withdraw.tsx";

interface ReadingsTableProps {
  job: string;
  caption: string;
  readings: readonly StoredReading[];
  mayAct: boolean;
}

/** Every reading of a survey; one that counts no more is struck, never hidden. */
export function ReadingsTable({ job, caption, readings, mayAct }: ReadingsTableProps) {
  const action: DataColumn<StoredReading> = {
    heading: "action",
    align: "end",
    cell: (one) =>
      one.counts ? <Withdraw job={job} entry={one.id} what={`reading of ${one.reading.station}`} /> : null,
  };
  return (
    <DataTable
      caption={caption}
      columns={mayAct ? [...columns, action] : columns}
      rows={readings}
      rowKey={({ id }) => id}
    />
  );
}

const columns: DataColumn<StoredReading>[] = [
  {
    heading: "station",
    lead: true,
    cell: (one) => (
      <>
        <Struck by={one}>
          <span className="font-semibold">{one.reading.station}</span>
          {one.reading.closing === true && ", closing"}
        </Struck>
        {!one.counts && <span className="text-xs text-muted"> withdrawn, or a later one counts</span>}
      </>
    ),
  },
  { heading: "read with", cell: (one) => <Struck by={one}>{readingWords(one)}</Struck> },
  {
    heading: "taken",
    cell: (one) => (
      <Struck by={one}>
        <Instant at={one.reading.takenAt} />
      </Struck>
    ),
  },
  { heading: "by", cell: (one) => <Struck by={one}>{one.reading.person ?? authorName(one.author)}</Struck> },
  {
    heading: "upper half",
    cell: ({ reading: { upperHalf } }) =>
      upperHalf === "off" ? (
        <span className="font-semibold text-signal">off</span>
      ) : (
        (upperHalf ?? <span className="text-muted">not stated</span>)
      ),
  },
  {
    heading: "file",
    cell: ({ sourceFile }) =>
      sourceFile && (
        <span className="text-xs break-all" title={sourceFile.sha256}>
          {sourceFile.name}
        </span>
      ),
  },
];

function Struck({ by, children }: { by: StoredReading; children: ReactNode }) {
  return by.counts ? <span>{children}</span> : <s className="text-muted">{children}</s>;
}
