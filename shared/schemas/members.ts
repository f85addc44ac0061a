import { z } from "zod";
import { roles } from "../access.ts";
import { limits } from "../limits.ts";
import { pageOf, pageQuery } from "./paging.ts";
import { emailSchema } from "./sessions.ts";

const roleSchema = z.enum(roles).meta({ id: "Role" });
const nameSchema = z.string().trim().min(1).max(limits.nameLength);

export const createMemberRequest = z
  .strictObject({ email: emailSchema, name: nameSchema, role: roleSchema })
  .meta({ id: "CreateMemberRequest" });

export const updateMemberRequest = z
  .strictObject({ name: nameSchema.optional(), role: roleSchema.optional(), active: z.boolean().optional() })
  .meta({ id: "UpdateMemberRequest", description: "Send what is to change, with If-Match." });

export const memberSchema = z
  .object({
    id: z.uuid(),
    email: z.string(),
    name: z.string(),
    role: roleSchema,
    status: z.enum(["invited", "active", "disabled"]),
    createdAt: z.iso.datetime(),
    lastSignedInAt: z.iso.datetime().nullable(),
    version: z.number().int().meta({ description: "Also served as ETag." }),
  })
  .meta({ id: "Member" });

export const invitedMemberSchema = memberSchema
  .extend({
    invitation: z.object({
      link: z.string().meta({ description: "Good once; shown this once. Hand it to the member." }),
      expiresAt: z.iso.datetime(),
    }),
  })
  .meta({ id: "InvitedMember" });

export const listMembersQuery = z.strictObject(pageQuery);
export const memberPage = pageOf("MemberPage", memberSchema);

export type Member = z.infer<typeof memberSchema>;
