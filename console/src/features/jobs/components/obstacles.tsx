import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { nextSteps } from "./next-steps.ts";

/** What stands in the way of the signature: points of one kind together, with what to do next and where on this page. */
export function Obstacles({ signOff: { obstacles } }: Pick<JobRecord, "signOff">) {
  const codes = [...new Set(obstacles.map(({ code }) => code))];
  return (
    <section id="before-signature" aria-label="Before the signature">
      <SectionHeading>Before the signature</SectionHeading>
      {codes.length === 0 ? (
        <p>Nothing stands in the way.</p>
      ) : (
        <ol className="grid gap-4 lg:grid-cols-2">
          {codes.map((code) => {
            const next = nextSteps[code];
            return (
              <li key={code} className="keep-together min-w-0 border-l-4 border-signal pl-3">
                <ul>
                  {obstacles
                    .filter((obstacle) => obstacle.code === code)
                    .map(({ detail }) => (
                      <li key={detail} className="break-words">
                        {detail}
                      </li>
                    ))}
                </ul>
                <p className="mt-1 text-muted">
                  {next && (
                    <>
                      Next: {next.words}{" "}
                      <a className="link no-print" href={`#${next.section}`}>
                        Go there
                      </a>{" "}
                    </>
                  )}
                  <span className="inline-block text-xs break-all">{code}</span>
                </p>
              </li>
            );
          })}
        </ol>
      )}
    </section>
  );
}
