import { monitorEventLoopDelay } from "node:perf_hooks";
import { setTimeout as wait } from "node:timers/promises";
import { alignmentKind } from "../../server/calculations/alignment.ts";
import { ComputePool } from "../../server/services/compute-pool.ts";
import { typicalMachine } from "./machine.ts";
import { microsecondsOf } from "./time-it.ts";

/** The whole chain of a typical machine in this thread. */
export function timeWholeChain(): void {
  const request = typicalMachine();
  const stacks = alignmentKind
    .answer(request)
    .result.moves?.components.reduce((sum, component) => sum + component.stacks.length, 0);
  const whole = microsecondsOf(() => alignmentKind.answer(request), 5);
  const { components: _components, shims: _shims, ...survey } = request;
  const fitsAndAxis = microsecondsOf(() => alignmentKind.answer(survey), 5);
  console.log(
    `\nWhole chain: 20 stations, ${request.components?.length} components, ${stacks} stacks, cut to size`,
  );
  console.log(
    `${(whole / 1000).toFixed(2)} ms, of which fits and axis ${((100 * fitsAndAxis) / whole).toFixed(0)} %`,
  );
}

/** How late the loop that answers comes to its timers while long calls run in threads. */
export async function timeLoopLag(): Promise<void> {
  const pool = new ComputePool();
  const request = typicalMachine();
  await pool.run(alignmentKind, request);
  const quiet = await lagDuring(() => wait(500));
  const busy = await lagDuring(() =>
    Promise.all(Array.from({ length: 50 }, () => pool.run(alignmentKind, request))),
  );
  await pool.close();
  console.log("\nLag of the loop, ms, with nothing to do and while 50 whole chains run in threads");
  console.log(`median ${quiet.median} and ${busy.median}; greatest ${quiet.most} and ${busy.most}`);
}

async function lagDuring(work: () => Promise<unknown>): Promise<{ median: string; most: string }> {
  const delay = monitorEventLoopDelay({ resolution: 1 });
  delay.enable();
  await work();
  delay.disable();
  const ms = (nanoseconds: number) => Math.max(0, nanoseconds / 1e6 - 1).toFixed(1);
  return { median: ms(delay.percentile(50)), most: ms(delay.max) };
}
