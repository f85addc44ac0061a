import { existsSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { engineVersion } from "../../server/compute/version.ts";
import { currentResults, goldenFile } from "./golden-results.ts";

describe("the engine's results", () => {
  it("are those recorded for its version: a result that changes asks for a new version", () => {
    const file = goldenFile(engineVersion);
    expect(existsSync(file), `npm run golden, for the new version ${engineVersion}`).toBe(true);
    const recorded = JSON.parse(readFileSync(file, "utf8")) as Record<string, string>;
    const current = currentResults();
    expect(Object.keys(current).length).toBeGreaterThan(8);
    expect(current).toEqual(recorded);
  });
});
