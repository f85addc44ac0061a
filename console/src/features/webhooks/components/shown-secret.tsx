import { Button } from "../../../components/ui/button.tsx";
import { CopyButton } from "../../../components/ui/copy-button.tsx";

/** The one time a signing secret can be read. */
export function ShownSecret({ name, secret, onDone }: { name: string; secret: string; onDone: () => void }) {
  return (
    <div className="grid gap-4">
      <p>
        This is the signing secret of <strong className="font-semibold break-words">{name}</strong>. It is
        shown this once: copy it to the program that listens, which checks each message with it.
      </p>
      <p className="border border-ink bg-well p-3 font-semibold break-all select-all" data-testid="secret">
        {secret}
      </p>
      <div className="flex flex-wrap justify-end gap-2">
        <CopyButton text={secret} what="secret" label="Copy secret" />
        <Button look="main" onClick={onDone}>
          I have copied it
        </Button>
      </div>
    </div>
  );
}
