import { decimalsAcross, writeNumber } from "../../../../../shared/figures/write-number.ts";
import { Empty } from "../../../components/ui/empty.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { useJobExample, type ConfirmationExample } from "../api/get-job-example.ts";
import { tabulateChecks } from "../worked/check.ts";
import {
  checkAchieved,
  checkAgreement,
  checkPlanned,
  checkReferences,
  openPoints,
  worstMoved,
} from "../worked/work-job.ts";
import { Formulas } from "./formula.tsx";
import { Sentences } from "./sentences.tsx";

/** A documented job from its moves to what stands in the way of its signature, worked from what was answered. */
export function JobExample() {
  const example = useJobExample();
  if (example.isPending) return <Skeleton what="the example" lines={8} />;
  if (example.isError) {
    return (
      <Failure
        error={example.error}
        what="The example could not be read."
        onRetry={() => void example.refetch()}
      />
    );
  }
  const moved = example.data && worstMoved(example.data);
  if (!example.data || !moved) {
    return (
      <Empty title="The documents have no job that can be followed">
        They may be of another version than this console.
      </Empty>
    );
  }
  return <Followed example={example.data} moved={moved} />;
}

function Followed({
  example,
  moved,
}: {
  example: ConfirmationExample;
  moved: NonNullable<ReturnType<typeof worstMoved>>;
}) {
  const unit = example.request.units.offset;
  const decimals = decimalsAcross(unit);
  const table = (caption: string, checks: Parameters<typeof tabulateChecks>[1], inUnit: string | null) =>
    checks.length > 0 && <NumberTable table={tabulateChecks(caption, checks, inUnit, decimals)} />;
  const { repeats } = example.result.reference;
  return (
    <>
      <Sentences
        lines={[
          "The call and its answer are those of the documents, for the machine of the demo: one casing was moved, and the survey after it is held against the one before. Nothing below is typed; each table puts what was sent into the formula, beside what the service answered.",
          `It follows ${moved.id}, the station that did least as planned.`,
        ]}
      />
      <Formulas
        label="Formulas of the example"
        lines={[
          "planned(z) = m_1 + (m_2 − m_1) · (z − z_1) / (z_2 − z_1)",
          "left = planned − achieved",
          "D^T · S^{−1} · D ≤ limit,   S = S_{before} + S_{after}",
        ]}
      />
      {table(`What ${moved.id} was to do`, checkPlanned(example, moved, decimals), unit)}
      {table(`What ${moved.id} did, and what is left`, checkAchieved(example, moved, decimals), unit)}
      {table("How well that agrees", checkAgreement(example, moved, decimals), null)}
      {moved.limit !== null && moved.statistic !== null && (
        <p className="max-w-prose">
          The limit is {writeNumber(moved.limit, decimals)}: the difference{" "}
          {moved.statistic <= moved.limit ? "can be chance." : "is more than chance."}
        </p>
      )}
      {table("Reference stations", checkReferences(example, decimals), null)}
      <p className="max-w-prose">
        {repeats === true
          ? "Each stays under its limit: they repeat, and the axis stands."
          : "They are not shown to repeat: the axis does not stand by itself."}
      </p>
      <OpenPoints example={example} />
    </>
  );
}

function OpenPoints({ example }: { example: ConfirmationExample }) {
  const points = openPoints(example);
  const { unexpected } = example.result;
  return (
    <section aria-label="What is open in the example" className="keep-together max-w-prose">
      <h3 className="font-semibold">
        {points.length === 0
          ? "Nothing stands in the way of a signature"
          : "What stands in the way of a signature"}
      </h3>
      <ul className="mt-2 grid gap-2">
        {points.map(({ code, words }) => (
          <li key={words} className="border-l border-rule pl-3">
            {words} <code className="text-xs text-muted">{code}</code>
          </li>
        ))}
      </ul>
      {unexpected.length > 0 && (
        <p className="mt-3">
          {unexpected.join(", ")} moved without being meant to. That alone refuses no signature: the
          confirmation says it, and whoever signs has read it.
        </p>
      )}
    </section>
  );
}
