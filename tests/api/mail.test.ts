import { once } from "node:events";
import { readdirSync, readFileSync, statSync } from "node:fs";
import { createServer, type AddressInfo, type Server, type Socket } from "node:net";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Response } from "supertest";
import { HttpProblem } from "../../server/http/http-problem.ts";
import { queueMailToAdmins } from "../../server/mail/queue-mail.ts";
import { sendMail } from "../../server/mail/send-mail.ts";
import { sendQueuedMails } from "../../server/mail/send-queued.ts";
import { inTransaction } from "../../server/services/in-transaction.ts";
import type { OutboxMail } from "../../shared/schemas/outbox.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";

describe("mail without a mail server", () => {
  let app: TestApp;
  let works: TestOrganisation;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
  });
  afterAll(() => app.close());
  const get = (path: string, token = works.tokens.admin) =>
    app.call().get(path).set("Authorization", `Bearer ${token}`);
  const mail = (changes: object = {}) => ({
    organisationId: works.id,
    to: ["owner@example.com", "ines.alder@example.com"],
    subject:
      "Report Ø 180 of Fellgate unit 2 – as left, with a subject that is long enough to be folded somewhere",
    text: "See the report.\n",
    ...changes,
  });

  it("is kept as one file, readable by its owner alone, listed and downloaded by an administrator", async () => {
    const content = Buffer.from([...Array(256).keys()]);
    const attachments = [{ filename: "report ø.pdf", contentType: "application/pdf", content }];
    expect(await sendMail(app.deps, mail({ attachments }))).toEqual({ notTaken: [] });
    const folder = join(app.deps.config.dataDir, "outbox", works.id);
    const [file = "", ...others] = readdirSync(folder);
    expect(others).toEqual([]);
    expect(statSync(join(folder, file)).mode & 0o777).toBe(0o600);

    const { status, body } = await get("/v1/outbox");
    expect(status).toBe(200);
    const [listed] = (body as { data: OutboxMail[] }).data;
    expect(listed).toMatchObject({ to: mail().to, subject: mail().subject, id: file.replace(".eml", "") });
    expect(Math.abs(Date.parse(listed?.date ?? "") - Date.now())).toBeLessThan(60_000); // ms
    const read = await get(`/v1/outbox/${listed?.id}`).buffer(true).parse(asText);
    expect(read.headers["content-type"]).toBe("message/rfc822");
    expect(read.headers["content-disposition"]).toContain(".eml");
    expect(read.body).toBe(readFileSync(join(folder, file), "latin1"));
    expect(listed?.bytes).toBe(statSync(join(folder, file)).size);
    expect(read.body).toContain(content.toString("base64").slice(0, 60));
  });

  it("is read by nobody but administrators of its organisation", async () => {
    await sendMail(app.deps, mail());
    const [own] = ((await get("/v1/outbox")).body as { data: OutboxMail[] }).data;
    const stranger = await makeOrganisation(app.deps);
    expect((await get("/v1/outbox", stranger.tokens.admin)).body).toMatchObject({ data: [] });
    expect((await get(`/v1/outbox/${own?.id}`, stranger.tokens.admin)).status).toBe(404);
    for (const role of ["engineer", "developer", "viewer"] as const)
      expect((await get("/v1/outbox", works.tokens[role])).body).toMatchObject({ code: "scope_missing" });
    expect((await get(`/v1/outbox/${app.deps.newId()}`)).status).toBe(404);
    expect((await get("/v1/outbox/..%2f..%2fsecret")).status).toBe(404);
  });

  it("is listed page by page, newest first", async () => {
    const other = await makeOrganisation(app.deps);
    for (let nth = 1; nth <= 5; nth += 1)
      await sendMail(app.deps, mail({ organisationId: other.id, subject: `Mail ${nth}` }));
    const subjects: string[] = [];
    for (let cursor: string | null = ""; cursor !== null;) {
      const query: string = cursor === "" ? "" : `&cursor=${encodeURIComponent(cursor)}`;
      const { body } = await get(`/v1/outbox?limit=2${query}`, other.tokens.admin);
      const page = body as { data: OutboxMail[]; nextCursor: string | null };
      subjects.push(...page.data.map(({ subject }) => subject));
      cursor = page.nextCursor;
    }
    expect(subjects).toEqual([5, 4, 3, 2, 1].map((nth) => `Mail ${nth}`));
  });

  it.each([
    ["a line break in the subject", { subject: "Report\r\nBcc: everyone@example.com" }, "/subject"],
    ["a lone line feed in the subject", { subject: "Report\nBcc: everyone@example.com" }, "/subject"],
    ["NUL in the subject", { subject: "Report\u0000" }, "/subject"],
    ["a line break in an address", { to: ["a@example.com\r\nBcc: b@example.com"] }, "/to/0"],
    ["two addresses in one", { to: ["a@example.com, b@example.com"] }, "/to/0"],
    ["an address with a name", { to: ["Owner <a@example.com>"] }, "/to/0"],
    ["no recipient", { to: [] }, "/to"],
    ["too many recipients", { to: Array.from({ length: 21 }, (_, nth) => `a${nth}@example.com`) }, "/to"],
    [
      "a line break in the name of a file",
      {
        attachments: [
          { filename: "a\r\nX: 1.pdf", contentType: "application/pdf", content: Buffer.alloc(1) },
        ],
      },
      "/attachments/0",
    ],
  ])("is refused with %s, and nothing is sent", async (_, changes, pointer) => {
    const other = await makeOrganisation(app.deps);
    const refused = await sendMail(app.deps, mail({ ...changes, organisationId: other.id })).catch(
      (error: unknown) => error,
    );
    expect(refused).toBeInstanceOf(HttpProblem);
    expect((refused as HttpProblem).status).toBe(422);
    expect((refused as HttpProblem).members.errors).toMatchObject([{ pointer }]);
    expect((await get("/v1/outbox", other.tokens.admin)).body).toMatchObject({ data: [] });
  });

  it("lets nobody else on this machine put mail there", async () => {
    const { port } = await app.deps.mailer.outbox.listen();
    const replies = await talk(port, [
      "EHLO localhost",
      `AUTH PLAIN ${Buffer.from(`\0${works.id}\0guess`).toString("base64")}`,
      "MAIL FROM:<a@example.com>",
    ]);
    expect(replies.map((reply) => reply.slice(0, 3))).toEqual(["220", "250", "535", "530"]);
  });
});

