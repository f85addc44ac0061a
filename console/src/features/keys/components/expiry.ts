const day = 86_400_000;

/** How long a new key is good. 90 days unless chosen otherwise. */
export const expiryChoices = [
  { value: "7", words: "7 days" },
  { value: "30", words: "30 days" },
  { value: "90", words: "90 days" },
  { value: "365", words: "1 year" },
  { value: "never", words: "never" },
] as const;
export const expiryDefault = "90";

/** The moment a key made `now` ends; null when it never does. */
export function expiryOf(choice: string, now: Date): string | null {
  const days = Number(choice);
  return choice === "never" || !(days > 0) ? null : new Date(now.getTime() + days * day).toISOString();
}
