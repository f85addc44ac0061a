import { once } from "node:events";
import { finished } from "node:stream/promises";
import type { Request, Response } from "express";
import { z } from "zod";
import { indicationAnswer, indicationRequest } from "../../shared/schemas/indications.ts";
import { byOf } from "../http/call-parts.ts";
import { HttpProblem, problemBody } from "../http/http-problem.ts";
import { callerOf, defineOperation, type Call } from "../http/operation.ts";
import { readLines } from "../http/read-lines.ts";
import { checkText } from "../middleware/validate.ts";
import { credentialOf } from "../services/caller.ts";
import { changeOnce } from "../services/change-once.ts";
import { JobFollower } from "../services/follow-job.ts";
import { inTransaction } from "../services/in-transaction.ts";
import { loadJob, refuseSigned } from "../services/job-store.ts";
import { takeWatcherPlace, watchJob } from "../services/watch-job.ts";

const tag = "Jobs";
const requestExamples = () => ({
  casing: {
    summary: "One indicator and one sight while a casing moves",
    value: {
      plan: "0193a5e0-7c00-7000-8000-000000000005",
      component: "compressor-casing",
      at: "2026-11-06T10:05:00Z",
      indicators: [{ id: "di-1", reading: 0.06 }],
      sights: [{ station: "cas-2", centre: { h: 0.24, v: -0.05 } }],
    },
  },
});

const addIndication = defineOperation({
  operationId: "addIndication",
  method: "post",
  path: "/v1/jobs/{id}/indications",
  tag,
  summary: "Follow a move: one moment",
  description:
    "Indicators and line-of-sight readings of one moment, answered with what is left to move in h and v at every support, which neighbour has moved more than it may, and whether to stop. Whoever watches the job is told.",
  body: indicationRequest,
  requestExamples,
  response: { status: 201, description: "What is left, and whether to stop.", schema: indicationAnswer },
  errors: ["job_signed", "unknown_reference", "too_few_items"],
  handle: async (call) => {
    const follower = new JobFollower(call.deps, call.params.id ?? "", byOf(call));
    const judged = await follower.judge(call.body);
    return changeOnce(call.deps, call, 201, async (transaction) => ({
      body: await follower.keep(transaction, judged),
    }));
  },
});

const streamIndications = defineOperation({
  operationId: "streamIndications",
  method: "post",
  path: "/v1/jobs/{id}/indication-stream",
  tag,
  summary: "Follow a move: a stream",
  description:
    'Lines of JSON, each as POST /v1/jobs/{id}/indications takes it, answered line by line as they arrive. A line that is refused is answered with its problem and the stream goes on. The last line answered is {"end": true, "lines": n}: without it the stream was cut.',
  lines: true,
  body: indicationRequest,
  requestExamples,
  response: {
    status: 200,
    description: "One line for each line sent.",
    mediaType: "application/x-ndjson",
    schema: indicationAnswer,
  },
  errors: ["job_signed", "unknown_reference", "too_few_items"],
  handle: async (call) => {
    const loaded = await loadJob(call.deps, callerOf(call).organisation.id, call.params.id ?? "");
    refuseSigned(loaded.row);
    const follower = new JobFollower(call.deps, loaded.row.id, byOf(call));
    return {
      status: 200,
      headers: { "Content-Type": "application/x-ndjson", "X-Accel-Buffering": "no" },
      stream: async (response: Response) => {
        const { write, isOpen } = sinkOf(response);
        response.flushHeaders();
        let lines = 0;
        const stillAllowed = credentialCheck(call);
        try {
          for await (const line of readLines(call.request)) {
            lines += 1;
            await stillAllowed();
            await write(`${JSON.stringify(await answerLine(follower, line, call))}\n`);
            if (!isOpen()) return;
          }
          response.end(`${JSON.stringify({ end: true, lines })}\n`);
        } catch (error) {
          if (!(error instanceof HttpProblem)) throw error;
          response.end(`${JSON.stringify(problemBody(error, call.requestId, call.path))}\n`);
        }
      },
    };
  },
});

const watchJobOperation = defineOperation({
  operationId: "watchJob",
  method: "get",
  path: "/v1/jobs/{id}/events",
  tag,
  summary: "Watch a job",
  description:
    "Server-sent events: `watching` with the number of the last event that is known, once; `indication` with what was answered to it, `entry` for what was added to the log, `end` with its reason before the service ends the stream. Ids are the numbers of the job's events, from 1 and without a gap, in the order in which they were kept; Last-Event-ID goes on where a stream was cut (0: from the first), without it the stream begins now.",
  response: { status: 200, description: "The events.", mediaType: "text/event-stream", schema: z.string() },
  errors: ["rate_limited"],
  handle: async (call) => {
    const { deps, request } = call;
    const caller = callerOf(call);
    const { row } = await loadJob(deps, caller.organisation.id, call.params.id ?? "");
    const last = Math.min(lastEventOf(request) ?? row.events, row.events);
    const stillAllowed = () =>
      deps.credentials.callerOf(bearerOf(request)).then(
        () => true,
        () => false,
      );
    const leave = takeWatcherPlace(credentialOf(caller));
    return {
      status: 200,
      headers: { "Content-Type": "text/event-stream", "X-Accel-Buffering": "no" },
      stream: async (response: Response) => {
        try {
          response.flushHeaders();
          await watchJob(deps, row, { last, stillAllowed }, sinkOf(response));
          response.end();
          await finished(response).catch(() => undefined);
        } finally {
          leave();
        }
      },
    };
  },
});

const bearerOf = (request: Request): string => (request.get("Authorization") ?? "").replace(/^Bearer +/i, "");

/** The number that a reader has got to; null where it names none. */
function lastEventOf(request: Request): number | null {
  const sent = request.get("Last-Event-ID") ?? "";
  return /^\d{1,10}$/.test(sent) ? Number(sent) : null;
}

/** How long a stream of indications may go on between two looks at its credential. */
const CREDENTIAL_CHECK_MS = 3_000;

/** @throws HttpProblem as an operation would for a credential that is no longer good, a few seconds after it ended */
function credentialCheck({ deps, request }: Pick<Call, "deps" | "request">): () => Promise<void> {
  let checkedAt = performance.now();
  return async () => {
    if (performance.now() - checkedAt < CREDENTIAL_CHECK_MS) return;
    await deps.credentials.callerOf(bearerOf(request));
    checkedAt = performance.now();
  };
}

/** A response as a place to write to, that holds the writer back while the reader is slow. */
function sinkOf(response: Response) {
  const isOpen = () => !response.destroyed && !response.writableEnded;
  const write = async (text: string) => {
    if (!isOpen() || response.write(text)) return;
    const closed = new AbortController();
    const stop = () => {
      closed.abort();
    };
    response.once("close", stop);
    await once(response, "drain", { signal: closed.signal }).catch(() => undefined);
    response.off("close", stop);
  };
  return { isOpen, write };
}

/** The answer to one line, or its problem. */
async function answerLine(
  follower: JobFollower,
  line: string,
  { deps, requestId, path }: Pick<Call, "deps" | "requestId" | "path">,
): Promise<object> {
  try {
    const judged = await follower.judge(checkText({ body: indicationRequest }, line).body);
    return await inTransaction(deps.database.sequelize, (transaction) => follower.keep(transaction, judged));
  } catch (error) {
    if (error instanceof HttpProblem && error.status < 500) return problemBody(error, requestId, path);
    throw error;
  }
}

export const jobIndicationOperations = [addIndication, streamIndications, watchJobOperation];
