import type { Migration } from "../database.ts";
import * as firstTables from "./2026-12-01-first-tables.ts";
import * as webhooksAndMail from "./2026-12-01-webhooks-and-mail.ts";
import * as machinesAndJobs from "./2026-12-01-machines-and-jobs.ts";

/** In order; a name once released never changes. */
export const migrations: Readonly<Record<string, Migration>> = {
  "2026-12-01-first-tables": firstTables,
  "2026-12-01-machines-and-jobs": machinesAndJobs,
  "2026-12-01-webhooks-and-mail": webhooksAndMail,
};
