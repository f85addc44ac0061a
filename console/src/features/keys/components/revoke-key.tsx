import { useState } from "react";
import type { Key } from "../../../../../shared/schemas/keys.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { useRevokeKey } from "../api/revoke-key.ts";

export function RevokeKey({ apiKey }: { apiKey: Key }) {
  const [asking, setAsking] = useState(false);
  const revoke = useRevokeKey();
  const close = (): void => {
    setAsking(false);
    revoke.reset();
  };
  return (
    <>
      <Button look="grave" onClick={() => setAsking(true)} aria-label={`Revoke key ${apiKey.name}`}>
        Revoke key
      </Button>
      {asking && (
        <Dialog title={`Revoke key “${apiKey.name}”?`} onDismiss={close}>
          <p>
            Whatever sends <span className="font-semibold break-all">{apiKey.prefix}…</span> is refused from
            this moment on. This cannot be undone; its records stay.
          </p>
          {revoke.isError && (
            <div className="mt-4">
              <Failure error={revoke.error} what="The key is not revoked." />
            </div>
          )}
          <div className="mt-5 flex flex-wrap justify-end gap-2">
            <Button onClick={close} autoFocus>
              Keep key
            </Button>
            <Button
              look="grave"
              busy={revoke.isPending}
              onClick={() => revoke.mutate(apiKey.id, { onSuccess: close })}
            >
              Revoke key
            </Button>
          </div>
        </Dialog>
      )}
    </>
  );
}
