import type { Logger } from "pino";

/** Does something from time to time, never twice at once; a failure is logged, and it is tried again. */
export class PeriodicTask {
  private readonly timer: NodeJS.Timeout;
  private running: Promise<void> | null = null;

  constructor(
    private readonly name: string,
    everyMs: number,
    private readonly work: () => Promise<unknown>,
    private readonly log: Logger,
  ) {
    this.timer = setInterval(() => this.run(), everyMs);
    this.timer.unref();
  }

  /** Starts no more, and waits for what runs. */
  async stop(): Promise<void> {
    clearInterval(this.timer);
    await this.running;
  }

  private run(): void {
    this.running ??= this.work()
      .then(
        () => undefined,
        (error: unknown) => this.log.warn({ err: error }, `${this.name} failed; it will be tried again`),
      )
      .finally(() => {
        this.running = null;
      });
  }
}
