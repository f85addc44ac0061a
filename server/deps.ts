import type { Logger } from "pino";
import type { Config } from "./config.ts";
import type { Database } from "./database.ts";
import type { Metrics } from "./http/metrics.ts";
import type { Shutdown } from "./http/shutdown.ts";
import type { ComputePool } from "./services/compute-pool.ts";
import type { Credentials } from "./services/credentials.ts";
import type { EngineSelfTest } from "./services/self-test.ts";
import type { Secrets } from "./services/secrets.ts";
import type { Mailer } from "./mail/mailer.ts";
import type { ResolveHost } from "./webhooks/check-target.ts";
import type { Listeners } from "./webhooks/events.ts";

/** What the service is built from. Time and ids come in, so that a test can hold them still. */
export interface Deps {
  readonly config: Config;
  readonly database: Database;
  readonly secrets: Secrets;
  readonly compute: ComputePool;
  readonly selfTest: EngineSelfTest;
  readonly credentials: Credentials;
  /** Where organisations want to be told of what happens. */
  readonly listeners: Listeners;
  readonly resolveHost: ResolveHost;
  readonly mailer: Mailer;
  readonly log: Logger;
  readonly metrics: Metrics;
  readonly shutdown: Shutdown;
  readonly now: () => Date;
  /** A new UUIDv7. */
  readonly newId: () => string;
  /** From [0, 1): spreads what would come all at once. */
  readonly random: () => number;
  /** Holds every answer against its schema before it is sent: on in tests. */
  readonly verifyReplies: boolean;
}
