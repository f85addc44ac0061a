import { Link } from "react-router-dom";
import type { CalculationSummary } from "../../../../../shared/schemas/calculations.ts";
import { CopyButton } from "../../../components/ui/copy-button.tsx";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { computations, paths } from "../../../config/paths.ts";
import { Maker } from "./maker.tsx";
import { RecordStatus } from "./record-status.tsx";

export function CalculationsTable({ records }: { records: readonly CalculationSummary[] }) {
  return (
    <DataTable
      caption="Calculations, newest first"
      columns={columns}
      rows={records}
      rowKey={(record) => record.id}
    />
  );
}

const columns: DataColumn<CalculationSummary>[] = [
  {
    heading: "calculation",
    lead: true,
    cell: (record) => (
      <>
        <Link to={paths.calculation(record.id)} className="link font-semibold">
          {computations[record.kind].name}
        </Link>
        <span className="flex items-center gap-2 text-xs text-muted">
          <span className="break-all">{record.id}</span>
          <CopyButton text={record.id} what={`id ${record.id}`} />
        </span>
      </>
    ),
  },
  { heading: "status", cell: (record) => <RecordStatus status={record.status} /> },
  {
    heading: "note",
    cell: (record) =>
      record.note === null || record.note === "" ? (
        <span className="text-muted">–</span>
      ) : (
        <span className="line-clamp-2 break-words" title={record.note}>
          {record.note}
        </span>
      ),
  },
  { heading: "by", cell: (record) => <Maker record={record} /> },
  { heading: "engine", cell: (record) => record.engineVersion },
  {
    heading: "took",
    align: "end",
    cell: (record) => <span className="whitespace-nowrap">{record.durationMs.toFixed(1)} ms</span>,
  },
  { heading: "computed", align: "end", cell: (record) => <Instant at={record.createdAt} /> },
];
