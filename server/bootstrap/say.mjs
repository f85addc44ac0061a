/** A stop that is no crash: its message is a sentence for the person at the keyboard, and no stack is shown. */
export class Refusal extends Error {
  exitCode = 1;
}

const REPORT_MS = 10_000;
const REDRAW_MS = 500;

/** @param {string} line */
export function say(line) {
  process.stdout.write(`${line}\n`);
}

/** @param {number} sinceMs @returns {string} */
const secondsSince = (sinceMs) => `${((Date.now() - sinceMs) / 1000).toFixed(1)} s`;

/**
 * Says what is being done, how far it is while it lasts, and how long it took.
 * A terminal sees one line that changes; a log gets a line now and then.
 * @template T
 * @param {string} title
 * @param {() => Promise<T>} work
 * @param {() => string} [progress] how far it is, such as "312 of 701"
 * @returns {Promise<T>}
 */
export async function step(title, work, progress = () => "") {
  const started = Date.now();
  const terminal = process.stdout.isTTY;
  const line = () => `${title} ... ${[progress(), secondsSince(started)].filter(Boolean).join(", ")}`;
  if (terminal) process.stdout.write(`${title} ...`);
  else say(`${title} ...`);
  const timer = setInterval(
    () => (terminal ? process.stdout.write(`\r\x1b[K${line()}`) : say(line())),
    terminal ? REDRAW_MS : REPORT_MS,
  );
  try {
    const result = await work();
    say(`${terminal ? "\r\x1b[K" : ""}${title}: done in ${secondsSince(started)}`);
    return result;
  } catch (error) {
    if (terminal) say("");
    throw error;
  } finally {
    clearInterval(timer);
  }
}
