import type { Key } from "../../shared/schemas/keys.ts";
import { scopesOf, type ApiKey } from "../models/api-key.ts";
import type { Member } from "../models/member.ts";
import { keyPrefix } from "../services/key-format.ts";
import { isoTime, isoTimeOrNull } from "./time.ts";

/** A key as it may be shown: never its secret, nor the hash of it. */
export function presentKey(key: ApiKey & { maker?: Member | null }, now: Date): Key {
  return {
    id: key.id,
    name: key.name,
    prefix: keyPrefix(key.selector),
    scopes: scopesOf(key),
    status: key.revokedAt ? "revoked" : key.expiresAt && key.expiresAt <= now ? "expired" : "active",
    createdAt: isoTime(key.createdAt),
    createdBy: key.maker ? { id: key.maker.id, name: key.maker.name } : null,
    expiresAt: isoTimeOrNull(key.expiresAt),
    lastUsedAt: isoTimeOrNull(key.lastUsedAt),
    revokedAt: isoTimeOrNull(key.revokedAt),
    version: key.version,
  };
}
