import type { IndicationAnswer, IndicationRequest } from "../../shared/schemas/indications.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { followComponent, indicationFaults, type FollowBasis } from "../jobs/follow-component.ts";
import { authorColumns, type By } from "./author.ts";
import { loadJob, loadResults, refuseSigned } from "./job-store.ts";

/**
 * Follows the moves of one job. What an indication is read against is read once for each plan: a plan and its survey
 * never change, so that a stream costs one row a line.
 */
export class JobFollower {
  private readonly bases = new Map<string, FollowBasis>();
  constructor(
    private readonly deps: Deps,
    private readonly jobId: string,
    private readonly by: By,
  ) {}

  /**
   * Keeps an indication with what was answered to it.
   * @throws HttpProblem not_found, job_signed, unknown_reference, too_few_items
   */
  async follow(indication: IndicationRequest): Promise<IndicationAnswer> {
    const { deps, by, jobId } = this;
    const basis = await this.basisOf(indication.plan);
    const faults = indicationFaults(basis, indication);
    if (faults.length > 0) throw problemOfFaults(faults);
    const createdAt = deps.now();
    const answer = {
      id: deps.newId(),
      createdAt: createdAt.toISOString(),
      ...followComponent(basis, indication),
    };
    await deps.database.models.jobIndications.create({
      jobId,
      id: answer.id,
      organisationId: by.caller.organisation.id,
      requestText: JSON.stringify(indication),
      answerText: JSON.stringify(answer),
      createdAt,
      ...authorColumns(by.caller),
    });
    return answer;
  }

  private async basisOf(plan: string): Promise<FollowBasis> {
    const known = this.bases.get(plan);
    if (known) return known;
    const loaded = await loadJob(this.deps, this.by.caller.organisation.id, this.jobId);
    refuseSigned(loaded.row);
    const { state, machine } = loaded;
    const entry = state.plans.find(({ id }) => id === plan);
    const survey = state.surveys.find((one) => one.entry.id === entry?.document.survey);
    if (!entry || !survey?.result) throw new HttpProblem("not_found", "The job has no plan with this id.");
    const results = await loadResults(this.deps, loaded);
    const moves = results.moves(entry.document.calculation);
    if (!moves) throw new HttpProblem("not_found", "The plan's calculation is gone.");
    const basis = { machine, plan: moves, fits: results.fits(survey.result.document.boreFit) };
    this.bases.set(plan, basis);
    return basis;
  }
}
