import { once } from "node:events";
import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import { MessageChannel, type Transferable } from "node:worker_threads";
import { Piscina } from "piscina";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { readFile, type ReadFile, type ReadingFile } from "../jobs/reading-files/read-file.ts";
import type { ReadMachine } from "../machines/workbook/read-machine-workbook.ts";
import { computeOutcome, type ComputeOutcome } from "./compute-outcome.ts";
import { tooSlow, type FileTask, type Unreadable } from "./read-file-task.ts";
import type { ReportTask } from "./write-report.ts";

/** One core stays with the loop that answers. */
const threads = Math.max(1, availableParallelism() - 1);
/** Long calculations that may wait for a thread; more are told to come again. */
const waitingDefault = 200;
/** For how long a file may be read, from when a thread has begun: the largest that is let in takes a third of it. */
const readingMsDefault = 30_000;
/** A text file that is read in a few milliseconds where it is. */
const shortBytes = 128 * 1024;

/** What a task is given beside its data. */
interface TaskOptions {
  readonly signal?: AbortSignal;
  readonly transferList?: Transferable[];
}

/**
 * Runs calculations: short ones where they are asked for, long ones in threads, so that the service answers others
 * meanwhile; writes reports and reads files there, too. The threads start with the first of these.
 */
export class ComputePool {
  private pool: Piscina | null = null;
  private readonly waitingMax: number;
  private readonly readingMs: number;

  constructor({ waitingMax = waitingDefault, readingMs = readingMsDefault } = {}) {
    this.waitingMax = waitingMax;
    this.readingMs = readingMs;
  }

  /** @throws HttpProblem unavailable when too many long calculations wait */
  run<Request>(kind: CalculationKind<Request, object>, request: Request): Promise<ComputeOutcome> {
    if (!kind.isLong?.(request)) return computeOutcome(kind, request);
    return this.inThread({ kind: kind.kind, request }, "compute") as Promise<ComputeOutcome>;
  }

  /**
   * Writes a report in a thread: drawing a hundred sheets takes seconds.
   * @throws HttpProblem unavailable when too much waits
   */
  async report(task: ReportTask): Promise<Buffer> {
    const bytes = (await this.inThread(task, "report")) as Uint8Array;
    return Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  }

  /**
   * Reads a file of readings, a large one or a workbook in a thread: 50 MB of XML take seconds.
   * @throws HttpProblem unavailable when too much waits
   */
  readings(file: ReadingFile): Promise<ReadFile> {
    if (file.mediaType === "text/csv" && file.content.length <= shortBytes) return readFile(file);
    return this.read({ holds: "readings", file }) as Promise<ReadFile>;
  }

  /**
   * Reads a machine's workbook in a thread.
   * @throws HttpProblem unavailable when too much waits
   */
  machine(content: Uint8Array): Promise<ReadMachine | Unreadable> {
    return this.read({ holds: "machine", content }) as Promise<ReadMachine | Unreadable>;
  }

  /** The time counts from when a thread has begun: waiting behind others is not the file's fault. */
  private async read(task: FileTask): Promise<unknown> {
    const { port1: here, port2: begun } = new MessageChannel();
    const ended = new AbortController();
    const slow = new AbortController();
    const deadline = once(here, "message", { signal: ended.signal }).then(
      () => setTimeout(() => slow.abort(), this.readingMs),
      () => undefined,
    );
    try {
      return await this.inThread({ task, begun }, "read", { signal: slow.signal, transferList: [begun] });
    } catch (error) {
      if (slow.signal.aborted) return tooSlow(task, this.readingMs);
      throw error;
    } finally {
      ended.abort();
      clearTimeout(await deadline);
      here.close();
    }
  }

  private inThread(
    task: object,
    name: "compute" | "report" | "read",
    options: TaskOptions = {},
  ): Promise<unknown> {
    this.pool ??= new Piscina({
      filename: fileURLToPath(new URL("compute-worker.mjs", import.meta.url)),
      minThreads: 1,
      maxThreads: threads,
      idleTimeout: 60_000,
    });
    if (this.pool.queueSize > this.waitingMax) {
      throw new HttpProblem(
        "unavailable",
        "Too many long calculations, reports and files are waiting.",
        { retryAfterSeconds: 5 },
        { "Retry-After": "5" },
      );
    }
    return this.pool.run(task, { name, ...options });
  }

  /** Ends the threads; what runs in them is lost. */
  async close(): Promise<void> {
    await this.pool?.destroy();
    this.pool = null;
  }
}
