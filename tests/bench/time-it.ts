/** Median of several rounds, each long enough to be measured, of what one call takes: microseconds. */
export function microsecondsOf(run: () => unknown, rounds = 9, roundMs = 60): number {
  run();
  let calls = 1;
  while (millisecondsOf(run, calls) < roundMs / 4) calls *= 2;
  const times = Array.from({ length: rounds }, () => (millisecondsOf(run, calls) * 1000) / calls);
  return times.sort((a, b) => a - b)[Math.floor(rounds / 2)] ?? 0;
}

function millisecondsOf(run: () => unknown, calls: number): number {
  const started = performance.now();
  for (let call = 0; call < calls; call++) kept = run();
  return performance.now() - started;
}

/** Holds the last answer, so that no compiler may leave the work out. */
export let kept: unknown = null;
