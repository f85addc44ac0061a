import { useState } from "react";
import type { JobLog as Log } from "../../../../../shared/schemas/job-log.ts";
import { Copied } from "../../../components/ui/copied.tsx";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { writeJson } from "../../../lib/write-json.ts";
import { useJobLog } from "../api/get-job-log.ts";
import { authorName } from "./job-words.ts";

/** Every entry in the order in which it was made, withdrawn ones too. Read when it is opened. */
export function JobLog({ job }: { job: string }) {
  const [asked, setAsked] = useState(false);
  const log = useJobLog(job, asked);
  return (
    <section id="log" aria-label="Log" className="no-print">
      <SectionHeading>Log</SectionHeading>
      <Disclosure title="Every entry, in the order in which it was made" onOpen={() => setAsked(true)}>
        {log.isSuccess ? (
          <Entries log={log.data} />
        ) : log.isError ? (
          <Failure error={log.error} what="The log could not be read." onRetry={() => void log.refetch()} />
        ) : (
          <Skeleton what="the log" />
        )}
      </Disclosure>
    </section>
  );
}

type Entry = Log["entries"][number];

function Entries({ log }: { log: Log }) {
  if (log.entries.length === 0) return <p className="text-muted">Nothing has been entered.</p>;
  return (
    <div className="grid gap-4">
      <div>
        <p className="field-name">hash of the record as it stands</p>
        <Copied text={log.recordHash} what="record hash" />
      </div>
      <DataTable caption="Log" columns={columns} rows={log.entries} rowKey={({ id }) => id} />
    </div>
  );
}

const columns: DataColumn<Entry>[] = [
  {
    heading: "entry",
    lead: true,
    cell: ({ sequence, kind }) => (
      <span className="font-semibold">
        {sequence}. {kind.replaceAll("_", " ")}
      </span>
    ),
  },
  { heading: "by", cell: ({ author }) => authorName(author) },
  { heading: "made", cell: ({ createdAt }) => <Instant at={createdAt} /> },
  {
    heading: "document",
    cell: ({ document, sequence }) => (
      <details>
        <summary className="cursor-pointer text-xs text-muted">Show</summary>
        <pre
          className="max-h-80 max-w-xl overflow-auto text-xs"
          tabIndex={0}
          aria-label={`Document of entry ${sequence}`}
        >
          {writeJson(document, 60)}
        </pre>
      </details>
    ),
  },
];
