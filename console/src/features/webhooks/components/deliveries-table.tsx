import type { Delivery } from "../../../../../shared/schemas/webhooks.ts";
import { Button } from "../../../components/ui/button.tsx";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { JsonView } from "../../../components/ui/json-view.tsx";
import { useRedeliver } from "../api/change-webhooks.ts";

interface DeliveriesTableProps {
  webhook: string;
  deliveries: readonly Delivery[];
  mayRedeliver: boolean;
}

export function DeliveriesTable({ webhook, deliveries, mayRedeliver }: DeliveriesTableProps) {
  const again: DataColumn<Delivery> = {
    heading: "action",
    align: "end",
    cell: (delivery) => <Redeliver webhook={webhook} delivery={delivery} />,
  };
  return (
    <DataTable
      caption="Deliveries, newest first"
      columns={mayRedeliver ? [...columns, again] : columns}
      rows={deliveries}
      rowKey={(delivery) => delivery.id}
    />
  );
}

const columns: DataColumn<Delivery>[] = [
  {
    heading: "event",
    lead: true,
    cell: ({ type, payload }) => (
      <div className="grid gap-1">
        <span className="font-semibold">{type}</span>
        <JsonView title="what is sent" value={payload} />
      </div>
    ),
  },
  { heading: "made", cell: ({ createdAt }) => <Instant at={createdAt} /> },
  { heading: "state", cell: (delivery) => <DeliveryState delivery={delivery} /> },
  {
    heading: "attempts",
    cell: ({ attempts }) =>
      attempts.length === 0 ? (
        "none yet"
      ) : (
        <ol className="text-xs leading-5">
          {attempts.map((attempt) => (
            <li key={attempt.attempt}>
              <Instant at={attempt.at} />: {outcomeOf(attempt)}, {Math.round(attempt.durationMs)} ms
              {attempt.detail !== null && <span className="block text-muted">{attempt.detail}</span>}
              {attempt.reply !== null && attempt.reply !== "" && (
                <span className="block break-all whitespace-pre-wrap text-muted">{attempt.reply}</span>
              )}
            </li>
          ))}
        </ol>
      ),
  },
];

function outcomeOf({ status, error }: Delivery["attempts"][number]): string {
  if (status !== null) return `answered ${status}`;
  if (error === "timeout") return "no answer in time";
  return error === "target_refused" ? "not sent" : "no connection";
}

function DeliveryState({ delivery: { state, nextAttemptAt } }: { delivery: Delivery }) {
  if (state === "pending") {
    return (
      <span>
        waits
        {nextAttemptAt !== null && (
          <span className="block text-xs text-muted">
            next <Instant at={nextAttemptAt} />
          </span>
        )}
      </span>
    );
  }
  return state === "paused" ? "waits for the webhook to be on" : state;
}

function Redeliver({ webhook, delivery }: { webhook: string; delivery: Delivery }) {
  const redeliver = useRedeliver(webhook);
  return (
    <span className="inline-grid gap-2">
      <Button
        busy={redeliver.isPending}
        onClick={() => redeliver.mutate(delivery.id)}
        aria-label={`Deliver ${delivery.type} again`}
      >
        Deliver again
      </Button>
      {redeliver.isError && <Failure error={redeliver.error} what="It is not delivered again." />}
    </span>
  );
}
