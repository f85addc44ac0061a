import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Express } from "express";
import request from "supertest";
import { createApp } from "../../server/app.ts";
import { readConfig, type Environment } from "../../server/config.ts";
import { migrate } from "../../server/database.ts";
import type { Deps } from "../../server/deps.ts";
import { buildDeps } from "../../server/index.ts";
import { Credentials } from "../../server/services/credentials.ts";
import { openTestDatabase } from "./database.ts";

export interface TestApp {
  readonly app: Express;
  readonly deps: Deps;
  /** Moves the service's clock; ids and caches keep their own time. */
  advance(ms: number): void;
  call(): ReturnType<typeof request>;
  close(): Promise<void>;
}

/** Mails and other files of a test go where they go away with it. */
const makeFolder = (): string => mkdtempSync(join(tmpdir(), "borewright-app-"));

const ENVIRONMENT: Environment = {
  APP_SECRET: "test-only-secret-0123456789abcdefghij",
  LOG_LEVEL: "silent",
  RATE_LIMIT_PER_MINUTE: "1000000",
  SIGN_IN_LIMIT_PER_MINUTE: "1000000",
};

/** The real application on a database of its own, with answers held against their schemas. */
export async function openTestApp(
  environment: Environment = {},
  overrides: Partial<Deps> = {},
): Promise<TestApp> {
  const database = await openTestDatabase();
  const folder = makeFolder();
  const config = readConfig({
    ...ENVIRONMENT,
    DATABASE_URL: database.url,
    DATA_DIR: folder,
    ...environment,
  });
  let offsetMs = 0;
  const now = () => new Date(Date.now() + offsetMs);
  const built = buildDeps(config);
  const deps: Deps = {
    ...built,
    now,
    credentials: new Credentials(built.database, built.secrets, now),
    verifyReplies: true,
    ...overrides,
  };
  await migrate(deps.database);
  const app = createApp(deps);
  return {
    app,
    deps,
    advance: (ms) => {
      offsetMs += ms;
    },
    call: () => request(app),
    close: async () => {
      await deps.mailer.close();
      await deps.compute.close();
      await deps.database.sequelize.close();
      await database.drop();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
