import type { CalculationRecord } from "../../../../../shared/schemas/calculations.ts";
import { Copied } from "../../../components/ui/copied.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { TitleBlock } from "../../../components/ui/title-block.tsx";
import { computations } from "../../../config/paths.ts";
import { writeUtc } from "../../../lib/write-instant.ts";
import { Maker } from "./maker.tsx";
import { RecordStatus } from "./record-status.tsx";

interface RecordTitleBlockProps {
  record: CalculationRecord;
  /** The organisation that the record belongs to. */
  owner: string;
}

/** The fields that ISO 7200 names, then what makes the record defensible. */
export function RecordTitleBlock({ record, owner }: RecordTitleBlockProps) {
  return (
    <TitleBlock
      label="Title block"
      fields={[
        { name: "legal owner", value: owner },
        { name: "title", value: computations[record.kind].name, span: 2 },
        { name: "document type", value: "calculation record" },
        { name: "identification number", value: <Copied text={record.id} what="record id" />, span: 2 },
        {
          name: "date of issue",
          value: (
            <>
              <Instant at={record.createdAt} />
              <span className="block text-xs text-muted">{writeUtc(new Date(record.createdAt))}</span>
            </>
          ),
          span: 2,
        },
        { name: "creator", value: <Maker record={record} />, span: 2 },
        { name: "approval person", value: <span className="text-muted">not approved</span>, span: 2 },
        { name: "sheet", value: "1 / 1" },
        { name: "status", value: <RecordStatus status={record.status} /> },
        { name: "engine", value: record.engineVersion },
        { name: "took", value: `${record.durationMs.toFixed(2)} ms` },
        { name: "input hash", value: <Copied text={record.inputHash} what="input hash" />, span: 2 },
        {
          name: "result hash",
          value: record.resultHash === null ? "–" : <Copied text={record.resultHash} what="result hash" />,
          span: 2,
        },
        {
          name: "request",
          value: <Copied text={record.requestId} what="request id" />,
          span: record.note ? 2 : 4,
        },
        ...(record.note ? [{ name: "note", value: record.note, span: 2 as const }] : []),
      ]}
    />
  );
}
