import { z } from "zod";
import { pageOf, pageQuery } from "./paging.ts";

export const outboxMailSchema = z
  .object({
    id: z.uuid(),
    to: z.array(z.string()),
    subject: z.string(),
    date: z.iso.datetime().nullable(),
    bytes: z.number().int(),
  })
  .meta({ id: "OutboxMail" });

export const listOutboxQuery = z.strictObject(pageQuery);
export const outboxPage = pageOf("OutboxPage", outboxMailSchema);

export type OutboxMail = z.infer<typeof outboxMailSchema>;
