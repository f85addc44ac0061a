import { useEffect, useRef } from "react";
import { useSearchParams } from "react-router-dom";
import { calculationKinds } from "../../../../shared/schemas/calculations.ts";
import { Button } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { Field } from "../../components/ui/field.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { SectionHeading } from "../../components/ui/section-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { computations, serverPaths, type CalculationKind } from "../../config/paths.ts";
import { useExamples, type Endpoint } from "../../features/try-call/api/get-examples.ts";
import { useSendCall } from "../../features/try-call/api/send-call.ts";
import { CallAnswer, CallRefusal } from "../../features/try-call/components/call-answer.tsx";
import { CallForm } from "../../features/try-call/components/call-form.tsx";
import { ProblemError } from "../../lib/service-error.ts";
import { useMay } from "../../lib/use-session.ts";

export function TryPage() {
  const may = useMay("calculations:write");
  const examples = useExamples();
  return (
    <>
      <PageHeading
        title="Try a call"
        lead={
          <>
            Send a call as you and keep its record. Every member of a body is explained in{" "}
            <a className="link" href={serverPaths.docs}>
              the documents
            </a>
            .
          </>
        }
      />
      {!may ? (
        <Empty title="Your role reads records">
          Computing takes an engineer, a developer or an administrator.
        </Empty>
      ) : examples.isPending ? (
        <Skeleton what="the examples" lines={12} />
      ) : examples.isError ? (
        <Failure
          error={examples.error}
          what="The examples could not be read."
          onRetry={() => void examples.refetch()}
        />
      ) : (
        <Bench endpoints={examples.data} />
      )}
    </>
  );
}

function Bench({ endpoints }: { endpoints: ReadonlyMap<CalculationKind, Endpoint> }) {
  const [search, setSearch] = useSearchParams();
  const send = useSendCall();
  const kind =
    calculationKinds.find((known) => computations[known].resource === search.get("endpoint")) ?? "bore-fit";
  const { examples, summary } = endpoints.get(kind) ?? { examples: [], summary: "" };
  const example = examples.find(({ name }) => name === search.get("example")) ?? examples[0];
  const { path, resource } = computations[kind];
  const choose = (next: Record<string, string>): void => {
    send.reset();
    setSearch(next, { replace: true });
  };
  const answer = useShown(send.isSuccess || send.isError);
  const sent = send.variables;
  const problem = send.error instanceof ProblemError ? send.error.problem : null;
  return (
    <div className="grid gap-10 xl:grid-cols-2">
      <section className="min-w-0" aria-label="Call">
        <div className="mb-4 grid gap-3 sm:grid-cols-2">
          <Field label="Endpoint" hint={summary}>
            {(attributes) => (
              <select
                {...attributes}
                className="control"
                value={resource}
                onChange={(event) => choose({ endpoint: event.target.value })}
              >
                {calculationKinds.map((known) => (
                  <option key={known} value={computations[known].resource}>
                    POST {computations[known].path}
                  </option>
                ))}
              </select>
            )}
          </Field>
          <Field label="Example">
            {(attributes) => (
              <select
                {...attributes}
                className="control"
                value={example?.name}
                onChange={(event) => choose({ endpoint: resource, example: event.target.value })}
              >
                {examples.map(({ name, summary: words }) => (
                  <option key={name} value={name}>
                    {words}
                  </option>
                ))}
              </select>
            )}
          </Field>
        </div>
        <CallForm
          path={path}
          draftName={`${resource}.${example?.name ?? ""}`}
          exampleText={example?.text ?? "{}"}
          busy={send.isPending}
          refusal={problem && sent ? { problem, bodyText: sent.bodyText } : null}
          onSend={(call) => send.mutate(call)}
        />
      </section>
      <section className="min-w-0" aria-label="Answer" aria-live="polite" aria-busy={send.isPending}>
        <div ref={answer} className="scroll-mb-[60vh]">
          <SectionHeading>Answer</SectionHeading>
        </div>
        {send.isPending ? (
          <>
            <p className="late mb-4 flex items-center gap-4">
              <span>Computing</span>
              <Button onClick={send.cancel}>Cancel call</Button>
            </p>
            <Skeleton what="the answer" />
          </>
        ) : send.isError ? (
          <CallRefusal error={send.error} />
        ) : send.isSuccess && sent ? (
          <CallAnswer key={sent.bodyText} kind={kind} request={sent.request} answer={send.data} />
        ) : (
          <p className="text-muted">
            Send the call to see its answer here, with the figure and the record it leaves.
          </p>
        )}
      </section>
    </div>
  );
}

/** Where answers stand under the call, an answer that came is brought into view; beside it nothing moves. */
function useShown(settled: boolean) {
  const ref = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (settled) ref.current?.scrollIntoView({ block: "nearest" });
  }, [settled]);
  return ref;
}
