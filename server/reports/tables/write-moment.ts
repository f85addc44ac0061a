/** A moment in UTC to the minute, as ISO 8601 writes it with a space: "2026-11-04 06:30". */
export function writeMoment(moment: string): string {
  return new Date(moment).toISOString().slice(0, 16).replace("T", " ");
}

/** "2026-11-02 to 2026-11-20", or what is known of it. */
export function writeSpan(from: string | null | undefined, to: string | null | undefined): string {
  if (from && to) return `${from} to ${to}`;
  return from ?? to ?? "not stated";
}
