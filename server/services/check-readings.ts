import { boreFitRequest } from "../../shared/schemas/bore-fits.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";
import { boreFitKind } from "../calculations/bore-fit.ts";
import type { Deps } from "../deps.ts";
import { problemOfFaults } from "../http/http-problem.ts";
import { schemaFaults } from "../http/schema-faults.ts";
import { readingFaults } from "../jobs/job-faults.ts";
import type { SourceFile } from "../jobs/job-log.ts";
import { boreFitCall } from "../jobs/job-requests.ts";
import { surveyOf } from "./find-survey.ts";
import type { LoadedJob, NewEntry } from "./job-store.ts";

/**
 * Checks readings as the engine would, each at its own place: a reading that cannot be fitted is refused before any is
 * stored, while the crew still stands at the bore.
 * @throws HttpProblem naming every fault of every reading under /readings
 */
export async function checkedReadings(
  deps: Deps,
  { machine, state }: Pick<LoadedJob, "machine" | "state">,
  surveyId: string,
  readings: readonly Reading[],
  sourceFile: SourceFile | null,
): Promise<NewEntry<"reading">[]> {
  const survey = surveyOf(state.surveys, surveyId);
  const faults = readingFaults(readings, machine, state.details);
  if (faults.length > 0) throw problemOfFaults(faults);
  const call = boreFitCall(
    { machine, details: state.details },
    readings,
    survey.entry.document.instrument ?? null,
    null,
  );
  // Several readings of one station may come in one call; fitted together here, each needs a name of its own.
  const body = { ...call, bores: call.bores.map((bore, index) => ({ ...bore, id: `reading ${index}` })) };
  const shape = schemaFaults(boreFitRequest, body);
  const outcome = shape.length > 0 ? null : await deps.compute.run(boreFitKind, body);
  const refused = outcome?.status === "failed" ? outcome.faults : shape;
  if (refused.length > 0) {
    throw problemOfFaults(
      refused.map((fault) => ({ ...fault, pointer: fault.pointer.replace(/^\/bores\//, "/readings/") })),
    );
  }
  // Each keeps the end it was seen from: the job's may be entered anew, and must not turn what was read before.
  return readings.map((reading) => ({
    kind: "reading",
    document: {
      survey: surveyId,
      reading: { ...reading, seen: reading.seen ?? state.details.seen },
      sourceFile,
    },
  }));
}
