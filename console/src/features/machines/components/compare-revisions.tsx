import type { SubmitEvent } from "react";
import { useSearchParams } from "react-router-dom";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { textOf } from "../../../lib/read-form.ts";
import { useComparison } from "../api/compare-revisions.ts";
import { Differences } from "./differences.tsx";

/** Two revisions beside each other; which ones stands in the address. */
export function CompareRevisions({ id, newest }: { id: string; newest: number }) {
  const [search, setSearch] = useSearchParams();
  const [from, to] = [search.get("from"), search.get("to")];
  const comparison = useComparison(id, from !== null && to !== null ? { from, to } : null);
  const choices = Array.from({ length: newest }, (_, index) => {
    const revision = String(newest - index);
    return { value: revision, words: `revision ${revision}` };
  });
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    const data = new FormData(event.currentTarget);
    setSearch({ from: textOf(data, "from"), to: textOf(data, "to") }, { preventScrollReset: true });
  };
  return (
    <div className="grid gap-4">
      <form
        key={search.toString()}
        onSubmit={submit}
        aria-label="Compare revisions"
        className="no-print grid max-w-xl grid-cols-2 items-end gap-3 sm:grid-cols-3"
      >
        <SelectField label="From" name="from" options={choices} defaultValue={from ?? String(newest - 1)} />
        <SelectField label="To" name="to" options={choices} defaultValue={to ?? String(newest)} />
        <Button type="submit" className="min-h-10">
          Compare
        </Button>
      </form>
      {from !== null &&
        to !== null &&
        (comparison.isPending ? (
          <Skeleton what="the comparison" lines={3} />
        ) : comparison.isError ? (
          <Failure
            error={comparison.error}
            what="The revisions could not be compared."
            onRetry={() => void comparison.refetch()}
          />
        ) : (
          <Differences comparison={comparison.data} />
        ))}
    </div>
  );
}
