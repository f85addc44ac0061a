import { findProgram } from "./find-program.mjs";
import { Refusal, step } from "./say.mjs";
import { requireSuccess, runTied } from "./tied-process.mjs";

/** @typedef {{ readonly program: string, readonly package: string }} Need */

/** The core packages hold the programs alone: no system server is started, no account is made. */
export const databaseNeeds = [
  { program: "mariadbd", package: "mariadb-server-core" },
  { program: "mariadb-install-db", package: "mariadb-server-core" },
  { program: "my_print_defaults", package: "mariadb-client-core" },
];

/** What the tests run beside the service: a real browser, the two languages of the examples, readers of the reports. */
export const testNeeds = [
  { program: "chromium", package: "chromium" },
  { program: "curl", package: "curl" },
  { program: "python3", package: "python3" },
  { program: "pdftotext", package: "poppler-utils" },
  { program: "soffice", package: "libreoffice-calc-nogui" },
  { program: "ezdxf", package: "python3-ezdxf" },
];

/** SIGINT stops apt at once while it downloads; while dpkg works apt ignores it and dpkg is never cut short. */
const APT_ENDING = /** @type {const} */ ({ signal: "SIGINT", patienceMs: 300_000, alone: true });

/**
 * The packages whose programs are not there.
 * @param {readonly Need[]} needs
 * @param {readonly string[]} [folders]
 * @returns {string[]}
 */
export function missingPackages(needs, folders) {
  const missing = needs.filter(({ program }) => findProgram(program, folders) === null);
  return [...new Set(missing.map((need) => need.package))];
}

/** @param {readonly string[]} packages @returns {string} */
export const installCommand = (packages) =>
  `sudo apt-get update && sudo apt-get install -y --no-install-recommends ${packages.join(" ")}`;

/**
 * Installs what is missing from Debian's packages as root; anyone else is told the one command and stops.
 * @param {import("./supervise.mjs").Life} life
 * @param {readonly Need[]} needs
 */
export async function ensurePrograms(life, needs) {
  const packages = missingPackages(needs);
  if (packages.length === 0) return;
  const apt = findProgram("apt-get");
  if (apt === null)
    throw new Refusal(
      `Missing: ${packages.join(", ")}. There is no apt-get here: install them, then start again.`,
    );
  if (process.getuid?.() !== 0)
    throw new Refusal(
      `Missing: ${packages.join(", ")}. Run this once, then start again:\n\n  ${installCommand(packages)}`,
    );

  const environment = { ...process.env, DEBIAN_FRONTEND: "noninteractive" };
  /** @param {string} program @param {string[]} args */
  const run = (program, ...args) =>
    runTied(life, program, args, { env: environment, deathSignal: "INT" }, APT_ENDING);
  const patience = "DPkg::Lock::Timeout=120";
  const install = () =>
    run(apt, "-o", patience, "install", "-y", "-q", "--no-install-recommends", ...packages);

  await step(`Installing ${packages.join(", ")}`, async () => {
    if ((await install()).code === 0) return;
    // No package lists yet, stale ones, or an installation that someone cut short.
    await run("dpkg", "--configure", "-a");
    await run(apt, "-o", patience, "update", "-q");
    requireSuccess(
      await install(),
      "apt-get could not install them. Mend what it says above, then start again.",
    );
  });
  const still = missingPackages(needs);
  if (still.length > 0)
    throw new Refusal(`${still.join(", ")} installed, but the programs are not where they should be.`);
}
