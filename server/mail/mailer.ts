import { join } from "node:path";
import { createTransport, type SMTPTransportOptions } from "nodemailer";
import type { Logger } from "pino";
import type { Config } from "../config.ts";
import { LocalOutbox } from "./local-outbox.ts";

/** How long a mail server may take: to connect, to greet, to answer, and for all of it together. */
export const MAIL_TIMEOUT_MS = 10_000;

export interface Attachment {
  readonly filename: string;
  readonly contentType: string;
  readonly content: Buffer;
}

export interface Mail {
  /** Whose mail it is: where there is no mail server, that organisation's administrators read it. */
  readonly organisationId: string;
  /** E-mail addresses. */
  readonly to: readonly string[];
  readonly subject: string;
  readonly text: string;
  readonly attachments?: readonly Attachment[];
}

/** The mail was not sent. `isRefused`: the server said no to this mail, so that sending it again is of no use. */
export class MailFailed extends Error {
  constructor(
    readonly isRefused: boolean,
    cause: unknown,
  ) {
    super(isRefused ? "The mail server refused the mail." : "The mail server cannot be reached.", { cause });
    this.name = "MailFailed";
  }
}

/**
 * Hands mails to the server of SMTP_URL; without one, to a server of its own on loopback that keeps them under
 * DATA_DIR/outbox. Either way by SMTP, so that what works here works there.
 */
export class Mailer {
  readonly outbox: LocalOutbox;

  constructor(
    private readonly config: Pick<Config, "smtpUrl" | "mailFrom" | "dataDir">,
    private readonly log: Logger,
  ) {
    this.outbox = new LocalOutbox(join(config.dataDir, "outbox"), log);
  }

  /** Starts the local server where it is needed, so that a folder that cannot be written is told at the start. */
  async start(): Promise<void> {
    if (this.config.smtpUrl === null) await this.outbox.listen();
  }

  async close(): Promise<void> {
    await this.outbox.close();
  }

  /** Sends a mail that was checked (see `sendMail`). Answers the addresses that were not taken. @throws MailFailed */
  async send({ organisationId, to, subject, text, attachments = [] }: Mail): Promise<string[]> {
    const options: SMTPTransportOptions = {
      ...(await this.server(organisationId)),
      connectionTimeout: MAIL_TIMEOUT_MS,
      greetingTimeout: MAIL_TIMEOUT_MS,
      socketTimeout: MAIL_TIMEOUT_MS,
      dnsTimeout: MAIL_TIMEOUT_MS,
      // Nothing in a mail is fetched from a file or an address.
      disableFileAccess: true,
      disableUrlAccess: true,
    };
    const transport = createTransport(options);
    let timer: NodeJS.Timeout | undefined;
    const tooLong = new Promise<never>((_, reject) => {
      timer = setTimeout(() => reject(new Error("The mail server took too long.")), MAIL_TIMEOUT_MS);
    });
    try {
      const sent = await Promise.race([
        transport.sendMail({
          from: { name: "Borewright", address: this.config.mailFrom },
          to: to.map((address) => ({ name: "", address })),
          subject,
          text,
          attachments: attachments.map((attachment) => ({ ...attachment })),
        }),
        tooLong,
      ]);
      return [...sent.rejected];
    } catch (error) {
      this.log.warn({ err: error }, "a mail was not sent");
      throw new MailFailed(isRefusal(error), error);
    } finally {
      clearTimeout(timer);
      transport.close();
    }
  }

  private async server(organisationId: string): Promise<SMTPTransportOptions> {
    const { smtpUrl } = this.config;
    if (smtpUrl === null) {
      const { port, password } = await this.outbox.listen();
      return { host: "127.0.0.1", port, secure: false, auth: { user: organisationId, pass: password } };
    }
    const url = new URL(smtpUrl);
    const secure = url.protocol === "smtps:";
    const host = url.hostname.replace(/^\[(.*)\]$/, "$1");
    const auth =
      url.username === ""
        ? {}
        : { auth: { user: decodeURIComponent(url.username), pass: decodeURIComponent(url.password) } };
    // A password goes over the wire enciphered or not at all, except to this machine itself.
    const requireTLS = !secure && "auth" in auth && !/^(localhost|127\..*|::1)$/.test(host);
    return {
      host,
      port: url.port === "" ? (secure ? 465 : 587) : Number(url.port),
      secure,
      requireTLS,
      ...auth,
    };
  }
}

/** A reply of the 500s (RFC 5321, section 4.2.1) is a no for good; all else may pass. */
function isRefusal(error: unknown): boolean {
  const { responseCode } = error as { responseCode?: unknown };
  return typeof responseCode === "number" && responseCode >= 500 && responseCode <= 599;
}
