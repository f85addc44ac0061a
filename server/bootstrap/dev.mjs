import { join } from "node:path";
import { hasOutsideDatabase, readEnvironment } from "./environment.mjs";
import { ensurePackages } from "./packages.mjs";
import { checkAddress, findFreePort } from "./ports.mjs";
import { say } from "./say.mjs";
import { loadTypeScript } from "./serve.mjs";
import { claimData, readSettings, withPrivateDatabase } from "./start.mjs";
import { endTied, spawnTied } from "./tied-process.mjs";

/** @typedef {import("./supervise.mjs").Life} Life */

const SETTLE_MS = 100;
/** What the service answers; all else is the console's. */
const SERVICE_PATHS = "^/(v1|docs|openapi\\.json|livez|readyz|metrics)";

/**
 * Watch mode: the console is served from its sources and updates in the page, the service restarts when its own change.
 * @param {Life} life
 * @param {string} root
 */
export async function dev(life, root) {
  const environment = readEnvironment(root);
  await ensurePackages(life, root);
  await loadTypeScript();
  const settings = await readSettings(environment);
  const outside = hasOutsideDatabase(environment);
  if (!outside) await claimData(life, settings.dataDir);
  await checkAddress(settings.host, settings.port);
  const ready = outside ? environment : await withPrivateDatabase(life, environment, settings.dataDir);
  const url = `http://${settings.host}:${settings.port}`;
  const port = await findFreePort();

  const { createServer } = await import("vite");
  const vite = await createServer({
    root: join(root, "console"),
    configFile: join(root, "console/vite.config.ts"),
    server: {
      host: settings.host,
      port: settings.port,
      strictPort: true,
      proxy: { [SERVICE_PATHS]: `http://127.0.0.1:${port}` },
    },
  });
  life.onEnd(() => vite.close());

  const service = keepRunning(life, join(root, "server/bootstrap/run.mjs"), {
    PUBLIC_URL: url,
    ...ready,
    HOST: "127.0.0.1",
    PORT: String(port),
  });
  const folders = [join(root, "server"), join(root, "shared")];
  vite.watcher.add(folders);
  vite.watcher.on("all", (_event, path) => {
    if (folders.some((folder) => path.startsWith(folder)) && !/\.test\.ts$/.test(path)) service.restart();
  });
  await vite.listen();
  life.nowServing();
  say(`Console and service at ${url}; both follow their sources. Ctrl-C stops everything.`);
}

/**
 * @param {Life} life
 * @param {string} entry
 * @param {Record<string, string | undefined>} environment
 */
function keepRunning(life, entry, environment) {
  const launch = () =>
    spawnTied(process.execPath, [entry, "serve"], {
      env: environment,
      stdio: ["ignore", "inherit", "inherit"],
    });
  let child = launch();
  /** @type {NodeJS.Timeout | undefined} */
  let settling;
  let turn = Promise.resolve();
  life.onEnd(async () => {
    clearTimeout(settling);
    await turn;
    await endTied(child);
  });
  return {
    /** One editor's save is several events; the last one counts. */
    restart() {
      clearTimeout(settling);
      settling = setTimeout(() => {
        turn = turn.then(async () => {
          await endTied(child);
          if (life.ending) return;
          say("The service's sources changed; restarting it.");
          child = launch();
        });
      }, SETTLE_MS);
    },
  };
}
