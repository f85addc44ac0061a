/** A time as the wire carries it. */
export const isoTime = (time: Date): string => time.toISOString();
export const isoTimeOrNull = (time: Date | null | undefined): string | null => time?.toISOString() ?? null;
