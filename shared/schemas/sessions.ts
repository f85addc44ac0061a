import { z } from "zod";
import { roles, scopes } from "../access.ts";
import { limits } from "../limits.ts";

export const emailSchema = z.email().max(254);
/** A password as typed: no rules of composition, nothing cut off. How short is too short is a rule of the service. */
export const passwordSchema = z.string().min(1).max(256);

export const createSessionRequest = z
  .strictObject({ email: emailSchema, password: passwordSchema })
  .meta({ id: "CreateSessionRequest" });

export const signedInMember = z
  .object({
    id: z.uuid(),
    email: z.string(),
    name: z.string(),
    role: z.enum(roles),
    organisation: z.object({ id: z.uuid(), name: z.string() }),
  })
  .meta({ id: "SignedInMember" });

export const sessionSchema = z
  .object({
    accessToken: z.string().meta({ description: "Sent as Authorization: Bearer; good for minutes." }),
    expiresAt: z.iso.datetime(),
    member: signedInMember,
  })
  .meta({ id: "Session" });

/** Who the credential speaks for, and what it may do. */
export const callerSchema = z
  .object({
    member: signedInMember.nullable(),
    key: z.object({ id: z.uuid(), name: z.string(), prefix: z.string() }).nullable(),
    organisation: z.object({ id: z.uuid(), name: z.string() }),
    scopes: z.array(z.enum(scopes)),
  })
  .meta({ id: "Caller" });

export const acceptInvitationRequest = z
  .strictObject({
    token: z.string().min(1).max(200),
    password: z
      .string()
      .min(1)
      .max(256)
      .meta({ description: `At least 12 characters; no rules of composition.` }),
    name: z.string().trim().min(1).max(limits.nameLength).optional(),
  })
  .meta({ id: "AcceptInvitationRequest" });

export type Session = z.infer<typeof sessionSchema>;
