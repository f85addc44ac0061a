import { createHmac, createSecretKey, hkdfSync, type KeyObject } from "node:crypto";

/** Keys for each purpose, derived from the one application secret, so that none can stand in for another. */
export interface Secrets {
  readonly accessToken: KeyObject;
  hash(purpose: "api-key" | "refresh" | "invitation" | "idempotency" | "cursor", text: string): string;
}

/** Derives the purposes' keys (HKDF, RFC 5869). */
export function deriveSecrets(appSecret: string): Secrets {
  const derived = new Map<string, KeyObject>();
  const keyFor = (purpose: string): KeyObject => {
    const known = derived.get(purpose);
    if (known) return known;
    const key = createSecretKey(Buffer.from(hkdfSync("sha256", appSecret, "", `borewright ${purpose}`, 32)));
    derived.set(purpose, key);
    return key;
  };
  return {
    accessToken: keyFor("access-token"),
    hash: (purpose, text) => createHmac("sha256", keyFor(purpose)).update(text).digest("hex"),
  };
}
