import { ComputeError } from "../compute-error.ts";

/**
 * Trials that one component, and one call, may spend on the choice of shims: no call holds the service up. A trial is
 * the look at one option for one stack; larger pieces of work count as the trials they take as long as.
 */
const mostPerComponent = 1_000_000;
const mostPerCall = 2_000_000;

/** Trials spent in one call. */
export class SearchBudget {
  private spentOnComponent = 0;
  private spent = 0;

  startComponent(): void {
    this.spentOnComponent = 0;
  }

  /** @throws ComputeError too_many_choices when more than the budget is spent */
  spend(trials: number): void {
    this.spentOnComponent += trials;
    this.spent += trials;
    // Told so that what is not a number is too much as well.
    const over = !(this.spentOnComponent <= mostPerComponent)
      ? mostPerComponent
      : !(this.spent <= mostPerCall)
        ? mostPerCall
        : null;
    if (over !== null) {
      throw new ComputeError("too_many_choices", `The choice of shims needs more than ${over} trials.`, {
        limit: over,
      });
    }
  }
}
