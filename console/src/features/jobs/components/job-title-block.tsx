import { Link } from "react-router-dom";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Copied } from "../../../components/ui/copied.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { TitleBlock, type TitleField } from "../../../components/ui/title-block.tsx";
import { paths } from "../../../config/paths.ts";
import { writeUtc } from "../../../lib/write-instant.ts";

/** The fields that ISO 7200 names, then what the job was made on and what makes it defensible. */
export function JobTitleBlock({ record, organisation }: { record: JobRecord; organisation: string }) {
  const { details, machine, signature } = record;
  const stated: TitleField[] = [
    ["order", details.orderNumber],
    ["site", details.site],
    ["from", details.startsOn],
    ["to", details.endsOn],
  ].flatMap(([name, value]) => (name && value ? [{ name, value }] : []));
  return (
    <TitleBlock
      label="Title block"
      fields={[
        { name: "legal owner", value: details.owner ?? machine.owner ?? organisation },
        { name: "title", value: details.title, span: 2 },
        { name: "document type", value: "alignment job" },
        { name: "identification number", value: <Copied text={record.id} what="job id" />, span: 2 },
        {
          name: "date of issue",
          value: signature ? <Issued at={signature.createdAt} /> : <NotYet words="draft" />,
          span: 2,
        },
        { name: "creator", value: details.people?.[0]?.name ?? <NotYet words="not stated" />, span: 2 },
        {
          name: "approval person",
          value: signature ? `${signature.name}: ${signature.meaning}` : <NotYet words="not signed" />,
          span: 2,
        },
        { name: "revision", value: String(record.revision) },
        { name: "sheet", value: "1 / 1" },
        {
          name: "machine",
          value: (
            <Link
              className="link"
              to={`${paths.machine(record.machineId)}?revision=${record.machineRevision}`}
            >
              {record.machineName}, revision {record.machineRevision}
            </Link>
          ),
          span: 2,
        },
        ...stated,
        { name: "machine hash", value: <Copied text={record.machineHash} what="machine hash" />, span: 4 },
        ...(signature
          ? [
              {
                name: "record hash",
                value: <Copied text={signature.recordHash} what="record hash" />,
                span: 4 as const,
              },
            ]
          : []),
      ]}
    />
  );
}

function Issued({ at }: { at: string }) {
  return (
    <>
      <Instant at={at} />
      <span className="block text-xs text-muted">{writeUtc(new Date(at))}</span>
    </>
  );
}

function NotYet({ words }: { words: string }) {
  return <span className="text-muted">{words}</span>;
}
