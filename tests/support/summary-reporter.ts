import { writeSync } from "node:fs";
import type { Reporter, SerializedError, TestModule } from "vitest/node";

interface Counts {
  readonly passed: number;
  readonly failed: number;
  readonly skipped: number;
}

/** A file that could not be loaded and an error outside every test are failures too: neither may hide behind green tests. */
export function countTests(
  modules: readonly Pick<TestModule, "children" | "errors">[],
  unhandled: readonly SerializedError[],
): Counts {
  const counts = { passed: 0, failed: unhandled.length, skipped: 0 };
  for (const module of modules) {
    counts.failed += module.errors().length;
    for (const suite of module.children.allSuites()) counts.failed += suite.errors().length;
    for (const test of module.children.allTests()) {
      const { state } = test.result();
      if (state === "pending") counts.failed += 1;
      else counts[state] += 1;
    }
  }
  return counts;
}

/** A run in which nothing was tested has proved nothing. */
export const isFailure = ({ passed, failed }: Counts): boolean => failed > 0 || passed === 0;

/** `3 passed, 0 failed`, with what was skipped when anything was. */
export const summarise = ({ passed, failed, skipped }: Counts): string =>
  `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ""}`;

/** Ends the run's output with one line of counts, and the run with a failure when there was one or nothing was tested. */
export class SummaryReporter implements Reporter {
  #counts: Counts = { passed: 0, failed: 0, skipped: 0 };

  onInit(): void {
    // Vitest and its reporters may still write after the last test; this is written after them.
    process.once("exit", () => {
      if (isFailure(this.#counts)) process.exitCode ||= 1;
      writeSync(1, `${summarise(this.#counts)}\n`);
    });
  }

  onTestRunEnd(modules: readonly TestModule[], unhandled: readonly SerializedError[]): void {
    this.#counts = countTests(modules, unhandled);
  }
}
