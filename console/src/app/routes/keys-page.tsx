import { useSearchParams } from "react-router-dom";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Pager } from "../../components/ui/pager.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths } from "../../config/paths.ts";
import { useKeys } from "../../features/keys/api/list-keys.ts";
import { IssueKey } from "../../features/keys/components/issue-key.tsx";
import { KeysTable } from "../../features/keys/components/keys-table.tsx";
import { useMay, useMember } from "../../lib/use-session.ts";

export function KeysPage() {
  const member = useMember();
  const mayRead = useMay("keys:read");
  const mayIssue = useMay("keys:write");
  return (
    <>
      <PageHeading
        title="Keys"
        lead="What your own software signs its calls with. Each key does what its scopes say and no more."
      >
        {mayIssue && member && <IssueKey role={member.role} />}
      </PageHeading>
      {mayRead ? (
        <KeysList mayIssue={mayIssue} />
      ) : (
        <Empty title="Your role reads records">
          Keys are read by engineers, and issued and revoked by developers and administrators.
        </Empty>
      )}
    </>
  );
}

function KeysList({ mayIssue }: { mayIssue: boolean }) {
  const [search] = useSearchParams();
  const cursor = search.get("cursor");
  const keys = useKeys(cursor);
  if (keys.isPending) return <Skeleton what="the keys" />;
  if (keys.isError) {
    return (
      <Failure error={keys.error} what="The keys could not be read." onRetry={() => void keys.refetch()} />
    );
  }
  if (keys.data.data.length === 0) {
    return (
      <Empty title="No keys yet">
        {mayIssue
          ? "Issue a key, then send calls with it as Authorization: Bearer."
          : "An administrator or a developer issues keys here."}
      </Empty>
    );
  }
  const { data, nextCursor } = keys.data;
  return (
    <>
      <KeysTable keys={data} mayRevoke={mayIssue} />
      <Pager
        newest={cursor === null ? null : paths.keys}
        older={nextCursor === null ? null : `${paths.keys}?cursor=${encodeURIComponent(nextCursor)}`}
      />
    </>
  );
}
