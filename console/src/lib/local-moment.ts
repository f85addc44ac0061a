const pad = (value: number): string => String(value).padStart(2, "0");

/** A moment as a field of type datetime-local takes it: in the reader's zone, to the minute. */
export function toLocalMoment(at: Date): string {
  const day = `${at.getFullYear()}-${pad(at.getMonth() + 1)}-${pad(at.getDate())}`;
  return `${day}T${pad(at.getHours())}:${pad(at.getMinutes())}`;
}

/** What such a field says, as an instant; the text itself where it says none, for the schema to refuse. */
export function fromLocalMoment(text: string): string {
  const at = new Date(text);
  return text === "" || Number.isNaN(at.getTime()) ? text : at.toISOString();
}
