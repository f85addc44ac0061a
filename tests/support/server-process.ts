import { spawn, type ChildProcess } from "node:child_process";
import { once } from "node:events";
import { fileURLToPath } from "node:url";
import { QueryTypes } from "sequelize";
import type { TestApp } from "./app.ts";

/** The real server as a process of its own, on the test's database. */
export async function startServerProcess(databaseUrl: string): Promise<{ child: ChildProcess; url: string }> {
  const script = fileURLToPath(new URL("serve-process.ts", import.meta.url));
  const child = spawn(process.execPath, ["--import", "tsx", script], {
    env: {
      ...process.env,
      DATABASE_URL: databaseUrl,
      APP_SECRET: "test-only-secret-0123456789abcdefghij",
      PORT: "0",
      LOG_LEVEL: "silent",
    },
    stdio: ["ignore", "pipe", "inherit"],
  });
  const [line] = (await once(child.stdout, "data")) as [Buffer];
  return { child, url: line.toString().trim() };
}

/** How a server is held where it writes to a table: what the test's own connection runs before, and after. */
export interface Hold {
  readonly table: string;
  readonly before: readonly string[];
  readonly after: readonly string[];
  /** Whether a statement that waits notices that its client is gone; one that waits for a row does not. */
  readonly notices: boolean;
}

/** Holds everything that writes to a table without foreign keys. */
export const wholeTable = (table: string): Hold => ({
  table,
  before: [`LOCK TABLES ${table} WRITE`],
  after: ["UNLOCK TABLES"],
  notices: true,
});

/** Holds the next entry of a job, and nothing before it: another transaction has taken its place in the log. */
export const nextEntryOf = (jobId: string): Hold => ({
  table: "job_entries",
  before: [
    "SET FOREIGN_KEY_CHECKS = 0",
    "START TRANSACTION",
    `INSERT INTO job_entries (jobId, revision, sequence, id, organisationId, kind, documentText, createdAt,
     authorName)
     SELECT jobId, revision, sequence + 1, UUID(), organisationId, kind, documentText, createdAt, authorName FROM job_entries
     WHERE jobId = '${jobId}' ORDER BY sequence DESC LIMIT 1`,
  ],
  after: ["ROLLBACK", "SET FOREIGN_KEY_CHECKS = 1"],
  notices: false,
});

/**
 * Makes a call to a server process, holds it where it writes, kills the process outright there, and lets go. Answers
 * whether the caller was answered.
 */
export async function killAtWrite(
  app: TestApp,
  server: { readonly child: ChildProcess; readonly url: string },
  { table, before, after, notices }: Hold,
  call: (url: string) => Promise<unknown>,
): Promise<"answered" | "cut"> {
  const { sequelize } = app.deps.database;
  const waiting = async () => {
    const [row] = await sequelize.query<{ n: string }>(
      `SELECT COUNT(*) AS n FROM information_schema.PROCESSLIST
       WHERE DB = DATABASE() AND REPLACE(INFO, '\`', '') LIKE 'INSERT INTO ${table}%'`,
      { type: QueryTypes.SELECT },
    );
    return Number(row?.n);
  };
  const lock = await sequelize.connectionManager.getConnection({ type: "write" });
  const raw = lock as unknown as { query(sql: string): Promise<unknown> };
  for (const sql of before) await raw.query(sql);
  const cut = call(server.url).then(
    () => "answered" as const,
    () => "cut" as const,
  );
  await waitUntil(async () => (await waiting()) > 0);
  server.child.kill("SIGKILL");
  await once(server.child, "exit");
  const outcome = await cut;
  // A statement that notices its end must not be let through by the lock's; another is undone for want of a commit.
  if (notices) await waitUntil(async () => (await waiting()) === 0);
  for (const sql of after) await raw.query(sql);
  await waitUntil(async () => (await waiting()) === 0);
  sequelize.connectionManager.releaseConnection(lock);
  return outcome;
}

export async function waitUntil(holds: () => Promise<boolean>): Promise<void> {
  for (let tries = 0; tries < 400; tries += 1) {
    if (await holds()) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error("It never came true.");
}
