import type { JobLog } from "../../shared/schemas/job-log.ts";
import { presentAuthor } from "../services/author.ts";
import type { CallerNames } from "../services/caller-names.ts";
import type { StoredResults } from "../services/job-results.ts";
import type { LoadedJob } from "../services/job-store.ts";
import { hashedRecord, hashOf } from "../services/sign-job.ts";
import { isoTime } from "./time.ts";

export function presentJobLog(loaded: LoadedJob, results: StoredResults, names: CallerNames): JobLog {
  return {
    job: loaded.row.id,
    revision: loaded.revision,
    recordHash: hashOf(loaded, results),
    entries: loaded.rows.map((row) => ({
      sequence: row.sequence,
      id: row.id,
      kind: row.kind,
      createdAt: isoTime(row.createdAt),
      author: presentAuthor(row, names),
      document: JSON.parse(row.documentText) as Record<string, unknown>,
    })),
    hashed: hashedRecord(loaded, results),
  };
}
