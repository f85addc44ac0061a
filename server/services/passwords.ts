import { hash, verify } from "@node-rs/argon2";
import { HttpProblem } from "../http/http-problem.ts";

/** OWASP's Argon2id parameters: 19 MiB, two passes, one lane. */
const PARAMETERS = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };
const LEAST_LENGTH = 12;

/** Argon2id, with the parameters inside the text. */
export async function hashPassword(password: string): Promise<string> {
  return hash(password.normalize("NFKC"), PARAMETERS);
}

let standIn: Promise<string> | undefined;

/** Verifies at the same cost whether or not there is a hash to verify against. */
export async function verifyPassword(stored: string | null, password: string): Promise<boolean> {
  standIn ??= hashPassword("nobody's password");
  const matches = await verify(stored ?? (await standIn), password.normalize("NFKC"));
  return stored !== null && matches;
}

/**
 * Length and plain guessability only, no rules of composition (NIST SP 800-63B).
 * @throws HttpProblem password_weak
 */
export function refuseWeakPassword(password: string, context: readonly string[]): void {
  const plain = password.normalize("NFKC").toLowerCase();
  const guessable =
    new Set(plain).size < 5 ||
    context.some((word) => word.length > 3 && plain.replace(word.toLowerCase(), "").length < 6);
  if (plain.length >= LEAST_LENGTH && !guessable) return;
  const detail = `A password has at least ${LEAST_LENGTH} characters, is not your name or e-mail, and is not a few characters repeated.`;
  throw new HttpProblem("password_weak", detail, {
    errors: [{ pointer: "/password", code: "password_weak", detail }],
  });
}
