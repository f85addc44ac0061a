import { randomInt } from "node:crypto";
import { createServer, type Server } from "node:http";
import { once } from "node:events";
import type { AddressInfo } from "node:net";
import { createApp } from "./app.ts";
import { readConfig, type Config, type Environment } from "./config.ts";
import { migrate, openDatabase } from "./database.ts";
import { seedDemo } from "./demo/seed-demo.ts";
import type { Deps } from "./deps.ts";
import { answerClientError } from "./http/answer-client-error.ts";
import { createMetrics } from "./http/metrics.ts";
import { createLog } from "./http/request-log.ts";
import { Shutdown } from "./http/shutdown.ts";
import { stopServer } from "./http/stop-server.ts";
import { ComputePool } from "./services/compute-pool.ts";
import { Credentials } from "./services/credentials.ts";
import { ensureFirstAdmin } from "./services/first-admin.ts";
import { newId } from "./services/ids.ts";
import { startBackground } from "./services/background.ts";
import { EngineSelfTest } from "./services/self-test.ts";
import { deriveSecrets } from "./services/secrets.ts";
import { Mailer } from "./mail/mailer.ts";
import { resolveHost } from "./webhooks/check-target.ts";
import { Listeners } from "./webhooks/events.ts";

export interface StartOptions {
  readonly environment: Environment;
  /** Says one line to whoever started the service. */
  readonly announce: (line: string) => void;
}

export interface RunningServer {
  readonly url: string;
  /** Answers what is in flight, then lets everything go. */
  close(): Promise<void>;
}

/** Everything the application is built from, out of a configuration. */
export function buildDeps(config: Config): Deps {
  const database = openDatabase(config.databaseUrl);
  const secrets = deriveSecrets(config.appSecret);
  const now = () => new Date();
  const log = createLog(config.logLevel);
  return {
    config,
    database,
    secrets,
    now,
    newId,
    random: () => randomInt(2 ** 32) / 2 ** 32,
    listeners: new Listeners(database),
    resolveHost,
    mailer: new Mailer(config, log),
    compute: new ComputePool(),
    selfTest: new EngineSelfTest(now),
    credentials: new Credentials(database, secrets, now),
    log,
    metrics: createMetrics(),
    shutdown: new Shutdown(),
    verifyReplies: false,
  };
}

/** Reads the configuration, brings the database up to date, listens. @throws ConfigError, or why it cannot start */
export async function startServer({ environment, announce }: StartOptions): Promise<RunningServer> {
  const config = readConfig(environment);
  const deps = buildDeps(config);
  try {
    const ran = await migrate(deps.database);
    announce(ran.length === 0 ? "Tables are current." : `Tables brought up to date: ${ran.join(", ")}.`);
    const server = createServer(createApp(deps));
    setTimeouts(server, config);
    await listen(server, config);
    const url = urlOf(server, config);
    await ensureFirstAdmin(deps, announce);
    if (config.demo) await seedDemo(deps, url, announce);
    const background = await startBackground(deps);
    return {
      url,
      close: async () => {
        deps.shutdown.begin();
        await Promise.all([background.stop(), stopServer(server, config.drainSeconds * 1000)]);
        await deps.mailer.close();
        await deps.compute.close();
        await deps.database.sequelize.close();
      },
    };
  } catch (error) {
    await deps.mailer.close();
    await deps.compute.close();
    await deps.database.sequelize.close();
    throw error;
  }
}

function setTimeouts(server: Server, { requestTimeoutSeconds }: Config): void {
  // Bodies have a deadline of their own (middleware/body-deadline.ts): a stream of readings goes on.
  server.requestTimeout = 0;
  server.headersTimeout = Math.min(15_000, requestTimeoutSeconds * 1000);
  server.keepAliveTimeout = 65_000;
  server.on("clientError", answerClientError);
}

async function listen(server: Server, { port, host }: Config): Promise<void> {
  server.listen(port, host);
  await once(server, "listening");
}

function urlOf(server: Server, { publicUrl, host }: Config): string {
  if (publicUrl) return publicUrl;
  const { port } = server.address() as AddressInfo;
  const name = host === "0.0.0.0" || host === "::" ? "localhost" : host.includes(":") ? `[${host}]` : host;
  return `http://${name}:${port}`;
}
