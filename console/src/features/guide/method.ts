/** One thing the engine computes, as the guide explains it. */
export interface Method {
  /** Its anchor on the page. */
  readonly id: string;
  readonly title: string;
  /** How a call asks for it; null where nothing is asked. */
  readonly asked: string | null;
  /** Sentences; `code` in backticks. */
  readonly says: readonly string[];
  /** One formula a line: `_x` or `_{…}` is set low, `^x` or `^{…}` high. */
  readonly formulas: readonly string[];
  /** What the letters of the formulas stand for. */
  readonly where: readonly (readonly [letters: string, meaning: string])[];
  /** As the engine's own docblocks name them, word for word; or one of the two below. */
  readonly sources: readonly string[];
}

export const commonPractice = "Common practice, no published source.";
export const ownRule = "No outside source: the rule is stated here in full.";
