import { Link } from "react-router-dom";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { SectionHeading } from "../../components/ui/section-heading.tsx";
import { computations, paths, serverPaths } from "../../config/paths.ts";
import { Contents } from "../../features/guide/components/guide-sheet.tsx";
import { Sentences } from "../../features/guide/components/sentences.tsx";
import { guidePages } from "../../features/guide/guide-pages.ts";
import { jobSteps } from "../../features/guide/content/job-steps.ts";
import { useMember } from "../../lib/use-session.ts";

/** The guide's first page: a job in its order, what every answer holds, and all other pages. */
export function GuidePage() {
  const member = useMember();
  return (
    <div className="guide">
      <Contents />
      <article className="min-w-0">
        <PageHeading
          title="Guide"
          lead="What the numbers mean, how each is computed, and where each method is published. It can be read without signing in."
        />
        <div className="sheet-stack">
          <section>
            <SectionHeading>A job, in its order</SectionHeading>
            <JobSteps />
          </section>
          <section>
            <SectionHeading>What every answer holds</SectionHeading>
            <Sentences lines={answerSays} />
            {member !== null && (
              <p className="mt-3">
                <Link className="link" to={paths.selfTest}>
                  Self-test
                </Link>
                : published examples computed anew by the engine that answers here.
              </p>
            )}
          </section>
          <section>
            <SectionHeading>Pages</SectionHeading>
            <dl className="grid gap-x-8 gap-y-3 md:grid-cols-2">
              {guidePages.map(({ slug, title, lead }) => (
                <div key={slug} className="max-w-prose">
                  <dt>
                    <Link className="link font-semibold" to={paths.guidePage(slug)}>
                      {title}
                    </Link>
                  </dt>
                  <dd className="text-muted">{lead}</dd>
                </div>
              ))}
            </dl>
            <p className="mt-6 max-w-prose">
              Every member of every call, with examples to be tried, stands in{" "}
              <a className="link" href={serverPaths.docs}>
                the documents
              </a>
              . What this engine version refuses as not_available is said there, at its member.
            </p>
          </section>
        </div>
      </article>
    </div>
  );
}

function JobSteps() {
  return (
    <ol className="grid gap-3">
      {jobSteps.map(({ does, kind, slug }, index) => (
        <li key={does} className="grid grid-cols-[1.5rem_minmax(0,1fr)] gap-x-2">
          <span className="text-muted">{index + 1}</span>
          <span className="max-w-prose">
            {does}{" "}
            {kind !== null && (
              <span>
                <Link className="link" to={paths.guidePage(slug)}>
                  {computations[kind].name}
                </Link>{" "}
                <code className="text-xs wrap-anywhere text-muted">POST {computations[kind].path}</code>
              </span>
            )}
          </span>
        </li>
      ))}
    </ol>
  );
}

const answerSays = [
  "An answer is kept as a record that does not change: what was sent, what was answered, by whom, with which key, when, and by which engine version. `inputHash` is over the RFC 8785 form of the body as received.",
  "A record can be replayed: the engine computes the stored call again and names every number that differs. The engine's version moves whenever a number in an answer can change.",
  "`units` are required on every computing call, and `seen` where a bore is read: there is no default, since nothing in a result would show the mistake.",
  "Uncertainties sent in are standard ones (k = 1). Expanded ones in answers carry their factor k, the degrees of freedom and the level. Nothing is dropped silently: readings put aside, weak arcs and guesses are warnings with a code.",
  "What cannot be computed honestly is refused with a code and the place in the body, never answered as nothing or nought. It is the service that computes; it does not authorise a move.",
];
