import { useSearchParams } from "react-router-dom";
import type { OutboxMail } from "../../../../shared/schemas/outbox.ts";
import { DataTable, type DataColumn } from "../../components/ui/data-table.tsx";
import { DownloadButton } from "../../components/ui/download-button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { Instant } from "../../components/ui/instant.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Pager } from "../../components/ui/pager.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { apiPaths, paths } from "../../config/paths.ts";
import { useOutbox } from "../../features/outbox/api/list-outbox.ts";
import { useMay } from "../../lib/use-session.ts";

export function OutboxPage() {
  const mayRead = useMay("outbox:read");
  return (
    <>
      <PageHeading
        title="Outbox"
        lead="Where the service was given no mail server, its mail is kept here: the newest 500."
      />
      {mayRead ? (
        <OutboxList />
      ) : (
        <Empty title="For administrators">Mail that was kept here is read by administrators.</Empty>
      )}
    </>
  );
}

function OutboxList() {
  const [search] = useSearchParams();
  const cursor = search.get("cursor");
  const mails = useOutbox(cursor);
  if (mails.isPending) return <Skeleton what="the mail" />;
  if (mails.isError) {
    return (
      <Failure error={mails.error} what="The mail could not be read." onRetry={() => void mails.refetch()} />
    );
  }
  const { data, nextCursor } = mails.data;
  if (data.length === 0) return <Empty title="No mail">No mail was kept here.</Empty>;
  return (
    <>
      <DataTable caption="Mail, newest first" columns={columns} rows={data} rowKey={(mail) => mail.id} />
      <Pager
        newest={cursor === null ? null : paths.outbox}
        older={nextCursor === null ? null : `${paths.outbox}?cursor=${encodeURIComponent(nextCursor)}`}
      />
    </>
  );
}

const columns: DataColumn<OutboxMail>[] = [
  {
    heading: "subject",
    lead: true,
    cell: ({ subject }) => <span className="font-semibold break-words">{subject}</span>,
  },
  { heading: "to", cell: ({ to }) => <span className="break-all">{to.join(", ")}</span> },
  { heading: "date", cell: ({ date }) => (date === null ? "–" : <Instant at={date} />) },
  { heading: "size", cell: ({ bytes }) => `${Math.ceil(bytes / 1024)} kB` },
  {
    heading: "action",
    align: "end",
    cell: ({ id, subject }) => (
      <DownloadButton path={apiPaths.outboxMail(id)} fileName={`${id}.eml`} label={`Download ${subject}`}>
        Download
      </DownloadButton>
    ),
  },
];
