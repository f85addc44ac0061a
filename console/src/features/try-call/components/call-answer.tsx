import { useState } from "react";
import { Link } from "react-router-dom";
import type { CalculationKind } from "../../../config/paths.ts";
import { paths } from "../../../config/paths.ts";
import { CopyButton } from "../../../components/ui/copy-button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { JsonView } from "../../../components/ui/json-view.tsx";
import { CancelledError, ProblemError } from "../../../lib/service-error.ts";
import { CalculationResult } from "../../results/components/calculation-result.tsx";

interface CallAnswerProps {
  kind: CalculationKind;
  request: unknown;
  answer: { status: number; body: unknown; tookMs: number };
}

/** What came back: the record it left, figure and tables, and the JSON. */
export function CallAnswer({ kind, request, answer }: CallAnswerProps) {
  const [chosen, setChosen] = useState<string | null>(null);
  const id = idOf(answer.body);
  return (
    <div className="grid gap-6">
      <p className="flex flex-wrap items-center gap-x-4 gap-y-1">
        <span className="font-semibold">{answer.status} Created</span>
        <span className="text-muted">{answer.tookMs.toFixed(0)} ms there and back</span>
        {id !== null && <RecordLink id={id} />}
      </p>
      <JsonView title="Response" value={answer.body} />
      <CalculationResult
        kind={kind}
        request={request}
        response={answer.body}
        chosen={chosen}
        onChoose={setChosen}
      />
    </div>
  );
}

/** A refusal: why, and the record that the engine's own refusals leave. Its faults stand at the text. */
export function CallRefusal({ error }: { error: unknown }) {
  const id = error instanceof ProblemError ? error.problem.id : undefined;
  return (
    <Failure error={error} what={titleOf(error)}>
      {id !== undefined && (
        <p className="mt-2">
          <RecordLink id={id} />
        </p>
      )}
    </Failure>
  );
}

function titleOf(error: unknown): string {
  if (error instanceof ProblemError) return `${error.problem.status} ${error.problem.title}.`;
  return error instanceof CancelledError ? "You cancelled the call." : "The call got no answer.";
}

function RecordLink({ id }: { id: string }) {
  return (
    <span className="inline-flex items-center gap-2">
      <Link className="link" to={paths.calculation(id)}>
        Open the record
      </Link>
      <CopyButton text={id} what="record id" />
    </span>
  );
}

function idOf(body: unknown): string | null {
  return typeof body === "object" && body !== null && "id" in body && typeof body.id === "string"
    ? body.id
    : null;
}
