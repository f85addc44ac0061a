import { z } from "zod";
import { limits } from "../limits.ts";
import { axisStationSchema } from "./axis-deviations.ts";
import { boreFitRequest } from "./bore-fits.ts";
import { noteSchema } from "./common.ts";
import { componentSchema } from "./move-components.ts";
import { pageOf, pageQuery } from "./paging.ts";
import { callerId, quantity } from "./quantity.ts";
import { shimMoveRequest } from "./shim-moves.ts";

export const stationKinds = ["bearing", "casing", "shroud", "nozzle", "seal", "other"] as const;

const line = z.string().trim().min(1).max(limits.nameLength);
const moves = shimMoveRequest.shape;

export const machineStationSchema = axisStationSchema
  .pick({ id: true, z: true, target: true, targetUncertainty: true, tolerance: true })
  .extend({
    label: line.nullish().meta({ description: "As people call it." }),
    kind: z.enum(stationKinds),
    nominalDiameter: quantity("bore", "positiveLength", "Diameter on the drawing.").nullish(),
  })
  .meta({ id: "MachineStation", description: "One bore of the machine, at its z." });

export const machineDocument = z
  .strictObject({
    name: line,
    plantTag: line.nullish().meta({ description: "What the plant's own documents call it." }),
    owner: line.nullish().meta({ description: "Who owns it: stands in the title block of reports." }),
    downstream: line.meta({
      description:
        "The end that z increases toward, in words: trains and double-flow casings have no single flow.",
    }),
    units: boreFitRequest.shape.units.meta({ description: "Of the machine, its jobs and their readings." }),
    stations: z.array(machineStationSchema).min(1).max(limits.stationsPerMachine),
    reference: z
      .array(callerId)
      .max(limits.stationsPerMachine)
      .optional()
      .meta({ description: "Ids of the stations that set the axis, unless a job says otherwise." }),
    components: z.array(componentSchema).max(limits.componentsPerCall).optional(),
    couplings: moves.couplings,
    indicators: moves.indicators,
    shims: moves.shims,
    maximumIncrement: moves.maximumIncrement,
    maximumMisfit: moves.maximumMisfit,
    cautions: z
      .array(z.string().trim().min(1).max(limits.noteLength))
      .max(limits.cautionsPerMachine)
      .optional()
      .meta({ description: "The maker's own: shown with every plan and report." }),
    remarks: noteSchema.optional(),
  })
  .meta({ id: "MachineDocument" });

export const reviseMachineRequest = z
  .strictObject({
    document: machineDocument,
    reason: z.string().trim().min(1).max(limits.noteLength).meta({ description: "Why it changed." }),
  })
  .meta({ id: "ReviseMachineRequest" });

export const copyMachineRequest = z.strictObject({ name: line }).meta({ id: "CopyMachineRequest" });
export const updateMachineRequest = z
  .strictObject({
    archived: z
      .boolean()
      .meta({ description: "An archived machine stays readable; no new job starts on it." }),
  })
  .meta({ id: "UpdateMachineRequest" });

export const authorSchema = z
  .object({
    member: z.object({ id: z.uuid(), name: z.string() }).nullable(),
    key: z.object({ id: z.uuid(), name: z.string(), prefix: z.string() }).nullable(),
  })
  .meta({ id: "Author", description: "The member or the key that did it." });

export const machineSummary = z
  .object({
    id: z.uuid(),
    name: z.string(),
    plantTag: z.string().nullable(),
    revision: z.number().int().meta({ description: "The newest." }),
    archived: z.boolean(),
    createdAt: z.iso.datetime(),
    version: z.number().int().meta({ description: "Also served as ETag." }),
  })
  .meta({ id: "MachineSummary" });

export const machineRevisionSummary = z
  .object({
    revision: z.number().int(),
    reason: z.string(),
    documentHash: z.string().meta({ description: "sha256 of the RFC 8785 form of the document." }),
    createdAt: z.iso.datetime(),
    by: authorSchema,
  })
  .meta({ id: "MachineRevisionSummary" });

export const machineRevisionSchema = machineRevisionSummary
  .extend({ machineId: z.uuid(), document: machineDocument })
  .meta({ id: "MachineRevision", description: "Never changes." });

export const machineSchema = machineSummary
  .extend({ documentHash: z.string(), document: machineDocument })
  .meta({ id: "Machine", description: "With its newest revision." });

export const listMachinesQuery = z.strictObject({
  archived: z.enum(["true", "false"]).optional().meta({ description: "false when absent." }),
  q: z.string().min(1).max(100).optional().meta({ description: "Words of the name, or the start of an id." }),
  ...pageQuery,
});
export const machinePage = pageOf("MachinePage", machineSummary);
export const listRevisionsQuery = z.strictObject(pageQuery);
export const machineRevisionPage = pageOf("MachineRevisionPage", machineRevisionSummary);

const revisionNumber = z.string().regex(/^[1-9]\d{0,8}$/, "A revision is a whole number from 1.");
export const revisionParam = revisionNumber;
export const compareRevisionsQuery = z.strictObject({ from: revisionNumber, to: revisionNumber });
export const machineComparison = z
  .object({
    from: z.number().int(),
    to: z.number().int(),
    same: z.boolean(),
    differences: z.array(
      z.object({
        pointer: z.string().meta({
          description: "RFC 6901; stations, components, supports and the like are named by id, not by place.",
        }),
        from: z.unknown().meta({ description: "Absent where it was added." }),
        to: z.unknown().meta({ description: "Absent where it was taken away." }),
      }),
    ),
  })
  .meta({ id: "MachineComparison" });

export type MachineDocument = z.infer<typeof machineDocument>;
export type MachineStation = z.infer<typeof machineStationSchema>;
export type MachineSummary = z.infer<typeof machineSummary>;
export type Machine = z.infer<typeof machineSchema>;
export type MachineRevision = z.infer<typeof machineRevisionSchema>;
export type MachineRevisionSummary = z.infer<typeof machineRevisionSummary>;
export type MachineComparison = z.infer<typeof machineComparison>;
export type Author = z.infer<typeof authorSchema>;
