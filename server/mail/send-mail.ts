import type { Fault } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import { emailSchema } from "../../shared/schemas/sessions.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { MailFailed, type Mail } from "./mailer.ts";

const RETRY_SECONDS = 60;

/**
 * Sends a mail now, within 10 s: what an operation that mails something calls, outside of any transaction, since a
 * mail cannot be taken back. `to` are 1 to 20 e-mail addresses, `text` is plain; each attachment is a Buffer with its
 * media type. Answers the addresses that the server did not take; where it took none, that is a refusal.
 *
 * @throws HttpProblem text_invalid, too_few_items or too_many_items at /to, text_invalid at /subject or /attachments for
 *   a line break, which would write headers of its own; mail_refused (502) where the server said no for good;
 *   mail_unavailable (503) where it cannot be reached, hangs, closes or answers nonsense
 */
export async function sendMail(deps: Pick<Deps, "mailer">, mail: Mail): Promise<{ notTaken: string[] }> {
  const faults = mailFaults(mail);
  if (faults.length > 0) throw problemOfFaults(faults);
  try {
    return { notTaken: await deps.mailer.send(mail) };
  } catch (error) {
    if (!(error instanceof MailFailed)) throw error;
    if (error.isRefused) throw new HttpProblem("mail_refused", "The mail server refused it.");
    throw new HttpProblem(
      "mail_unavailable",
      "The mail server did not take it in 10 s.",
      { retryAfterSeconds: RETRY_SECONDS },
      { "Retry-After": String(RETRY_SECONDS) },
    );
  }
}

/** What is wrong with a mail, each at its place: also what an operation may ask before it makes a long report. */
export function mailFaults({
  to,
  subject,
  attachments = [],
}: Omit<Mail, "text" | "organisationId">): Fault[] {
  const faults: Fault[] = [];
  if (to.length === 0) faults.push({ pointer: "/to", code: "too_few_items", detail: "Name a recipient." });
  if (to.length > limits.recipientsPerMail) {
    const detail = `At most ${limits.recipientsPerMail} recipients.`;
    faults.push({ pointer: "/to", code: "too_many_items", detail });
  }
  for (const [index, address] of to.entries()) {
    if (!emailSchema.safeParse(address).success || breaksLine(address)) {
      faults.push({ pointer: `/to/${index}`, code: "text_invalid", detail: "This is no e-mail address." });
    }
  }
  if (breaksLine(subject)) faults.push(lineBreak("/subject"));
  for (const [index, { filename, contentType }] of attachments.entries()) {
    if (breaksLine(filename + contentType)) faults.push(lineBreak(`/attachments/${index}`));
  }
  return faults;
}

const lineBreak = (pointer: string): Fault => ({
  pointer,
  code: "text_invalid",
  detail: "A line of a mail's head has no line breaks or other control characters in it.",
});

const breaksLine = (text: string): boolean => /[\p{Cc}\p{Zl}\p{Zp}]/u.test(text);