describe("mail with a mail server that fails", () => {
  const servers: Server[] = [];
  const apps: TestApp[] = [];
  afterAll(async () => {
    for (const server of servers) server.close();
    for (const app of apps) await app.close();
  });
  /** An app whose mail server does this with a connection. */
  const appWith = async (behaves: (socket: Socket) => void): Promise<TestApp> => {
    const server = createServer((socket) => {
      socket.on("error", () => undefined);
      behaves(socket);
    }).listen(0, "127.0.0.1");
    await once(server, "listening");
    servers.push(server);
    const app = await openTestApp({ SMTP_URL: `smtp://127.0.0.1:${(server.address() as AddressInfo).port}` });
    apps.push(app);
    return app;
  };
  const send = async ({ deps }: TestApp) => {
    const started = performance.now();
    const mail = { organisationId: deps.newId(), to: ["a@example.com"], subject: "Report", text: "See it." };
    const outcome = await sendMail(deps, mail).catch((error: unknown) => error);
    expect(performance.now() - started).toBeLessThan(11_500); // ms
    return outcome as HttpProblem;
  };
  const garbage = Buffer.alloc(64 * 1024, "garbage ");

  it.each<[string, (socket: Socket) => void, string, number]>([
    ["closes", (socket) => void socket.end(), "mail_unavailable", 503],
    ["hangs", () => undefined, "mail_unavailable", 503],
    ["answers nonsense", (socket) => void socket.write("HTTP/1.1 200 OK\r\n\r\n"), "mail_unavailable", 503],
    [
      "answers nonsense without end",
      (socket) => {
        const more = (): void => {
          while (!socket.destroyed && socket.write(garbage));
        };
        socket.on("drain", more);
        more();
      },
      "mail_unavailable",
      503,
    ],
    [
      "drips one letter a second",
      (socket) => {
        const drip = setInterval(() => socket.write("2"), 1_000);
        socket.on("close", () => clearInterval(drip));
      },
      "mail_unavailable",
      503,
    ],
    [
      "says no for good",
      (socket) => {
        socket.write("220 mail\r\n");
        socket.on("data", (data) =>
          socket.write(/^(EHLO|HELO)/.test(String(data)) ? "250 mail\r\n" : "550 no\r\n"),
        );
      },
      "mail_refused",
      502,
    ],
    [
      "says not now",
      (socket) => {
        socket.write("220 mail\r\n");
        socket.on("data", (data) =>
          socket.write(/^(EHLO|HELO)/.test(String(data)) ? "250 mail\r\n" : "451 later\r\n"),
        );
      },
      "mail_unavailable",
      503,
    ],
  ])(
    "%s: a coded answer in time",
    async (_, behaves, code, status) => {
      const problem = await send(await appWith(behaves));
      expect([problem.code, problem.status]).toEqual([code, status]);
    },
    20_000,
  );

  it("is unavailable where nothing listens, and the service's own mail waits and goes out later", async () => {
    const taken: string[] = [];
    let isUp = false;
    const app = await appWith((socket) => {
      if (!isUp) return void socket.end();
      let inData = false;
      socket.write("220 mail\r\n");
      socket.on("data", (data) => {
        const text = String(data);
        if (inData) {
          taken.push(text);
          if (!text.endsWith("\r\n.\r\n")) return;
          inData = false;
          socket.write("250 taken\r\n");
        } else if (text.startsWith("DATA")) {
          inData = true;
          socket.write("354 go on\r\n");
        } else socket.write(text.startsWith("QUIT") ? "221 bye\r\n" : "250 yes\r\n");
      });
    });
    const works = await makeOrganisation(app.deps);
    await inTransaction(app.deps.database.sequelize, (transaction) =>
      queueMailToAdmins(app.deps, transaction, works.id, { subject: "One\r\nTwo", text: "Text." }),
    );
    expect(await sendQueuedMails(app.deps)).toBe(0);
    isUp = true;
    // Not before it is due again.
    expect(await sendQueuedMails(app.deps)).toBe(0);
    app.advance(60_001);
    expect(await sendQueuedMails(app.deps)).toBe(1);
    app.advance(86_400_000);
    expect(await sendQueuedMails(app.deps)).toBe(0);
    expect(taken.join("")).toContain("Subject: One Two\r\n");
    expect(taken.join("")).toContain(`To: ${works.members.admin.email}\r\n`);
  });
});

function asText(response: Response, done: (error: Error | null, body: unknown) => void): void {
  const chunks: Buffer[] = [];
  response.on("data", (chunk: Buffer) => chunks.push(Buffer.from(chunk)));
  response.on("end", () => done(null, Buffer.concat(chunks).toString("latin1")));
}

/** Sends lines one by one, each after the reply to the one before. Answers the last line of each reply. */
async function talk(port: number, lines: readonly string[]): Promise<string[]> {
  const { connect } = await import("node:net");
  const socket = connect(port, "127.0.0.1");
  const replies: string[] = [];
  const reply = async (): Promise<void> => {
    for (;;) {
      const [data] = (await once(socket, "data")) as [Buffer];
      const last = data.toString().trim().split("\r\n").at(-1) ?? "";
      if (/^\d{3}( |$)/.test(last)) return void replies.push(last);
    }
  };
  await reply();
  for (const line of lines) {
    socket.write(`${line}\r\n`);
    await reply();
  }
  socket.destroy();
  return replies;
}
