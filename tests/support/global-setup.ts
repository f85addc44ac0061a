import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { TestProject } from "vitest/node";
import { openPrivateDatabase } from "../../server/bootstrap/private-database.mjs";

declare module "vitest" {
  export interface ProvidedContext {
    /** Address of the tests' own MariaDB server, with an account that may make databases named borewright_test_*. */
    testDatabaseUrl: string;
  }
}

interface Shared {
  readonly url: Promise<string>;
  users: number;
  close(): Promise<void>;
}

/** Each project loads this file anew; the server they share hangs on the process. */
const shared = Symbol.for("borewright.testDatabase");
const home = globalThis as { [shared]?: Shared };

/** Nothing here outlives the run, so nothing is flushed for a power cut. */
const settings = [
  "--innodb-flush-log-at-trx-commit=0",
  "--innodb-flush-method=nosync",
  "--innodb-buffer-pool-size=64M",
];

function startShared(): Shared {
  const folder = mkdtempSync(join(tmpdir(), "borewright-database-"));
  const opened = openPrivateDatabase(folder, { granted: "borewright\\_test\\_%", settings });
  return {
    url: opened.then(({ url }) => url),
    users: 0,
    async close() {
      await (await opened).close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

/** One MariaDB server for all projects that need one, gone when the last of them is done. */
export async function setup(project: TestProject): Promise<() => Promise<void>> {
  const server = (home[shared] ??= startShared());
  server.users += 1;
  project.provide("testDatabaseUrl", await server.url);
  return async () => {
    server.users -= 1;
    if (server.users === 0) await server.close();
  };
}
