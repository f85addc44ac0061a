import type { SelfTest, SelfTestSummary } from "../../shared/schemas/engine.ts";
import { runSelfTest } from "../compute/self-test/run-self-test.ts";
import { engineVersion } from "../compute/version.ts";

/** Runs the engine's published cases, and remembers how the last run ended. */
export class EngineSelfTest {
  private latest: SelfTestSummary | null = null;

  constructor(private readonly now: () => Date) {}

  /** How the last run in this process ended; the first is run when it is first asked for. */
  get last(): SelfTestSummary {
    return this.latest ?? summaryOf(this.run());
  }

  run(): SelfTest {
    const figures = runSelfTest();
    const passed = figures.filter((figure) => figure.passed).length;
    const result = {
      at: this.now().toISOString(),
      engineVersion,
      passed,
      failed: figures.length - passed,
      figures,
    };
    this.latest = summaryOf(result);
    return result;
  }
}

function summaryOf({ at, engineVersion: version, passed, failed }: SelfTest): SelfTestSummary {
  return { at, engineVersion: version, passed, failed };
}
