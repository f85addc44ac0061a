import { z } from "zod";
import { problemCodes } from "../error-codes.ts";
import { limits } from "../limits.ts";
import { readingSchema } from "./job-entries.ts";
import { addedEntries } from "./jobs.ts";

export const readingFileQuery = z.strictObject({
  name: z
    .string()
    .min(1)
    .max(limits.nameLength)
    .regex(/^[^\p{Cc}\p{Cf}/\\]+$/u, "A file name holds no slashes and no control characters.")
    .meta({ description: "The file's name." }),
  columns: z.string().max(2_000).optional().meta({
    description:
      "What columns of other names stand for: `station=Place,reading=Dial (mm)`. A unit stands in the head, in brackets.",
  }),
  ignore: z
    .string()
    .max(2_000)
    .optional()
    .meta({ description: "Heads of columns to leave out, with commas between them." }),
});

const fileFault = z
  .object({
    line: z.number().int().meta({ description: "As a spreadsheet counts; the head is line 1." }),
    column: z.string().nullable(),
    code: z.enum(problemCodes),
    detail: z.string(),
  })
  .meta({ id: "FileFault" });

export const readingPreview = z
  .object({
    file: z.object({ name: z.string(), bytes: z.number().int(), sha256: z.string() }),
    delimiter: z.string().nullable().meta({ description: "Between cells; null in a workbook." }),
    decimal: z.enum(["point", "comma"]).nullable(),
    columns: z.array(
      z.object({
        header: z.string(),
        column: z
          .string()
          .nullable()
          .meta({ description: "What it is taken for; null: ignored, or a fault." }),
        unit: z.string().nullable(),
      }),
    ),
    readings: z.array(readingSchema).meta({ description: "Those without a fault, in the machine's units." }),
    faults: z.array(fileFault).meta({
      description: `The first ${limits.faultsPerPreview}, then how many more. A file is taken only without any.`,
    }),
  })
  .meta({ id: "ReadingPreview" });

export const addedReadingFile = addedEntries
  .extend({ file: z.object({ id: z.uuid(), name: z.string(), sha256: z.string() }) })
  .meta({ id: "AddedReadingFile" });

export type ReadingPreview = z.infer<typeof readingPreview>;
