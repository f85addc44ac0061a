import { setTimeout as sleep } from "node:timers/promises";
import { Op } from "sequelize";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { limits } from "../../shared/limits.ts";

/** How often the tables are asked: the processes of a service share nothing else. */
const EVERY_MS = 500;
const HEARTBEAT_MS = 10_000;
const CREDENTIAL_CHECK_MS = 3_000;
const EVENTS_AT_ONCE = 500;

export interface JobEvent {
  /** Its number among the events of its job, from 1: given while the job's row is locked, so that it rises as they commit. */
  readonly number: number;
  readonly type: "indication" | "entry";
  readonly data: string;
}

/** Events of a job after one of them, oldest first: indications with their answer, and what was added to the log. */
export async function eventsAfter(
  { database }: Pick<Deps, "database">,
  job: { readonly id: string; readonly organisationId: string },
  last: number,
): Promise<JobEvent[]> {
  const { jobIndications, jobEntries } = database.models;
  const where = { jobId: job.id, organisationId: job.organisationId, event: { [Op.gt]: last } };
  const options = { where, order: [["event", "ASC"]] as [string, string][], limit: EVENTS_AT_ONCE };
  const [indications, entries] = await Promise.all([
    jobIndications.findAll({ ...options, attributes: ["event", "answerText"] }),
    jobEntries.findAll({ ...options, attributes: ["event", "id", "kind", "revision", "sequence"] }),
  ]);
  return withoutGap(last, [
    ...indications.map(({ event, answerText }) => ({
      number: event,
      type: "indication" as const,
      data: answerText,
    })),
    ...entries.map(({ event, id, kind, revision, sequence }) => ({
      number: event ?? 0,
      type: "entry" as const,
      data: JSON.stringify({ id, kind, revision, sequence }),
    })),
  ]);
}

/**
 * Events in order, as far as none is missing. The two tables are read at two moments, in a cluster even from two
 * machines: where a later event was seen and an earlier one not yet, the later one waits.
 */
export function withoutGap(last: number, events: readonly JobEvent[]): JobEvent[] {
  const inOrder = events.toSorted((one, other) => one.number - other.number).slice(0, EVENTS_AT_ONCE);
  const gap = inOrder.findIndex(({ number }, index) => number !== last + 1 + index);
  return gap < 0 ? inOrder : inOrder.slice(0, gap);
}

/** What a watcher writes to: gone as soon as nobody reads it. */
export interface EventSink {
  readonly isOpen: () => boolean;
  /** Resolves when there is room for more. */
  readonly write: (text: string) => Promise<void>;
}

const open = new Map<string, number>();

/**
 * Sends a job's events until the reader goes, the service stops, or the credential is no longer good; then says so.
 */
export async function watchJob(
  deps: Deps,
  job: { readonly id: string; readonly organisationId: string },
  {
    last,
    stillAllowed,
  }: {
    /** Number of the last event that the reader has. */
    readonly last: number;
    readonly stillAllowed: () => Promise<boolean>;
  },
  sink: EventSink,
): Promise<void> {
  let sent = last;
  let [spokeAt, checkedAt] = [performance.now(), performance.now()];
  const say = async (text: string) => {
    await sink.write(text);
    spokeAt = performance.now();
  };
  // A reader that is cut off before the first event knows where to go on.
  await say(`id: ${sent}\nevent: watching\ndata: ${JSON.stringify({ last: sent })}\n\n`);
  while (sink.isOpen()) {
    if (deps.shutdown.begun) return await say('event: end\ndata: {"reason":"service_stopping"}\n\n');
    if (performance.now() - checkedAt > CREDENTIAL_CHECK_MS) {
      if (!(await stillAllowed())) return await say('event: end\ndata: {"reason":"credential_ended"}\n\n');
      checkedAt = performance.now();
    }
    const events = await eventsAfter(deps, job, sent);
    for (const { number, type, data } of events) {
      await say(`id: ${number}\nevent: ${type}\ndata: ${data}\n\n`);
      sent = number;
    }
    if (performance.now() - spokeAt > HEARTBEAT_MS) await say(": alive\n\n");
    if (events.length < EVENTS_AT_ONCE) await sleep(EVERY_MS);
  }
}

/**
 * Takes one of the places that a credential may watch from; what it gives back frees the place.
 * @throws HttpProblem rate_limited where all are taken
 */
export function takeWatcherPlace(credential: string): () => void {
  const taken = open.get(credential) ?? 0;
  if (taken >= limits.watchersPerCredential) {
    throw new HttpProblem(
      "rate_limited",
      `${limits.watchersPerCredential} streams are open already.`,
      { retryAfterSeconds: 5 },
      { "Retry-After": "5" },
    );
  }
  open.set(credential, taken + 1);
  return () => {
    const left = (open.get(credential) ?? 1) - 1;
    if (left > 0) open.set(credential, left);
    else open.delete(credential);
  };
}
