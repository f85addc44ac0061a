import { z } from "zod";
import { problemCodes } from "../error-codes.ts";
import { unitChoices } from "../units.ts";
import { machineDocument, machineSchema } from "./machines.ts";

export const machineTemplateQuery = z.strictObject({
  axial: z
    .enum(unitChoices.axial)
    .optional()
    .meta({ description: "Unit along the machine; mm when absent." }),
  bore: z.enum(unitChoices.bore).optional().meta({ description: "Unit of bores; mm when absent." }),
  offset: z.enum(unitChoices.offset).optional().meta({ description: "Unit of offsets; mm when absent." }),
});

export const machineImportQuery = z.strictObject({
  store: z.enum(["true", "false"]).optional().meta({
    description:
      "true: the machine is stored, where the workbook has no fault. false when absent: a preview.",
  }),
});

export const workbookFault = z
  .object({
    sheet: z.string().meta({ description: "The sheet's name." }),
    cell: z.string().nullable().meta({ description: "A1, or null where no cell is at fault." }),
    code: z.enum(problemCodes),
    detail: z.string(),
  })
  .meta({ id: "WorkbookFault" });

export const machineImport = z
  .object({
    document: machineDocument.nullable().meta({ description: "Null where the workbook has faults." }),
    documentHash: z
      .string()
      .nullable()
      .meta({ description: "sha256 of the RFC 8785 form of the document, as a revision has it." }),
    faults: z.array(workbookFault).meta({ description: "Every one." }),
    machine: machineSchema.nullable().meta({ description: "What was stored; null of a preview." }),
  })
  .meta({ id: "MachineImport" });
