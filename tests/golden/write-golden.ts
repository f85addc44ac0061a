// Records what this version of the engine answers to the example requests: npm run golden
import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { engineVersion } from "../../server/compute/version.ts";
import { currentResults, goldenFile } from "./golden-results.ts";

const file = goldenFile(engineVersion);
const recorded = existsSync(file) ? (JSON.parse(readFileSync(file, "utf8")) as Record<string, string>) : {};
const current = currentResults();
const changed = Object.keys(recorded).filter((name) => name in current && current[name] !== recorded[name]);
if (changed.length > 0) {
  console.error(`Engine ${engineVersion} answered otherwise to ${changed.join(", ")}.`);
  console.error("Give it a new version in server/compute/version.ts and its changelog, then run this again.");
  process.exitCode = 1;
} else {
  writeFileSync(file, `${JSON.stringify(current, null, 2)}\n`);
}
