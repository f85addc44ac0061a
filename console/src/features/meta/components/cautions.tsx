import { useMeta } from "../api/get-meta.ts";

/** Shown while the service's own words are not there: a page never stands without a caution. */
const leastCaution =
  "Lifting, stored energy, rotating parts and laser light hurt people. Follow the maker's limits; a qualified engineer decides. The service computes; it does not authorise a move.";

/** The cautions that every reader of an answer must see. */
export function Cautions() {
  const meta = useMeta();
  const cautions = meta.data?.cautions ?? [{ code: "least", text: leastCaution }];
  return (
    <section aria-label="Cautions" className="keep-together text-xs text-muted">
      <h2 className="font-semibold text-ink">Cautions</h2>
      <ul className="mt-1 gap-x-10 md:columns-2">
        {cautions.map((caution) => (
          <li key={caution.code} className="mb-1 break-inside-avoid">
            {caution.text}
          </li>
        ))}
      </ul>
    </section>
  );
}
