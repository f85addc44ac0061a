import type { CreatedKey as Created } from "../../../../../shared/schemas/keys.ts";
import { Button } from "../../../components/ui/button.tsx";
import { CopyButton } from "../../../components/ui/copy-button.tsx";

/** The one time a key can be read. */
export function CreatedKey({ created, onDone }: { created: Created; onDone: () => void }) {
  return (
    <div className="grid gap-4">
      <p>
        This is the key <strong className="font-semibold break-words">{created.name}</strong>. It is shown
        this once: copy it to where it will be used. Only a fingerprint of it is kept here.
      </p>
      <p className="border border-ink bg-well p-3 font-semibold break-all select-all" data-testid="secret">
        {created.secret}
      </p>
      <div className="flex flex-wrap justify-end gap-2">
        <CopyButton text={created.secret} what="key" label="Copy key" />
        <Button look="main" onClick={onDone}>
          I have copied it
        </Button>
      </div>
    </div>
  );
}
