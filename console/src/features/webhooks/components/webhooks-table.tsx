import { Link } from "react-router-dom";
import type { Webhook } from "../../../../../shared/schemas/webhooks.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { paths } from "../../../config/paths.ts";

export function WebhooksTable({ webhooks }: { webhooks: readonly Webhook[] }) {
  return (
    <DataTable
      caption="Webhooks, newest first"
      columns={columns}
      rows={webhooks}
      rowKey={(webhook) => webhook.id}
    />
  );
}

const columns: DataColumn<Webhook>[] = [
  {
    heading: "name",
    lead: true,
    cell: ({ id, name }) => (
      <Link className="link font-semibold break-words" to={paths.webhook(id)}>
        {name}
      </Link>
    ),
  },
  { heading: "address", cell: ({ url }) => <span className="break-all">{url}</span> },
  {
    heading: "is told",
    cell: ({ events }) => (
      <ul className="text-xs leading-5">
        {events.map((event) => (
          <li key={event}>{event}</li>
        ))}
      </ul>
    ),
  },
  { heading: "status", cell: (webhook) => <WebhookStatus webhook={webhook} /> },
  { heading: "added", cell: ({ createdAt }) => <Instant at={createdAt} /> },
];

/** On, failing, or off and why. */
export function WebhookStatus({ webhook }: { webhook: Webhook }) {
  const { active, stopReason, stoppedAt, failingSince } = webhook;
  if (active && failingSince === null) return "on";
  if (active && failingSince !== null) {
    return (
      <span>
        failing
        <span className="block text-xs text-muted">
          since <Instant at={failingSince} />
        </span>
      </span>
    );
  }
  return (
    <span className="text-muted">
      off
      {stopReason !== null && (
        <span className="block text-xs">
          {stopReason === "gone" ? "it answered that it is gone" : "it failed for five days"}
          {stoppedAt !== null && (
            <>
              , <Instant at={stoppedAt} />
            </>
          )}
        </span>
      )}
    </span>
  );
}
