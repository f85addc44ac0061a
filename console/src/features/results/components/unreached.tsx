import type { ShimMoveResult } from "../../../../../shared/schemas/shim-moves.ts";

/** Components that cannot bring every station of theirs inside its tolerance, and the limit that binds. */
export function Unreached({ components }: { components: ShimMoveResult["components"] }) {
  const unreached = components.filter(({ unreachable }) => unreachable !== undefined);
  if (unreached.length === 0) return null;
  return (
    <section aria-label="Out of reach" className="keep-together border-l-4 border-signal pl-4">
      <h3 className="font-semibold text-signal">
        {unreached.length} of {components.length} components cannot bring every station inside its tolerance
      </h3>
      <ul className="mt-1 grid gap-1">
        {unreached.map(({ id, unreachable }) => (
          <li key={id} className="max-w-prose">
            <span className="font-semibold">{id}: </span>
            {unreachable?.reason}{" "}
            {unreachable?.limit && <code className="text-xs break-all text-muted">{unreachable.limit}</code>}
          </li>
        ))}
      </ul>
    </section>
  );
}
