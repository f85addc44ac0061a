import { fileURLToPath } from "node:url";
import { ensureConsole } from "../../server/bootstrap/console-build.mjs";

/** Builds the console when its sources have changed, so that a browser test never sees yesterday's. */
export async function setup(): Promise<void> {
  // The test runner ends this process; nothing of ours has to be closed before.
  const life = {
    onEnd: () => () => true,
    nowServing: () => undefined,
    end: () => Promise.resolve(),
    fail: (error: unknown) => {
      throw error;
    },
    ending: false,
  };
  await ensureConsole(life, fileURLToPath(new URL("../..", import.meta.url)));
}
