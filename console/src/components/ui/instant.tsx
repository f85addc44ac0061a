import { writeInstant, writeUtc } from "../../lib/write-instant.ts";

/** A moment in the reader's zone, with UTC on hover. */
export function Instant({ at }: { at: string }) {
  const date = new Date(at);
  return (
    <time dateTime={at} title={writeUtc(date)} className="whitespace-nowrap">
      {writeInstant(date)}
    </time>
  );
}
