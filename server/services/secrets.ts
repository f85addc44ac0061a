import {
  createCipheriv,
  createDecipheriv,
  createHmac,
  createSecretKey,
  hkdfSync,
  randomBytes,
  type KeyObject,
} from "node:crypto";

const NONCE_BYTES = 12;
const TAG_BYTES = 16;

/** Keys for each purpose, derived from the one application secret, so that none can stand in for another. */
export interface Secrets {
  readonly accessToken: KeyObject;
  hash(purpose: "api-key" | "refresh" | "invitation" | "idempotency" | "cursor", text: string): string;
  /** A secret that must be read again, as it may be kept: AES-256-GCM, good for this purpose and `owner` alone. */
  seal(purpose: "webhook", owner: string, text: string): string;
  /** @throws Error for what was sealed under another application secret, or for another owner */
  unseal(purpose: "webhook", owner: string, sealed: string): string;
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
    seal: (purpose, owner, text) => {
      const nonce = randomBytes(NONCE_BYTES);
      const cipher = createCipheriv("aes-256-gcm", keyFor(purpose), nonce).setAAD(Buffer.from(owner));
      const sealed = Buffer.concat([cipher.update(text, "utf8"), cipher.final()]);
      return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString("base64url");
    },
    unseal: (purpose, owner, sealed) => {
      const bytes = Buffer.from(sealed, "base64url");
      const nonce = bytes.subarray(0, NONCE_BYTES);
      const decipher = createDecipheriv("aes-256-gcm", keyFor(purpose), nonce, { authTagLength: TAG_BYTES })
        .setAAD(Buffer.from(owner))
        .setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
      const text = decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES));
      return Buffer.concat([text, decipher.final()]).toString("utf8");
    },
  };
}
