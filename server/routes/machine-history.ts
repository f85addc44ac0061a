import { machineHistory } from "../../shared/schemas/machine-history.ts";
import { limits } from "../../shared/limits.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { historyOf } from "../jobs/machine-history.ts";
import { readJobRecord } from "../services/jobs.ts";
import { documentOf, findMachine, findRevision } from "../services/machines.ts";

const readMachineHistory = defineOperation({
  operationId: "readMachineHistory",
  method: "get",
  path: "/v1/machines/{id}/history",
  tag: "Machines",
  summary: "Read a machine's history",
  description: `Every station over its jobs, as found and as left, and what it drifted from one outage to the next. The newest ${limits.jobsPerHistory} jobs.`,
  response: { status: 200, description: "The history.", schema: machineHistory },
  errors: [],
  handle: async (call) => {
    const { deps } = call;
    const organisationId = callerOf(call).organisation.id;
    const machine = await findMachine(deps, organisationId, call.params.id ?? "");
    const revision = await findRevision(deps, machine, machine.revision);
    const jobs = await deps.database.models.jobs.findAll({
      where: { organisationId, machineId: machine.id },
      attributes: ["id"],
      order: [
        ["createdAt", "DESC"],
        ["id", "DESC"],
      ],
      limit: limits.jobsPerHistory + 1,
    });
    const records = [];
    for (const { id } of jobs.slice(0, limits.jobsPerHistory).reverse()) {
      records.push(await readJobRecord(deps, organisationId, id));
    }
    const more = jobs.length > limits.jobsPerHistory;
    return reply(200, historyOf({ id: machine.id, document: documentOf(revision) }, records, more));
  },
});

export const machineHistoryOperations = [readMachineHistory];
