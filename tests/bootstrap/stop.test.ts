import { readFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { makeDataDir, removeDataDir, ServiceProcess } from "./service-process.ts";

/** What contract.md promises for a SIGTERM with nothing in flight. */
const PROMISED_MS = 3_000;
/** Of a killed part: the others see it within a second and then close in order. */
const AFTER_KILL_MS = 6_000;

describe("a service that is ended", () => {
  const dataDir = makeDataDir();
  const secret = () => readFileSync(join(dataDir, "app-secret"), "utf8");
  afterAll(() => removeDataDir(dataDir));

  it.each([
    ["SIGTERM to npm", "npm", "SIGTERM"],
    ["SIGTERM to the service itself", "node", "SIGTERM"],
    ["SIGINT, as Ctrl-C sends it", "node", "SIGINT"],
    ["SIGHUP, as a closed terminal sends it", "node", "SIGHUP"],
  ] as const)("leaves no process 3 s after %s, and its exit is clean", async (_how, part, signal) => {
    const service = await ServiceProcess.start(dataDir);
    process.kill(service.pidOf(part), signal);
    await service.nothingLeft(PROMISED_MS);
    expect(await service.exited).toBe(0);
  });

  it.each(["npm", "node", "mariadbd"] as const)(
    "leaves no process after kill -9 of %s, and starts again by itself on the same data",
    async (part) => {
      const service = await ServiceProcess.start(dataDir);
      const before = secret();
      process.kill(service.pidOf(part), "SIGKILL");
      await service.nothingLeft(AFTER_KILL_MS);
      expect(await service.exited).not.toBe(0);

      const again = await ServiceProcess.start(dataDir);
      expect((await fetch(`${again.url}/readyz`)).status).toBe(200);
      expect(secret()).toBe(before);
      await again.stop();
    },
  );

  it("says so when its database ends under it, with the way on", async () => {
    const service = await ServiceProcess.start(dataDir);
    process.kill(service.pidOf("mariadbd"), "SIGKILL");
    expect(await service.exited).toBe(1);
    expect(service.output).toContain("The private MariaDB ended (SIGKILL)");
    expect(service.output).toContain("Start again");
  });

  it("recovers when it is started while the database of a killed service is still closing", async () => {
    const service = await ServiceProcess.start(dataDir);
    const database = service.pidOf("mariadbd");
    process.kill(database, "SIGSTOP"); // holds the data until it is let go
    process.kill(service.pidOf("node"), "SIGKILL");
    await service.exited;
    const starting = ServiceProcess.start(dataDir);
    setTimeout(() => process.kill(database, "SIGCONT"), 1_500);
    const again = await starting;
    expect((await fetch(`${again.url}/readyz`)).status).toBe(200);
    await again.stop();
  });
});
