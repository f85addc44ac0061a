/** One number in print, and how near the engine must come to it. */
export interface SelfFigure {
  readonly figure: string;
  readonly expected: number;
  /** Largest difference: a little over half of the last printed digit, or the accuracy the source states. */
  readonly tolerance: number;
}

/** A published worked example that ships with the engine, so that the engine can check itself anywhere. */
export interface SelfCase {
  readonly id: string;
  readonly area:
    | "bore-fit"
    | "axis-deviation"
    | "shim-move"
    | "cold-target"
    | "repeatability-study"
    | "confirmation"
    | "statistics";
  readonly source: string;
  readonly figures: readonly SelfFigure[];
  /** What the engine gives today, by figure, in the units of the source. */
  readonly compute: () => Readonly<Record<string, number>>;
}
