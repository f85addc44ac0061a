import type { JobFlag } from "../../../../../shared/schemas/job-surveys.ts";

/** What a person must know or do: said once each, in the signal tone. */
export function Flags({ flags, title = "Flags" }: { flags: readonly JobFlag[]; title?: string }) {
  const said = [...new Map(flags.map((flag) => [`${flag.code} ${flag.detail}`, flag])).values()];
  if (said.length === 0) return null;
  return (
    <section aria-label={title} className="keep-together border border-l-4 border-signal px-4 py-3">
      <h3 className="font-semibold text-signal">
        {said.length} {said.length === 1 ? "flag" : "flags"}
      </h3>
      <ul className="mt-1 grid gap-1">
        {said.map(({ code, detail }) => (
          <li key={`${code} ${detail}`} className="max-w-prose">
            {detail} <span className="inline-block text-xs break-all text-muted">{code}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
