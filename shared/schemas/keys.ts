import { z } from "zod";
import { scopes } from "../access.ts";
import { limits } from "../limits.ts";
import { pageOf, pageQuery } from "./paging.ts";

const scopeSchema = z.enum(scopes).meta({ id: "Scope" });

export const createKeyRequest = z
  .strictObject({
    name: z.string().trim().min(1).max(limits.nameLength).meta({ description: "What the key is for." }),
    scopes: z
      .array(scopeSchema)
      .min(1)
      .max(scopes.length)
      .meta({ description: "What it may do; never more than its maker may." }),
    expiresAt: z.iso
      .datetime({ offset: true })
      .nullable()
      .optional()
      .meta({ description: "90 days from now when absent; null never expires." }),
  })
  .meta({ id: "CreateKeyRequest" });

export const keySchema = z
  .object({
    id: z.uuid(),
    name: z.string(),
    prefix: z.string().meta({ description: "The part of the key that may be shown." }),
    scopes: z.array(scopeSchema),
    status: z.enum(["active", "expired", "revoked"]),
    createdAt: z.iso.datetime(),
    createdBy: z.object({ id: z.uuid(), name: z.string() }).nullable(),
    expiresAt: z.iso.datetime().nullable(),
    lastUsedAt: z.iso.datetime().nullable().meta({ description: "To the minute." }),
    revokedAt: z.iso.datetime().nullable(),
    version: z.number().int().meta({ description: "Also served as ETag." }),
  })
  .meta({ id: "Key" });

export const createdKeySchema = keySchema
  .extend({ secret: z.string().meta({ description: "The key itself, shown this once." }) })
  .meta({ id: "CreatedKey" });

export const listKeysQuery = z.strictObject(pageQuery);
export const keyPage = pageOf("KeyPage", keySchema);

export type Key = z.infer<typeof keySchema>;
export type CreatedKey = z.infer<typeof createdKeySchema>;
