/**
 * Microseconds of one call: the least of many short rounds, since what makes a round longer is mostly other work of the
 * machine. Libraries in other languages are timed in the same way.
 */
export function microsecondsOf(run: () => unknown, rounds = 60, roundMs = 2): number {
  const calls = callsFor(run, roundMs);
  let least = Infinity;
  for (let round = 0; round < rounds; round++) {
    least = Math.min(least, (millisecondsOf(run, calls) * 1000) / calls);
  }
  return least;
}

/** Seconds of one call and what it gives, for what takes long: once, since nobody waits for the least of many. */
export function timeOnce<Result>(run: () => Result): { readonly seconds: number; readonly result: Result } {
  const started = performance.now();
  const result = run();
  return { seconds: (performance.now() - started) / 1000, result };
}

/** Enough calls to be measured, and enough before them to have the code compiled. */
function callsFor(run: () => unknown, roundMs: number): number {
  const warm = performance.now();
  do run();
  while (performance.now() - warm < 100);
  let calls = 1;
  while (calls < 1_000_000 && millisecondsOf(run, calls) < roundMs / 2) calls *= 2;
  return calls;
}

function millisecondsOf(run: () => unknown, calls: number): number {
  const started = performance.now();
  for (let call = 0; call < calls; call++) kept = run();
  return performance.now() - started;
}

/** Holds the last answer, so that no compiler may leave the work out. */
export let kept: unknown = null;
