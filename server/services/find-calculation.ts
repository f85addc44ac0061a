import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Calculation } from "../models/calculation.ts";
import { timeOfId } from "./ids.ts";

/**
 * Finds a record of one organisation. The id says when it was made, so the look-up goes through the primary key.
 * @throws HttpProblem not_found, alike for an id that never was and for another organisation's
 */
export async function findCalculation(deps: Deps, organisationId: string, id: string): Promise<Calculation> {
  const createdAt = timeOfId(id);
  const row =
    createdAt &&
    (await deps.database.models.calculations.findOne({ where: { createdAt, id, organisationId } }));
  if (!row) throw new HttpProblem("not_found", "There is no calculation with this id.");
  return row;
}
