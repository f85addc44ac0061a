import { problemKinds } from "../../../../../shared/error-codes.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { nextSteps } from "../../jobs/components/next-steps.ts";
import { jobTerms, stopReasons, workOrder } from "../content/job-terms.ts";
import { obstacleMeanings, signatureRefusals } from "../content/sign-off.ts";
import { drawJobOrder } from "../drawings/draw-job-order.ts";
import { commonPractice } from "../method.ts";
import { JobExample } from "./job-example.tsx";
import { Sentences } from "./sentences.tsx";

/** A job: its words, its order, why it stops and why its signature is refused, and one in numbers. */
export function Jobs() {
  return (
    <>
      <section>
        <SectionHeading>Words</SectionHeading>
        <dl className="grid gap-x-8 gap-y-3 md:grid-cols-2">
          {jobTerms.map(([term, meaning]) => (
            <div key={term} className="keep-together max-w-prose">
              <dt className="font-semibold">{term}</dt>
              <dd>{meaning}</dd>
            </div>
          ))}
        </dl>
      </section>
      <section>
        <SectionHeading>The order of the work</SectionHeading>
        <div className="sheet-stack">
          <FigureView number={1} draw={drawJobOrder} />
          <ol className="grid gap-2">
            {workOrder.map((step, index) => (
              <li key={step} className="grid grid-cols-[1.5rem_minmax(0,1fr)] gap-x-2">
                <span className="text-muted">{index + 1}</span>
                <span className="max-w-prose">{step}</span>
              </li>
            ))}
          </ol>
          <p className="text-xs text-muted">{commonPractice}</p>
        </div>
      </section>
      <section>
        <SectionHeading>Why a move is to stop</SectionHeading>
        <div className="sheet-stack">
          <Sentences lines={stopSays} />
          <CodeTable caption="Reasons to stop" rows={stops} />
        </div>
      </section>
      <section>
        <SectionHeading>Why a signature is refused</SectionHeading>
        <div className="sheet-stack">
          <Sentences lines={signatureSays} />
          <CodeTable caption="What stands in the way of a signature" rows={obstacles} />
          <CodeTable caption="What the call that signs refuses" rows={refusals} />
          <p className="text-xs text-muted">{commonPractice}</p>
        </div>
      </section>
      <section>
        <SectionHeading>A job in numbers</SectionHeading>
        <div className="sheet-stack">
          <JobExample />
        </div>
      </section>
    </>
  );
}

interface CodeRow {
  readonly code: string;
  readonly means: string;
  readonly then: string;
}

const stops: readonly CodeRow[] = Object.entries(stopReasons).map(([code, said]) => ({ code, ...said }));
const obstacles: readonly CodeRow[] = Object.entries(obstacleMeanings).map(([code, means]) => ({
  code,
  means,
  then: nextSteps[code]?.words ?? "",
}));
const refusals: readonly CodeRow[] = signatureRefusals.map((code) => ({
  code,
  means: `${problemKinds[code].title}.`,
  then: problemKinds[code].fix,
}));

const columns: DataColumn<CodeRow>[] = [
  { heading: "code", lead: true, cell: ({ code }) => <code className="max-lg:break-all">{code}</code> },
  { heading: "means", cell: ({ means }) => <span className="block max-w-prose">{means}</span> },
  { heading: "do", cell: ({ then }) => <span className="block max-w-prose">{then}</span> },
];

function CodeTable({ caption, rows }: { caption: string; rows: readonly CodeRow[] }) {
  return (
    <div>
      <h3 className="mb-2 font-semibold">{caption}</h3>
      <DataTable caption={caption} columns={columns} rows={rows} rowKey={({ code }) => code} />
    </div>
  );
}

const stopSays: readonly string[] = [
  "Every indication is answered with what is left in h and v at every support, as far as the readings tell it, and with the reasons to stop now. A neighbour is held against the limits of the plan; one that the plan does not shift may move by the machine's largest misfit. The service computes; it does not authorise a move.",
];
const signatureSays: readonly string[] = [
  "A job is signed only when nothing below is open. The refusal names every point at once, in `obstacles`, and the job's page says where to settle each.",
];
