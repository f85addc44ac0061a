import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import { Piscina } from "piscina";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { computeOutcome, type ComputeOutcome } from "./compute-outcome.ts";
import type { ReportTask } from "./write-report.ts";

/** One core stays with the loop that answers. */
const threads = Math.max(1, availableParallelism() - 1);
/** Long calculations that may wait for a thread; more are told to come again. */
const waitingDefault = 200;

/**
 * Runs calculations: short ones where they are asked for, long ones in threads, so that the service answers others
 * meanwhile. The threads start with the first long one.
 */
export class ComputePool {
  private pool: Piscina | null = null;
  private readonly waitingMax: number;

  constructor({ waitingMax = waitingDefault } = {}) {
    this.waitingMax = waitingMax;
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

  private inThread(task: object, name: "compute" | "report"): Promise<unknown> {
    this.pool ??= new Piscina({
      filename: fileURLToPath(new URL("compute-worker.mjs", import.meta.url)),
      minThreads: 1,
      maxThreads: threads,
      idleTimeout: 60_000,
    });
    if (this.pool.queueSize > this.waitingMax) {
      throw new HttpProblem(
        "unavailable",
        "Too many long calculations and reports are waiting.",
        { retryAfterSeconds: 5 },
        { "Retry-After": "5" },
      );
    }
    return this.pool.run(task, { name });
  }

  /** Ends the threads; what runs in them is lost. */
  async close(): Promise<void> {
    await this.pool?.destroy();
    this.pool = null;
  }
}
