import { Op, type WhereOptions } from "sequelize";
import {
  compareRevisionsQuery,
  copyMachineRequest,
  listMachinesQuery,
  listRevisionsQuery,
  machineComparison,
  machineDocument,
  machinePage,
  machineRevisionPage,
  machineRevisionSchema,
  machineSchema,
  reviseMachineRequest,
  revisionParam,
  updateMachineRequest,
} from "../../shared/schemas/machines.ts";
import { examplesIn } from "../http/example-calls.ts";
import { byOf, readOf } from "../http/call-parts.ts";
import { versionTag } from "../http/entity-tag.ts";
import { callerOf, defineOperation, reply, type Call } from "../http/operation.ts";
import { compareDocuments } from "../machines/compare-documents.ts";
import { machineFaultsBesideSchema, under } from "../machines/machine-faults.ts";
import {
  presentMachine,
  presentMachineSummary,
  presentRevision,
  presentRevisionSummary,
} from "../presenters/present-machine.ts";
import { readCallerNames } from "../services/caller-names.ts";
import { changeOnce } from "../services/change-once.ts";
import {
  archiveMachine,
  createMachine,
  documentOf,
  findMachine,
  findRevision,
  reviseMachine,
  type RevisedMachine,
} from "../services/machines.ts";
import { readPage } from "../services/read-page.ts";
import { matchesText } from "../services/text-search.ts";

const tag = "Machines";

const listMachines = defineOperation({
  operationId: "listMachines",
  method: "get",
  path: "/v1/machines",
  tag,
  summary: "List machines",
  description: "Machines of the organisation, newest first; those put away only where asked for.",
  query: listMachinesQuery,
  response: { status: 200, description: "One page.", schema: machinePage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { cursor, limit, ...filters } = call.query;
    const scope = { list: "machines", organisationId: callerOf(call).organisation.id, filters };
    const conditions: WhereOptions[] = [
      { archivedAt: filters.archived === "true" ? { [Op.not]: null } : null },
      ...(filters.q === undefined ? [] : [matchesText("name", filters.q)]),
    ];
    const page = await readPage(
      call.deps,
      call.deps.database.models.machines,
      scope,
      { cursor, limit },
      { where: { [Op.and]: conditions } },
    );
    return reply(200, {
      data: page.rows.map(presentMachineSummary),
      nextCursor: page.nextCursor,
      limit: page.limit,
    });
  },
});

const createMachineOperation = defineOperation({
  operationId: "createMachine",
  method: "post",
  path: "/v1/machines",
  tag,
  summary: "Describe a machine",
  description:
    "Its bores along z, the parts that carry them, what those rest on, the shims at hand and the maker's cautions. Stored as revision 1.",
  body: machineDocument,
  faultsBesideSchema: machineFaultsBesideSchema,
  requestExamples: () => examplesIn("machines"),
  response: { status: 201, description: "The machine.", schema: machineSchema },
  errors: ["duplicate_id", "unknown_reference", "combination_invalid", "tolerance_invalid"],
  handle: (call) =>
    changeOnce(call.deps, call, 201, async (transaction) => {
      const order = { document: call.body, reason: "First description." };
      return answer(await createMachine(call.deps, transaction, order, byOf(call)));
    }),
});

const readMachine = defineOperation({
  operationId: "readMachine",
  method: "get",
  path: "/v1/machines/{id}",
  tag,
  summary: "Read a machine",
  description: "With the document of its newest revision, as it was sent.",
  response: { status: 200, description: "The machine.", schema: machineSchema },
  errors: [],
  handle: async (call) => {
    const machine = await found(call);
    const revision = await findRevision(call.deps, machine, machine.revision);
    const { body, headers } = answer({ machine, revision });
    return reply(200, body, headers);
  },
});

const updateMachineOperation = defineOperation({
  operationId: "updateMachine",
  method: "patch",
  path: "/v1/machines/{id}",
  tag,
  summary: "Archive or restore a machine",
  description: "An archived machine keeps its jobs and can be read; no new job starts on it.",
  body: updateMachineRequest,
  requestExamples: () => ({ archive: { summary: "Put a machine away", value: { archived: true } } }),
  response: { status: 200, description: "The machine.", schema: machineSchema },
  errors: [],
  conditional: true,
  handle: (call) =>
    changeOnce(call.deps, call, 200, async (transaction) =>
      answer(await archiveMachine(call.deps, transaction, readOf(call), call.body.archived, byOf(call))),
    ),
});

