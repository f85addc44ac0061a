// The thread of a long calculation, or of a report. Plain JavaScript, so that it can load the TypeScript that it runs.
import { register } from "tsx/esm/api";

register();
const { outcomeOfKind } = await import("./compute-outcome-of-kind.ts");
const { writeReport } = await import("./write-report.ts");

/** @param {{ kind: import("../calculations/calculation-kind.ts").CalculationKindName, request: unknown }} task */
export const compute = ({ kind, request }) => outcomeOfKind(kind, request);

/** @param {import("./write-report.ts").ReportTask} task */
export const report = (task) => writeReport(task);
