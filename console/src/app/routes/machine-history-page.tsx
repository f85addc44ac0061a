import { Link, useParams } from "react-router-dom";
import { drawHistory } from "../../../../shared/figures/history/draw-history.ts";
import { historyModelOf } from "../../../../shared/figures/history/history-of.ts";
import { tabulateDrifts, tabulatePlaces } from "../../../../shared/figures/history/tabulate-history.ts";
import type { MachineHistory } from "../../../../shared/schemas/machine-history.ts";
import { Breadcrumb } from "../../components/ui/breadcrumb.tsx";
import { Button, ButtonLink } from "../../components/ui/button.tsx";
import { DataTable } from "../../components/ui/data-table.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { FigureView } from "../../components/ui/figure-view.tsx";
import { Instant } from "../../components/ui/instant.tsx";
import { NumberTable } from "../../components/ui/number-table.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths } from "../../config/paths.ts";
import { useMachine } from "../../features/machines/api/get-machine.ts";
import { useMachineHistory } from "../../features/machines/api/get-machine-history.ts";
import { MachineStates } from "../../features/machines/components/machine-states.tsx";

export function MachineHistoryPage() {
  const { id = "" } = useParams();
  const machine = useMachine(id);
  const history = useMachineHistory(id);
  return (
    <>
      <Breadcrumb
        steps={[
          { to: paths.machines, words: "Machines" },
          { to: paths.machine(id), words: machine.data?.name ?? "Machine" },
        ]}
      />
      <PageHeading
        title={machine.data ? `History of ${machine.data.name}` : "History"}
        lead="Every station over the outages, as found and as left, each off its outage's own axis."
      >
        {history.data && <Button onClick={() => window.print()}>Print sheet</Button>}
      </PageHeading>
      <MachineStates machine={machine}>
        {() =>
          history.isPending ? (
            <Skeleton what="the history" lines={12} />
          ) : history.isError ? (
            <Failure
              error={history.error}
              what="The history could not be read."
              onRetry={() => void history.refetch()}
            />
          ) : history.data.outages.length === 0 ? (
            <Empty title="No outage has been surveyed yet">
              The history begins with the first survey computed in a job of this machine.
              <p className="mt-4">
                <ButtonLink to={`${paths.jobs}?machineId=${id}`}>See its jobs</ButtonLink>
              </p>
            </Empty>
          ) : (
            <HistorySheet history={history.data} />
          )
        }
      </MachineStates>
    </>
  );
}

function HistorySheet({ history }: { history: MachineHistory }) {
  const model = historyModelOf(history);
  const drifts = tabulateDrifts(history);
  const drifted = history.stations.flatMap(({ id, drifts: own }) =>
    own.some(({ changed }) => changed === true) ? [id] : [],
  );
  return (
    <article className="sheet-stack">
      <FigureView number={5} draw={(width) => drawHistory(model, width)} />
      {drifted.length > 0 ? (
        <p className="border-l-4 border-signal pl-4 font-semibold text-signal">
          Drift is shown at {drifted.join(", ")}.
        </p>
      ) : (
        <p>{drifts === null ? "Drift needs two surveyed outages." : "No drift is shown."}</p>
      )}
      {history.more && <p className="text-muted">Older jobs are left out.</p>}
      <DataTable
        caption="Outages, oldest first"
        rows={history.outages}
        rowKey={({ jobId }) => jobId}
        columns={[
          {
            heading: "outage",
            lead: true,
            cell: (outage) => (
              <>
                {history.outages.indexOf(outage) + 1}{" "}
                <Link className="link font-semibold" to={paths.job(outage.jobId)}>
                  {outage.title}
                </Link>
              </>
            ),
          },
          { heading: "state", cell: ({ state }) => state },
          { heading: "last reading", cell: ({ at }) => <Instant at={at} /> },
          { heading: "machine revision", align: "end", cell: ({ machineRevision }) => machineRevision },
        ]}
      />
      {drifts !== null && <NumberTable table={drifts} />}
      <NumberTable table={tabulatePlaces(history)} />
    </article>
  );
}
