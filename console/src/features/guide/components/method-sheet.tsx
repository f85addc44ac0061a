import type { Method } from "../method.ts";
import { Formula, Formulas } from "./formula.tsx";
import { Sentences } from "./sentences.tsx";

/** Methods of one subject: what each does, its formula, what the letters mean, and where it is published. */
export function MethodSheet({ methods }: { methods: readonly Method[] }) {
  return (
    <div className="grid gap-8">
      {methods.map((method) => (
        <OneMethod key={method.id} method={method} />
      ))}
    </div>
  );
}

function OneMethod({ method: { id, title, asked, says, formulas, where, sources } }: { method: Method }) {
  return (
    <article id={id} aria-labelledby={`${id}-title`} className="keep-together scroll-mt-4">
      <h3
        id={`${id}-title`}
        className="mb-2 flex flex-wrap items-baseline gap-x-4 border-t border-hair pt-2 font-semibold"
      >
        {title}
        {asked !== null && <code className="text-xs font-normal text-muted">{asked}</code>}
      </h3>
      <div className="grid gap-x-10 gap-y-3 xl:grid-cols-[minmax(0,1fr)_minmax(0,1fr)]">
        <Sentences lines={says} />
        <div className="grid min-w-0 content-start gap-2">
          <Formulas lines={formulas} label={`Formula: ${title}`} />
          {where.length > 0 && (
            <dl className="grid grid-cols-[auto_minmax(0,1fr)] gap-x-3 text-xs">
              {where.map(([letters, meaning]) => (
                <div key={letters} className="contents">
                  <dt>
                    <Formula line={letters} />
                  </dt>
                  <dd className="text-muted">{meaning}</dd>
                </div>
              ))}
            </dl>
          )}
          <Sources sources={sources} />
        </div>
      </div>
    </article>
  );
}

function Sources({ sources }: { sources: readonly string[] }) {
  return (
    <div className="text-xs text-muted">
      <p className="field-name">{sources.length === 1 ? "source" : "sources"}</p>
      <ul>
        {sources.map((source) => (
          <li key={source} className="max-w-prose break-words">
            {source}
          </li>
        ))}
      </ul>
    </div>
  );
}
