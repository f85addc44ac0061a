import { Op, type Transaction } from "sequelize";
import type { AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import type { Deps } from "../deps.ts";
import { resultOf, type JobEntry, type JobState } from "../jobs/job-log.ts";
import { timeOfId } from "./ids.ts";
import type { LoadedJob } from "./job-store.ts";

/** What the calculations of a job answered, by record id. */
export interface StoredResults {
  readonly fits: (id: string) => readonly BoreFitResult[];
  readonly deviations: (id: string) => AxisDeviationResult | null;
  readonly moves: (id: string) => ShimMoveResult | null;
  readonly confirmation: (id: string) => ConfirmationResult | null;
  /** resultHash of each, in the order asked for. */
  readonly hashes: readonly { readonly id: string; readonly resultHash: string | null }[];
}

/** Reads every calculation that a job's state refers to, in one query. */
export async function loadResults(
  deps: Deps,
  { row, state }: Pick<LoadedJob, "row" | "state">,
  transaction?: Transaction,
): Promise<StoredResults> {
  const ids = calculationIds(state);
  const places = ids.flatMap((id) => {
    const createdAt = timeOfId(id);
    return createdAt ? [{ createdAt, id }] : [];
  });
  const found =
    places.length === 0
      ? []
      : await deps.database.models.calculations.findAll({
          where: { organisationId: row.organisationId, [Op.or]: places },
          attributes: ["createdAt", "id", "answerText", "resultHash"],
          ...(transaction ? { transaction } : {}),
        });
  const resultOf = new Map(
    found.map(({ id, answerText }) => [id, (JSON.parse(answerText) as { result: unknown }).result]),
  );
  const hashOf = new Map(found.map(({ id, resultHash }) => [id, resultHash]));
  const read = <Result>(id: string) => (resultOf.get(id) ?? null) as Result | null;
  return {
    fits: (id) => read<{ bores: BoreFitResult[] }>(id)?.bores ?? [],
    deviations: (id) => read<AxisDeviationResult>(id),
    moves: (id) => read<ShimMoveResult>(id),
    confirmation: (id) => read<ConfirmationResult>(id),
    hashes: ids.map((id) => ({ id, resultHash: hashOf.get(id) ?? null })),
  };
}

/** Each once: of the surveys' newest results, of the plans with what they were made from, of the confirmations. */
function calculationIds(state: JobState): string[] {
  const ofResult = (entry: JobEntry<"survey_result"> | null) =>
    entry ? [entry.document.boreFit, entry.document.axisDeviation] : [];
  const ids = [
    ...state.surveys.flatMap(({ result }) => ofResult(result)),
    ...state.plans.flatMap(({ document }) => [
      ...ofResult(resultOf(state, document.surveyResult)),
      document.calculation,
    ]),
    ...state.confirmations.map(({ document }) => document.calculation),
  ];
  return [...new Set(ids)];
}
