import { useParams, useSearchParams } from "react-router-dom";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Pager } from "../../components/ui/pager.tsx";
import { SectionHeading } from "../../components/ui/section-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths } from "../../config/paths.ts";
import { useDeliveries } from "../../features/webhooks/api/list-deliveries.ts";
import { useWebhook } from "../../features/webhooks/api/list-webhooks.ts";
import { DeliveriesTable } from "../../features/webhooks/components/deliveries-table.tsx";
import { WebhookActions } from "../../features/webhooks/components/webhook-actions.tsx";
import { WebhookStatus } from "../../features/webhooks/components/webhooks-table.tsx";
import { useMay } from "../../lib/use-session.ts";

export function WebhookPage() {
  const { id = "" } = useParams();
  const mayRead = useMay("webhooks:read");
  if (mayRead) return <OneWebhook id={id} />;
  return (
    <>
      <PageHeading title="Webhook" />
      <Empty title="Your role reads records">
        Webhooks are read by engineers, developers and administrators.
      </Empty>
    </>
  );
}

function OneWebhook({ id }: { id: string }) {
  const mayWrite = useMay("webhooks:write");
  const webhook = useWebhook(id);
  if (webhook.isPending) {
    return (
      <>
        <PageHeading title="Webhook" />
        <Skeleton what="the webhook" />
      </>
    );
  }
  if (webhook.isError) {
    return (
      <>
        <PageHeading title="Webhook" />
        <Failure
          error={webhook.error}
          what="The webhook could not be read."
          onRetry={() => void webhook.refetch()}
        />
      </>
    );
  }
  const { name, url, events } = webhook.data;
  return (
    <>
      <PageHeading title={name} lead={<span className="break-all">{url}</span>} />
      <div className="mb-8 grid gap-4">
        <p>
          <WebhookStatus webhook={webhook.data} /> · is told {events.join(", ")}
        </p>
        {mayWrite && <WebhookActions webhook={webhook.data} />}
      </div>
      <SectionHeading>Deliveries</SectionHeading>
      <Deliveries id={id} mayRedeliver={mayWrite && webhook.data.active} />
    </>
  );
}

function Deliveries({ id, mayRedeliver }: { id: string; mayRedeliver: boolean }) {
  const [search] = useSearchParams();
  const cursor = search.get("cursor");
  const deliveries = useDeliveries(id, cursor);
  if (deliveries.isPending) return <Skeleton what="the deliveries" />;
  if (deliveries.isError) {
    return (
      <Failure
        error={deliveries.error}
        what="The deliveries could not be read."
        onRetry={() => void deliveries.refetch()}
      />
    );
  }
  const { data, nextCursor } = deliveries.data;
  if (data.length === 0)
    return <Empty title="Nothing was sent yet">What is sent stands here for 30 days.</Empty>;
  const own = paths.webhook(id);
  return (
    <>
      <DeliveriesTable webhook={id} deliveries={data} mayRedeliver={mayRedeliver} />
      <Pager
        newest={cursor === null ? null : own}
        older={nextCursor === null ? null : `${own}?cursor=${encodeURIComponent(nextCursor)}`}
      />
    </>
  );
}
