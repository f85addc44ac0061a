import { say } from "./say.mjs";
import { explainListening } from "./ports.mjs";

/** @typedef {Record<string, string | undefined>} Environment */

/** Lets this process import TypeScript; a compiled copy would start a tenth of a second sooner and could be stale. */
export async function loadTypeScript() {
  const { register } = await import("tsx/esm/api");
  register();
}

/**
 * Runs the service in this process until something ends it.
 * @param {import("./supervise.mjs").Life} life
 * @param {Environment} environment
 * @returns {Promise<string>} the address it answers at
 */
export async function serveIn(life, environment) {
  const { startServer } = await import("../index.ts");
  const { readConfig } = await import("../config.ts");
  const { host, port } = readConfig(environment);
  try {
    const server = await startServer({ environment, announce: say });
    life.onEnd(() => server.close());
    life.nowServing();
    return server.url;
  } catch (error) {
    throw explainListening(error, host, port);
  }
}

/**
 * The service alone, on the environment as it stands: what `dev` restarts.
 * @param {import("./supervise.mjs").Life} life
 */
export async function serve(life) {
  await loadTypeScript();
  await serveIn(life, process.env);
}
