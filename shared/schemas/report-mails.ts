import { z } from "zod";
import { limits } from "../limits.ts";
import { emailSchema } from "./sessions.ts";

export const reportMailRequest = z
  .strictObject({
    to: z
      .array(emailSchema)
      .min(1)
      .max(limits.recipientsPerMail)
      .meta({ description: "Recipients, by name." }),
    formats: z
      .array(z.string().regex(/^[a-z]{2,5}$/, "A report's extension, such as pdf."))
      .min(1)
      .max(10)
      .meta({ description: "pdf, xlsx, dxf, csv, json." }),
    message: z.string().trim().max(limits.noteLength).optional(),
  })
  .meta({ id: "ReportMailRequest" });

export const reportMail = z
  .object({
    to: z.array(z.string()),
    notTaken: z.array(z.string()).meta({ description: "Addresses that the mail server refused." }),
    subject: z.string(),
    files: z.array(z.object({ name: z.string(), bytes: z.number().int(), sha256: z.string() })),
  })
  .meta({ id: "ReportMail" });
