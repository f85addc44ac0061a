/** One entry of the log, in the order of time: stations measured, or moved. */
export interface SurveyEvent {
  readonly event: "measured" | "moved";
  readonly stationIds: readonly string[];
}

export interface OutstandingInput {
  /** In the order named. */
  readonly referenceIds: readonly string[];
  /** Every station known, in the order sent. */
  readonly stationIds: readonly string[];
  /** Those planned to move, whether the log has it or not. */
  readonly plannedIds: ReadonlySet<string>;
  /** Those that the later survey measured. */
  readonly measuredIds: ReadonlySet<string>;
  readonly events: readonly SurveyEvent[];
}

/**
 * What was not re-measured since its last move, in the order in which it is to be done (common practice, no source):
 * reference stations first, since any move may have disturbed them, then the stations that moved, in the order sent. A
 * station that the later survey lacks is outstanding whatever the log says; one whose move the log does not have counts
 * as measured after it when the later survey has it. O(events).
 */
export function findOutstanding({
  referenceIds,
  stationIds,
  plannedIds,
  measuredIds,
  events,
}: OutstandingInput): string[] {
  const lastMoved = new Map<string, number>();
  const lastMeasured = new Map<string, number>();
  let lastMove = -1;
  events.forEach(({ event, stationIds: at }, order) => {
    for (const id of at) (event === "moved" ? lastMoved : lastMeasured).set(id, order);
    if (event === "moved") lastMove = order;
  });
  const isOutstanding = (id: string, since: number) =>
    !measuredIds.has(id) || (since >= 0 && (lastMeasured.get(id) ?? -1) < since);
  const anythingMoved = lastMove >= 0 || plannedIds.size > 0;
  const references = anythingMoved ? referenceIds.filter((id) => isOutstanding(id, lastMove)) : [];
  const moved = stationIds.filter(
    (id) => (lastMoved.has(id) || plannedIds.has(id)) && isOutstanding(id, lastMoved.get(id) ?? -1),
  );
  return [...new Set([...references, ...moved])];
}
