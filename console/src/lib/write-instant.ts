const pad = (value: number): string => String(value).padStart(2, "0");

/** Date and time of day in the reader's zone, largest part first so that a column of them sorts by eye. */
export function writeInstant(at: Date): string {
  return `${writeDay(at)} ${pad(at.getHours())}:${pad(at.getMinutes())}:${pad(at.getSeconds())}`;
}

export function writeDay(at: Date): string {
  return `${at.getFullYear()}-${pad(at.getMonth() + 1)}-${pad(at.getDate())}`;
}

export function writeUtc(at: Date): string {
  return `${at.toISOString().slice(0, 19).replace("T", " ")} UTC`;
}

/** The reader's zone by name, for the heading of a column of times. */
export function zoneName(): string {
  return new Intl.DateTimeFormat(undefined).resolvedOptions().timeZone;
}

/** The instant at which a day (YYYY-MM-DD) begins in the reader's zone, `daysAfter` days on; null when it is no day. */
export function startOfDay(day: string, daysAfter = 0): Date | null {
  const [, year, month, date] = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day) ?? [];
  if (year === undefined || month === undefined || date === undefined) return null;
  const start = new Date(Number(year), Number(month) - 1, Number(date) + daysAfter);
  const named = new Date(Number(year), Number(month) - 1, Number(date));
  return writeDay(named) === day ? start : null;
}
