import type { Machine } from "../../../../../shared/schemas/machines.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { useComparison } from "../api/compare-revisions.ts";
import { Differences } from "./differences.tsx";
import type { EditBase } from "./use-edit-base.ts";

interface ChangedMeanwhileProps {
  machine: Machine;
  base: EditBase;
  onAdopt: () => void;
}

/** Somebody changed the machine since the edit was begun: what, and the way on. */
export function ChangedMeanwhile({ machine, base, onAdopt }: ChangedMeanwhileProps) {
  const isSameRevision = base.revision === machine.revision;
  const comparison = useComparison(
    machine.id,
    isSameRevision ? null : { from: String(base.revision), to: String(machine.revision) },
  );
  return (
    <section aria-label="Changed meanwhile" className="grid gap-3 border border-l-4 border-signal px-4 py-3">
      <p className="font-semibold text-signal">
        {isSameRevision
          ? "The machine was archived or restored meanwhile; its document is the same."
          : `Revision ${machine.revision} was stored meanwhile. Your text is kept as it is.`}
      </p>
      {!isSameRevision &&
        (comparison.isPending ? (
          <Skeleton what="what changed" lines={3} />
        ) : comparison.isError ? (
          <Failure
            error={comparison.error}
            what="What changed could not be read."
            onRetry={() => void comparison.refetch()}
          />
        ) : (
          <Differences comparison={comparison.data} />
        ))}
      <p>Take over into your text what is to stay, then go on.</p>
      <div>
        <Button onClick={onAdopt}>Go on from revision {machine.revision}</Button>
      </div>
    </section>
  );
}
