import { randomBytes } from "node:crypto";
import { createConnection } from "mariadb";
import { inject } from "vitest";

export interface TestDatabase {
  readonly url: string;
  drop(): Promise<void>;
}

/** An empty database of the caller's own on the tests' server, so that files may run side by side. */
export async function openTestDatabase(): Promise<TestDatabase> {
  const server = inject("testDatabaseUrl");
  const name = `borewright_test_${randomBytes(6).toString("hex")}`;
  await runStatement(server, `CREATE DATABASE ${name}`);
  const url = new URL(server);
  url.pathname = `/${name}`;
  return { url: url.href, drop: () => runStatement(server, `DROP DATABASE ${name}`) };
}

async function runStatement(server: string, statement: string): Promise<void> {
  const connection = await createConnection(server);
  try {
    await connection.query(statement);
  } finally {
    await connection.end();
  }
}
