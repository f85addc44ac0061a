import { randomBytes } from "node:crypto";
import { Webhook } from "standardwebhooks";
import { apiVersion } from "../http/api-version.ts";
import type { WebhookEndpoint } from "../models/webhook-endpoint.ts";
import type { Secrets } from "../services/secrets.ts";

/** Random bytes of a signing secret: Standard Webhooks asks for 24 to 64. */
const SECRET_BYTES = 32;

/** A new signing secret, as its receiver is given it. */
export function makeSigningSecret(): string {
  return `whsec_${randomBytes(SECRET_BYTES).toString("base64")}`;
}

/** The secrets that sign now: the replaced one beside the new one until its time is over. */
export function signingSecrets(
  secrets: Secrets,
  endpoint: Pick<WebhookEndpoint, "id" | "secretSealed" | "previousSecretSealed" | "previousSecretUntil">,
  now: Date,
): string[] {
  const { id, secretSealed, previousSecretSealed, previousSecretUntil } = endpoint;
  const sealed = [secretSealed];
  if (previousSecretSealed && previousSecretUntil && previousSecretUntil > now)
    sealed.push(previousSecretSealed);
  return sealed.map((text) => secrets.unseal("webhook", id, text));
}

/** Headers of one attempt by Standard Webhooks: signed over id, time of the attempt and the bytes that are sent. */
export function messageHeaders(
  id: string,
  at: Date,
  payloadText: string,
  secrets: readonly string[],
): Record<string, string> {
  return {
    "content-type": "application/json",
    "content-length": String(Buffer.byteLength(payloadText)),
    "user-agent": `Borewright-Webhooks/${apiVersion}`,
    "webhook-id": id,
    "webhook-timestamp": String(Math.floor(at.getTime() / 1000)),
    "webhook-signature": secrets.map((secret) => new Webhook(secret).sign(id, at, payloadText)).join(" "),
  };
}
