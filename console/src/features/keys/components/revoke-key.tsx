import type { Key } from "../../../../../shared/schemas/keys.ts";
import { AskFirst } from "../../../components/ui/ask-first.tsx";
import { useRevokeKey } from "../api/revoke-key.ts";

export function RevokeKey({ apiKey }: { apiKey: Key }) {
  const revoke = useRevokeKey();
  return (
    <AskFirst
      action="Revoke key"
      label={`Revoke key ${apiKey.name}`}
      keep="Keep key"
      look="grave"
      title={`Revoke key “${apiKey.name}”?`}
      change={revoke}
      failed="The key is not revoked."
      onConfirm={(done) => revoke.mutate(apiKey.id, { onSuccess: done })}
    >
      <p>
        Whatever sends <span className="font-semibold break-all">{apiKey.prefix}…</span> is refused from this
        moment on. This cannot be undone; its records stay.
      </p>
    </AskFirst>
  );
}
