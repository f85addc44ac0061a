import { Link } from "react-router-dom";
import type { MachineSummary } from "../../../../../shared/schemas/machines.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { NamedId } from "../../../components/ui/named-id.tsx";
import { paths } from "../../../config/paths.ts";
import { ArchiveMachine } from "./archive-machine.tsx";

interface MachinesTableProps {
  machines: readonly MachineSummary[];
  mayWrite: boolean;
}

export function MachinesTable({ machines, mayWrite }: MachinesTableProps) {
  return (
    <DataTable
      caption="Machines, newest first"
      columns={mayWrite ? [...columns, action] : columns}
      rows={machines}
      rowKey={({ id }) => id}
    />
  );
}

const columns: DataColumn<MachineSummary>[] = [
  {
    heading: "machine",
    lead: true,
    cell: ({ id, name }) => <NamedId name={name} id={id} path={paths.machine(id)} />,
  },
  { heading: "plant tag", cell: ({ plantTag }) => plantTag ?? <span className="text-muted">–</span> },
  { heading: "revision", align: "end", cell: ({ revision }) => revision },
  { heading: "described", align: "end", cell: ({ createdAt }) => <Instant at={createdAt} /> },
  {
    heading: "jobs",
    cell: ({ id, name }) => (
      <Link className="link" to={`${paths.jobs}?machineId=${id}`} aria-label={`Jobs of ${name}`}>
        Jobs
      </Link>
    ),
  },
];

const action: DataColumn<MachineSummary> = {
  heading: "action",
  align: "end",
  cell: (machine) => <ArchiveMachine machine={machine} />,
};
