import { ComputeError } from "../compute-error.ts";

/** Trials that one component, and one call, may spend on the choice of shims: no call holds the service up. */
const mostPerComponent = 400_000;
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
    const over =
      this.spentOnComponent > mostPerComponent
        ? mostPerComponent
        : this.spent > mostPerCall
          ? mostPerCall
          : null;
    if (over !== null) {
      throw new ComputeError("too_many_choices", `The choice of shims needs more than ${over} trials.`, {
        limit: over,
      });
    }
  }
}
