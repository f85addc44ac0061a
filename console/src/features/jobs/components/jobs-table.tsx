import { Link } from "react-router-dom";
import type { JobSummary } from "../../../../../shared/schemas/jobs.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { NamedId } from "../../../components/ui/named-id.tsx";
import { paths } from "../../../config/paths.ts";
import { JobState } from "./job-state.tsx";

export function JobsTable({ jobs }: { jobs: readonly JobSummary[] }) {
  return <DataTable caption="Jobs, newest first" columns={columns} rows={jobs} rowKey={({ id }) => id} />;
}

const columns: DataColumn<JobSummary>[] = [
  {
    heading: "job",
    lead: true,
    cell: ({ id, title }) => <NamedId name={title} id={id} path={paths.job(id)} />,
  },
  {
    heading: "machine",
    cell: ({ machineId, machineName, machineRevision }) => (
      <>
        <Link to={paths.machine(machineId)} className="link break-words">
          {machineName}
        </Link>
        <span className="block text-xs text-muted">revision {machineRevision}</span>
      </>
    ),
  },
  { heading: "state", cell: ({ state }) => <JobState state={state} /> },
  { heading: "revision", align: "end", cell: ({ revision }) => revision },
  { heading: "started", align: "end", cell: ({ createdAt }) => <Instant at={createdAt} /> },
  {
    heading: "signed",
    align: "end",
    cell: ({ signedAt }) =>
      signedAt === null ? <span className="text-muted">–</span> : <Instant at={signedAt} />,
  },
];