const reviseMachineOperation = defineOperation({
  operationId: "reviseMachine",
  method: "post",
  path: "/v1/machines/{id}/revisions",
  tag,
  summary: "Change a machine",
  description: "Adds a revision. Jobs keep the revision they started with.",
  body: reviseMachineRequest,
  faultsBesideSchema: (body) =>
    under("document", machineFaultsBesideSchema((body as { document?: unknown }).document)),
  requestExamples: () =>
    Object.fromEntries(
      Object.entries(examplesIn("machines")).map(([name, { summary, value }]) => [
        name,
        { summary, value: { document: value, reason: "Feet of the aft casing added." } },
      ]),
    ),
  response: { status: 201, description: "The machine, with its new revision.", schema: machineSchema },
  errors: ["duplicate_id", "unknown_reference", "combination_invalid", "tolerance_invalid"],
  conditional: true,
  handle: (call) =>
    changeOnce(call.deps, call, 201, async (transaction) =>
      answer(await reviseMachine(call.deps, transaction, readOf(call), call.body, byOf(call))),
    ),
});

const listMachineRevisions = defineOperation({
  operationId: "listMachineRevisions",
  method: "get",
  path: "/v1/machines/{id}/revisions",
  tag,
  summary: "List a machine's revisions",
  description: "Who changed it, when and why, newest first.",
  query: listRevisionsQuery,
  response: { status: 200, description: "One page.", schema: machineRevisionPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { id, organisationId } = await found(call);
    const scope = { list: "machine-revisions", organisationId, filters: { machineId: id } };
    const page = await readPage(call.deps, call.deps.database.models.machineRevisions, scope, call.query, {
      where: { machineId: id },
      attributes: { exclude: ["documentText"] },
    });
    const names = await readCallerNames(call.deps.database, organisationId, page.rows);
    return reply(200, {
      data: page.rows.map((row) => presentRevisionSummary(row, names)),
      nextCursor: page.nextCursor,
      limit: page.limit,
    });
  },
});

const readMachineRevision = defineOperation({
  operationId: "readMachineRevision",
  method: "get",
  path: "/v1/machines/{id}/revisions/{revision}",
  tag,
  summary: "Read a revision of a machine",
  description: "The document as it stood. It never changes.",
  params: { revision: revisionParam },
  response: { status: 200, description: "The revision.", schema: machineRevisionSchema },
  errors: [],
  handle: async (call) => {
    const machine = await found(call);
    const row = await findRevision(call.deps, machine, Number(call.params.revision));
    const names = await readCallerNames(call.deps.database, machine.organisationId, [row]);
    return reply(200, presentRevision(row, names), { ETag: `"${row.documentHash}"` });
  },
});

const compareMachineRevisions = defineOperation({
  operationId: "compareMachineRevisions",
  method: "get",
  path: "/v1/machines/{id}/comparison",
  tag,
  summary: "Compare two revisions of a machine",
  description: "Every place where they differ.",
  query: compareRevisionsQuery,
  response: { status: 200, description: "The differences.", schema: machineComparison },
  errors: [],
  handle: async (call) => {
    const machine = await found(call);
    const [from, to] = [Number(call.query.from), Number(call.query.to)];
    const [before, after] = await Promise.all(
      [from, to].map(async (revision) => documentOf(await findRevision(call.deps, machine, revision))),
    );
    const differences = compareDocuments(before, after);
    return reply(200, { from, to, same: differences.length === 0, differences });
  },
});

const copyMachine = defineOperation({
  operationId: "copyMachine",
  method: "post",
  path: "/v1/machines/{id}/copies",
  tag,
  summary: "Copy a machine",
  description: "Its newest revision under another name, as a machine of its own: for a sister unit.",
  body: copyMachineRequest,
  requestExamples: () => ({ sister: { summary: "A sister unit", value: { name: "Unit 3" } } }),
  response: { status: 201, description: "The copy.", schema: machineSchema },
  errors: [],
  handle: async (call) => {
    const machine = await found(call);
    const original = documentOf(await findRevision(call.deps, machine, machine.revision));
    const order = {
      document: { ...original, name: call.body.name, plantTag: null },
      reason: `Copy of ${machine.name}, revision ${machine.revision}.`,
    };
    return changeOnce(call.deps, call, 201, async (transaction) =>
      answer(await createMachine(call.deps, transaction, order, byOf(call))),
    );
  },
});

type ById = Pick<Call, "deps" | "caller" | "params">;

const found = (call: ById) => findMachine(call.deps, callerOf(call).organisation.id, call.params.id ?? "");

function answer(revised: RevisedMachine): { body: unknown; headers: Record<string, string> } {
  const { id, version } = revised.machine;
  return {
    body: presentMachine(revised),
    headers: { ETag: versionTag(version), Location: `/v1/machines/${id}` },
  };
}

export const machineOperations = [
  listMachines,
  createMachineOperation,
  readMachine,
  updateMachineOperation,
  listMachineRevisions,
  reviseMachineOperation,
  readMachineRevision,
  compareMachineRevisions,
  copyMachine,
];
