import type { Migration } from "../database.ts";
import * as firstTables from "./2026-12-01-first-tables.ts";

/** In order; a name once released never changes. */
export const migrations: Readonly<Record<string, Migration>> = {
  "2026-12-01-first-tables": firstTables,
};
