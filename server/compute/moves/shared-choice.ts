import type { ShimChoice } from "./shim-task.ts";

/** How the shims of a call were chosen, and how sure it is that no better choice was passed over. */
export interface ChoiceSearch {
  /**
   * `alone`: each component by itself, and the stock is enough for all. `enumeration`, `mixed_integer_program`: all
   * components together, for the stock that they share. `in_turn`: each with what those before leave.
   */
  readonly method: "alone" | "enumeration" | "mixed_integer_program" | "in_turn";
  readonly proved: boolean;
  /** How far the cost may lie above the least at most; null when that is not known. */
  readonly betterBy: number | null;
}

type Choices = ReadonlyMap<number, readonly ShimChoice[] | null>;

export interface SharedChoice {
  readonly byComponent: Choices;
  readonly search: ChoiceSearch;
}
