// The thread of a long calculation, of a report, or of a file to be read. Plain JavaScript, so that it can load the
// TypeScript that it runs.
import { register } from "tsx/esm/api";

register();
const { outcomeOfKind } = await import("./compute-outcome-of-kind.ts");
const { readFileTask } = await import("./read-file-task.ts");
const { writeReport } = await import("./write-report.ts");

/** @param {{ kind: import("../calculations/calculation-kind.ts").CalculationKindName, request: unknown }} task */
export const compute = ({ kind, request }) => outcomeOfKind(kind, request);

/** @param {import("./write-report.ts").ReportTask} task */
export const report = (task) => writeReport(task);

/** @param {{ task: import("./read-file-task.ts").FileTask, begun: import("node:worker_threads").MessagePort }} order */
export const read = async ({ task, begun }) => {
  begun.postMessage("begun");
  try {
    return await readFileTask(task);
  } finally {
    begun.close();
  }
};
