import type { Key } from "../../../../../shared/schemas/keys.ts";
import { CopyButton } from "../../../components/ui/copy-button.tsx";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { RevokeKey } from "./revoke-key.tsx";

export function KeysTable({ keys, mayRevoke }: { keys: readonly Key[]; mayRevoke: boolean }) {
  return (
    <DataTable
      caption="API keys, newest first"
      columns={mayRevoke ? [...columns, revokeColumn] : columns}
      rows={keys}
      rowKey={(key) => key.id}
    />
  );
}

const columns: DataColumn<Key>[] = [
  {
    heading: "name",
    lead: true,
    cell: (key) => <span className="font-semibold break-words">{key.name}</span>,
  },
  {
    heading: "key",
    cell: (key) => (
      <span className="inline-flex items-center gap-2">
        <span className="break-all">{key.prefix}…</span>
        <CopyButton text={key.prefix} what={`prefix of ${key.name}`} />
      </span>
    ),
  },
  {
    heading: "may",
    cell: (key) => (
      <ul className="text-xs leading-5">
        {key.scopes.map((scope) => (
          <li key={scope}>{scope}</li>
        ))}
      </ul>
    ),
  },
  { heading: "status", cell: (key) => <KeyStatus apiKey={key} /> },
  {
    heading: "last used",
    cell: (key) => (key.lastUsedAt === null ? "not yet" : <Instant at={key.lastUsedAt} />),
  },
  { heading: "expires", cell: (key) => (key.expiresAt === null ? "never" : <Instant at={key.expiresAt} />) },
  { heading: "issued by", cell: (key) => key.createdBy?.name ?? "–" },
];

const revokeColumn: DataColumn<Key> = {
  heading: "action",
  align: "end",
  cell: (key) => (key.status === "revoked" ? null : <RevokeKey apiKey={key} />),
};

function KeyStatus({ apiKey: { status, revokedAt } }: { apiKey: Key }) {
  if (status === "active") return status;
  return (
    <span className="text-muted">
      {status}
      {revokedAt !== null && (
        <span className="block text-xs">
          <Instant at={revokedAt} />
        </span>
      )}
    </span>
  );
}
