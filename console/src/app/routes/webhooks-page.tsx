import { useSearchParams } from "react-router-dom";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Pager } from "../../components/ui/pager.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths } from "../../config/paths.ts";
import { useWebhooks } from "../../features/webhooks/api/list-webhooks.ts";
import { AddWebhook } from "../../features/webhooks/components/add-webhook.tsx";
import { WebhooksTable } from "../../features/webhooks/components/webhooks-table.tsx";
import { useMay } from "../../lib/use-session.ts";

export function WebhooksPage() {
  const mayRead = useMay("webhooks:read");
  const mayWrite = useMay("webhooks:write");
  return (
    <>
      <PageHeading
        title="Webhooks"
        lead="Tell your own software what happens here: signed messages, sent again until they arrive."
      >
        {mayWrite && <AddWebhook />}
      </PageHeading>
      {mayRead ? (
        <WebhooksList mayWrite={mayWrite} />
      ) : (
        <Empty title="Your role reads records">
          Webhooks are read by engineers, and added by developers and administrators.
        </Empty>
      )}
    </>
  );
}

function WebhooksList({ mayWrite }: { mayWrite: boolean }) {
  const [search] = useSearchParams();
  const cursor = search.get("cursor");
  const webhooks = useWebhooks(cursor);
  if (webhooks.isPending) return <Skeleton what="the webhooks" />;
  if (webhooks.isError) {
    return (
      <Failure
        error={webhooks.error}
        what="The webhooks could not be read."
        onRetry={() => void webhooks.refetch()}
      />
    );
  }
  const { data, nextCursor } = webhooks.data;
  if (data.length === 0) {
    return (
      <Empty title="No webhooks yet">
        {mayWrite
          ? "Add the address at which your software listens."
          : "An administrator or a developer adds webhooks here."}
      </Empty>
    );
  }
  return (
    <>
      <WebhooksTable webhooks={data} />
      <Pager
        newest={cursor === null ? null : paths.webhooks}
        older={nextCursor === null ? null : `${paths.webhooks}?cursor=${encodeURIComponent(nextCursor)}`}
      />
    </>
  );
}
