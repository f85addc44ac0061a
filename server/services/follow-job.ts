import type { Transaction } from "sequelize";
import { limits } from "../../shared/limits.ts";
import type { IndicationAnswer, IndicationRequest } from "../../shared/schemas/indications.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { followComponent, indicationFaults, type FollowBasis } from "../jobs/follow-component.ts";
import { resultOf } from "../jobs/job-log.ts";
import { authorColumns, type By } from "./author.ts";
import { loadResults } from "./job-results.ts";
import { loadJob, lockJob, refuseSigned } from "./job-store.ts";

/** An indication that was read against its plan, to be kept. */
export interface JudgedIndication {
  readonly indication: IndicationRequest;
  readonly followed: Omit<IndicationAnswer, "id" | "createdAt">;
}

/**
 * Follows the moves of one job. What an indication is read against is read once for each plan: a plan and the survey
 * result that it was made from never change, so that a stream costs one short transaction a line.
 */
export class JobFollower {
  private readonly bases = new Map<string, FollowBasis>();
  constructor(
    private readonly deps: Deps,
    private readonly jobId: string,
    private readonly by: By,
  ) {}

  /**
   * Says how far the move has come, outside of any transaction.
   * @throws HttpProblem not_found, job_signed, unknown_reference, too_few_items
   */
  async judge(indication: IndicationRequest): Promise<JudgedIndication> {
    const basis = await this.basisOf(indication.plan);
    const faults = indicationFaults(basis, indication);
    if (faults.length > 0) throw problemOfFaults(faults);
    return { indication, followed: followComponent(basis, indication) };
  }

  /**
   * Keeps it with what was answered to it, as the next event of its job.
   * @throws HttpProblem not_found, job_signed where the job was signed meanwhile, call_too_large
   */
  async keep(
    transaction: Transaction,
    { indication, followed }: JudgedIndication,
  ): Promise<IndicationAnswer> {
    const { deps, by, jobId } = this;
    const organisationId = by.caller.organisation.id;
    const row = await lockJob(deps, transaction, organisationId, jobId);
    refuseSigned(row);
    if (row.events >= limits.eventsPerJob) {
      const detail = `A job keeps ${limits.eventsPerJob} events: log the move, and go on without indications.`;
      throw new HttpProblem("call_too_large", detail, { limit: limits.eventsPerJob });
    }
    const createdAt = deps.now();
    const answer = { id: deps.newId(), createdAt: createdAt.toISOString(), ...followed };
    await row.update({ events: row.events + 1 }, { transaction });
    await deps.database.models.jobIndications.create(
      {
        jobId,
        id: answer.id,
        organisationId,
        requestText: JSON.stringify(indication),
        answerText: JSON.stringify(answer),
        createdAt,
        event: row.events,
        ...authorColumns(by.caller),
      },
      { transaction },
    );
    return answer;
  }

  private async basisOf(plan: string): Promise<FollowBasis> {
    const known = this.bases.get(plan);
    if (known) return known;
    const loaded = await loadJob(this.deps, this.by.caller.organisation.id, this.jobId);
    refuseSigned(loaded.row);
    const { state, machine } = loaded;
    const entry = state.plans.find(({ id }) => id === plan);
    const from = entry && resultOf(state, entry.document.surveyResult);
    if (!entry || !from) throw new HttpProblem("not_found", "The job has no plan with this id.");
    const results = await loadResults(this.deps, loaded);
    const moves = results.moves(entry.document.calculation);
    if (!moves) throw new HttpProblem("not_found", "The plan's calculation is gone.");
    const basis = { machine, plan: moves, fits: results.fits(from.document.boreFit) };
    this.bases.set(plan, basis);
    return basis;
  }
}
