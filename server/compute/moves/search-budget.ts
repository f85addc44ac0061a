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
  private refusal: ComputeError | null = null;

  /**
   * `times` as many trials for the call as a call has that chooses each component's shims once, and `share` of the
   * trials for each component. `trialsPerProgram`: what one quadratic program is worth in trials; those of the largest
   * deviation take several times as long as those of squares.
   */
  constructor(
    private readonly times = 1,
    private readonly share = 1,
    readonly trialsPerProgram = 100,
  ) {}

  startComponent(): void {
    this.spentOnComponent = 0;
  }

  /**
   * Runs a search that gathers what it finds; false when the trials ran out before its end and `enough` was found.
   * @throws ComputeError too_many_choices when they ran out before
   */
  lasts(search: () => void, enough: () => boolean): boolean {
    try {
      search();
      return true;
    } catch (error) {
      if (error === this.refusal && enough()) return false;
      throw error;
    }
  }

  /** @throws ComputeError too_many_choices when more than the budget is spent */
  spend(trials: number): void {
    this.spentOnComponent += trials;
    this.spent += trials;
    // Told so that what is not a number is too much as well.
    const ofComponent = this.share * mostPerComponent;
    const over = !(this.spentOnComponent <= ofComponent)
      ? ofComponent
      : !(this.spent <= this.times * mostPerCall)
        ? this.times * mostPerCall
        : null;
    if (over !== null) {
      const detail = `The choice of shims needs more than ${over} trials.`;
      this.refusal = new ComputeError("too_many_choices", detail, { limit: over });
      throw this.refusal;
    }
  }
}
