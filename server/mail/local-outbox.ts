import { randomBytes, timingSafeEqual } from "node:crypto";
import { once } from "node:events";
import { mkdir, open, readdir, rename, rm } from "node:fs/promises";
import type { AddressInfo } from "node:net";
import { join } from "node:path";
import type { Readable } from "node:stream";
import type { Logger } from "pino";
import { SMTPServer } from "smtp-server";
import { validate } from "uuid";
import { newId } from "../services/ids.ts";

/** Of one mail, and of mails kept for an organisation: older ones make room. */
const MAIL_BYTES = 32 * 1024 * 1024;
const KEPT_MAILS = 500;
const READ_MS = 10_000;

interface Listening {
  readonly port: number;
  readonly password: string;
  readonly server: SMTPServer;
}

/**
 * A mail server for a service that was given none: on loopback, for this process alone, which signs in with a password
 * made at its start and the organisation's id as its name. Keeps each mail as <folder>/<organisation>/<id>.eml, mode 0600.
 */
export class LocalOutbox {
  private listening: Promise<Listening> | null = null;

  constructor(
    private readonly folder: string,
    private readonly log: Logger,
  ) {}

  /** Where it listens; it starts when it is first asked. */
  listen(): Promise<Listening> {
    this.listening ??= this.start();
    return this.listening;
  }

  async close(): Promise<void> {
    const listening = await this.listening?.catch(() => null);
    this.listening = null;
    if (listening) await new Promise<void>((resolve) => listening.server.close(() => resolve()));
  }

  /** Ids of the mails kept for an organisation, newest first. */
  async ids(organisationId: string): Promise<string[]> {
    const names = await readdir(this.folderOf(organisationId)).catch(nothing<string[]>([]));
    return names
      .filter((name) => name.endsWith(".eml"))
      .map((name) => name.slice(0, -".eml".length))
      .sort()
      .reverse();
  }

  /** A mail's first bytes and its size; null where there is none with this id. */
  async read(
    organisationId: string,
    id: string,
    bytes?: number,
  ): Promise<{ head: Buffer; size: number } | null> {
    const file = await open(join(this.folderOf(organisationId), `${id}.eml`)).catch(nothing(null));
    if (!file) return null;
    try {
      const { size } = await file.stat();
      const head = Buffer.alloc(Math.min(size, bytes ?? size));
      await file.read(head, 0, head.length, 0);
      return { head, size };
    } finally {
      await file.close();
    }
  }

  private async start(): Promise<Listening> {
    await mkdir(this.folder, { recursive: true, mode: 0o700 });
    const password = randomBytes(24).toString("base64url");
    const server = new SMTPServer({
      name: "localhost",
      banner: "outbox",
      disabledCommands: ["STARTTLS"],
      authMethods: ["PLAIN"],
      allowInsecureAuth: true,
      size: MAIL_BYTES,
      socketTimeout: READ_MS,
      closeTimeout: 1_000,
      disableReverseLookup: true,
      onAuth: ({ username = "", password: sent }, _session, callback) => {
        if (validate(username) && sameText(sent ?? "", password)) callback(null, { user: username });
        else callback(new Error("Nobody signs in here but the service itself."));
      },
      onData: (stream, session, callback) => {
        this.keep(String(session.user), stream).then(
          () => callback(),
          (error: unknown) => {
            this.log.warn({ err: error }, "a mail could not be kept");
            callback(Object.assign(new Error("The mail could not be kept."), { responseCode: 452 }));
          },
        );
      },
    });
    // A connection that breaks off is told to whoever sends.
    server.on("error", (error) => this.log.warn({ err: error }, "the outbox met an error"));
    const tcp = server.listen(0, "127.0.0.1");
    await once(tcp, "listening");
    tcp.unref();
    return { port: (tcp.address() as AddressInfo).port, password, server };
  }

  /** A mail is there whole or not at all: it gets its name when all of it is written. */
  private async keep(organisationId: string, stream: Readable & { sizeExceeded?: boolean }): Promise<void> {
    const folder = this.folderOf(organisationId);
    await mkdir(folder, { recursive: true, mode: 0o700 });
    const path = join(folder, `${newId()}.eml`);
    const file = await open(`${path}.part`, "wx", 0o600);
    try {
      for await (const chunk of stream as AsyncIterable<Buffer>) await file.write(chunk);
      if (stream.sizeExceeded) throw new Error("The mail is too large.");
      await file.sync();
      await file.close();
      await rename(`${path}.part`, path);
    } catch (error) {
      await file.close().catch(() => undefined);
      await rm(`${path}.part`, { force: true });
      throw error;
    }
    const surplus = (await this.ids(organisationId)).slice(KEPT_MAILS);
    for (const id of surplus) await rm(join(folder, `${id}.eml`), { force: true });
  }

  private folderOf(organisationId: string): string {
    if (!validate(organisationId)) throw new Error("An organisation is named by its id.");
    return join(this.folder, organisationId);
  }
}

/** For a file or folder that is not there; every other error stays one. */
const nothing =
  <T>(value: T) =>
  (error: NodeJS.ErrnoException): T => {
    if (error.code === "ENOENT") return value;
    throw error;
  };

function sameText(a: string, b: string): boolean {
  return a.length === b.length && timingSafeEqual(Buffer.from(a), Buffer.from(b));
}
