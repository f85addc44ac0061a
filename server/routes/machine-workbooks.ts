import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import { limits } from "../../shared/limits.ts";
import {
  machineImport,
  machineImportQuery,
  machineTemplateQuery,
} from "../../shared/schemas/machine-workbooks.ts";
import type { Deps } from "../deps.ts";
import { byOf } from "../http/call-parts.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply, type Reply } from "../http/operation.ts";
import type { ReadMachine } from "../machines/workbook/read-machine-workbook.ts";
import { writeMachineTemplate, writeMachineWorkbook } from "../machines/workbook/write-machine-workbook.ts";
import { presentMachine } from "../presenters/present-machine.ts";
import { changeOnce } from "../services/change-once.ts";
import { createMachine, documentOf, findMachine, findRevision } from "../services/machines.ts";
import { sha256 } from "../services/run-calculation.ts";

const tag = "Machines";
const mediaType = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet";

const readMachineTemplate = defineOperation({
  operationId: "readMachineTemplate",
  method: "get",
  path: "/v1/machine-template",
  tag,
  summary: "Download an empty machine workbook",
  description:
    "Sheets for the machine, its stations, components, supports, stacks, stock and cautions, with units in the headings and a guide. Fill it in and send it to POST /v1/machine-imports.",
  query: machineTemplateQuery,
  response: { status: 200, description: "The workbook.", files: [mediaType] },
  errors: [],
  handle: async ({ query: { axial = "mm", bore = "mm", offset = "mm" } }) =>
    workbook(await writeMachineTemplate({ axial, bore, offset }), "machine-template"),
});

const readMachineWorkbookOperation = defineOperation({
  operationId: "readMachineWorkbook",
  method: "get",
  path: "/v1/machines/{id}/workbook",
  tag,
  summary: "Export a machine as a workbook",
  description: "Its newest revision, in the template's sheets. Imported again it is the same document.",
  response: { status: 200, description: "The workbook.", files: [mediaType] },
  errors: [],
  handle: async (call) => {
    const machine = await findMachine(call.deps, callerOf(call).organisation.id, call.params.id ?? "");
    const revision = await findRevision(call.deps, machine, machine.revision);
    const bytes = await writeMachineWorkbook(documentOf(revision), {
      description: `Machine ${machine.id}, revision ${revision.revision}, document ${revision.documentHash}`,
      createdAt: revision.createdAt,
    });
    const file = workbook(bytes, `machine-${machine.id}-r${revision.revision}`);
    return {
      ...file,
      headers: { ...file.headers, ETag: `"${createHash("sha256").update(bytes).digest("hex")}"` },
    };
  },
});

const importMachine = defineOperation({
  operationId: "importMachine",
  method: "post",
  path: "/v1/machine-imports",
  tag,
  summary: "Import a machine from a workbook",
  description:
    "Reads a workbook made from the template or exported. Tells the document and every fault with its sheet and cell; stores the machine where store=true and there is no fault. Values alone are read: a formula is a fault, an empty cell is missing and never 0.",
  query: machineImportQuery,
  file: { mediaTypes: [mediaType], limitBytes: limits.workbookBytes },
  response: { status: 200, description: "What was read, and stored.", schema: machineImport },
  errors: [
    "file_not_as_stated",
    "several_faults",
    "required",
    "units_missing",
    "unknown_field",
    "wrong_type",
    "choice_unknown",
    "duplicate_id",
    "unknown_reference",
    "combination_invalid",
    "tolerance_invalid",
  ],
  handle: async (call): Promise<Reply> => {
    const read = await readSent(call.deps, call.bytes);
    const preview = {
      document: read.document,
      documentHash: read.document && sha256(canonicalize(read.document) ?? ""),
      faults: read.faults,
      machine: null,
    };
    if (call.query.store !== "true") return reply(200, preview);
    const { document } = read;
    if (document === null) throw refusal(read);
    return changeOnce(call.deps, call, 200, async (transaction) => {
      const order = { document, reason: "Imported from a workbook." };
      const machine = presentMachine(await createMachine(call.deps, transaction, order, byOf(call)));
      return { body: { ...preview, machine }, headers: { Location: `/v1/machines/${machine.id}` } };
    });
  },
});

/** @throws HttpProblem for a file that cannot be opened, or takes too long */
async function readSent({ compute }: Deps, bytes: Buffer): Promise<ReadMachine> {
  const read = await compute.machine(bytes);
  if ("unreadable" in read) throw new HttpProblem(read.unreadable.code, read.unreadable.detail);
  return read;
}

/** Every fault as one problem, its cell as the pointer: /sheets/Stations/C5. */
function refusal({ faults }: ReadMachine): HttpProblem {
  return problemOfFaults(
    faults.map(({ sheet, cell, code, detail }) => ({
      pointer: `/sheets/${sheet.replaceAll("~", "~0").replaceAll("/", "~1")}${cell === null ? "" : `/${cell}`}`,
      code,
      detail,
    })),
  );
}

function workbook(bytes: Buffer, name: string) {
  const headers = {
    "Content-Type": mediaType,
    "Content-Disposition": `attachment; filename="${name}.xlsx"`,
  };
  return { status: 200, body: bytes, headers };
}

export const machineWorkbookOperations = [readMachineTemplate, readMachineWorkbookOperation, importMachine];
