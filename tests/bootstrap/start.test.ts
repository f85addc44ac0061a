import { createServer } from "node:net";
import { once } from "node:events";
import { readdirSync, readFileSync, statSync } from "node:fs";
import { join } from "node:path";
import { createConnection } from "mariadb";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { makeDataDir, removeDataDir, ServiceProcess } from "./service-process.ts";

interface Access {
  readonly port: number;
  readonly password: string;
}

/** Local addresses that listen on a port, as the kernel writes them: hexadecimal, least significant byte first. */
function listeningAddresses(port: number): string[] {
  const wanted = port.toString(16).toUpperCase().padStart(4, "0");
  return ["/proc/net/tcp", "/proc/net/tcp6"].flatMap((table) =>
    readFileSync(table, "utf8")
      .split("\n")
      .map((line) => line.trim().split(/\s+/))
      .filter(([, local, , state]) => local?.endsWith(`:${wanted}`) && state === "0A")
      .map(([, local = ""]) => local.split(":")[0] ?? ""),
  );
}

describe("npm start", () => {
  const dataDir = makeDataDir();
  let service: ServiceProcess;
  let access: Access;
  beforeAll(async () => {
    service = await ServiceProcess.start(dataDir);
    access = JSON.parse(readFileSync(join(dataDir, "database-access.json"), "utf8")) as Access;
  });
  afterAll(async () => {
    await service.stop();
    removeDataDir(dataDir);
  });

  const attempt = (user: string, password: string) =>
    createConnection({ host: "127.0.0.1", port: access.port, user, password, connectTimeout: 5_000 });

  it("serves when it says that it is ready", async () => {
    const response = await fetch(`${service.url}/readyz`);
    expect(response.status).toBe(200);
    expect(service.output).toContain(service.url);
  });

  it("keeps secrets and data from other users of the machine", () => {
    expect(statSync(dataDir).mode & 0o077).toBe(0);
    const modes = ["app-secret", "database", "database-access.json", "database.log"].map(
      (name) => `${name} ${(statSync(join(dataDir, name)).mode & 0o777).toString(8)}`,
    );
    expect(modes).toEqual(["app-secret 600", "database 700", "database-access.json 600", "database.log 600"]);
    expect(service.output).not.toContain(access.password);
  });

  it("has its database listen on 127.0.0.1 alone", () => {
    expect(listeningAddresses(access.port)).toEqual(["0100007F"]);
  });

  it("has a database that lets in neither root nor a nameless user, with or without a password", async () => {
    for (const user of ["root", "", "mysql", "mariadb.sys"])
      for (const password of ["", access.password])
        await expect(attempt(user, password)).rejects.toMatchObject({
          code: expect.stringMatching(/^ER_(ACCESS_DENIED|ACCOUNT_HAS_BEEN_LOCKED)/) as string,
        });
  });

  it("has no account but its own, the closed root and the locked system owner", async () => {
    const connection = await attempt("borewright", access.password);
    try {
      // The account may see its own rights only; that it sees no more is part of what is asked here.
      await expect(connection.query("SELECT User FROM mysql.global_priv")).rejects.toMatchObject({
        code: "ER_TABLEACCESS_DENIED_ERROR",
      });
      const grants: Record<string, string>[] = await connection.query("SHOW GRANTS");
      const texts = grants.flatMap((row) => Object.values(row));
      expect(texts).toHaveLength(2);
      expect(texts[0]).toMatch(/^GRANT USAGE ON \*\.\* /);
      expect(texts[1]).toMatch(/^GRANT ALL PRIVILEGES ON `borewright`\.\* /);
    } finally {
      await connection.end();
    }
  });

  it("tells a second start on the same data folder who runs there and what to do", async () => {
    const second = await ServiceProcess.launch(dataDir);
    expect(await second.exited).toBe(1);
    expect(second.output).toContain(`already runs on ${dataDir} at ${service.url}`);
    expect(second.output).toContain(`kill ${service.pidOf("node")}`);
    expect(second.output).toMatch(/DATA_DIR=\S+ PORT=\d+ npm start/);
    expect((await fetch(`${service.url}/readyz`)).status).toBe(200);
  });

  it("says what to do about a taken port, before it starts anything", async () => {
    const other = createServer().listen(0, "127.0.0.1");
    await once(other, "listening");
    const address = other.address();
    const port = typeof address === "object" ? Number(address?.port) : 0;
    const folder = makeDataDir();
    const refused = await ServiceProcess.launch(folder, { PORT: String(port) });
    expect(await refused.exited).toBe(1);
    expect(refused.output).toContain(`PORT=${port + 1} npm start`);
    expect(readdirSync(folder)).toEqual([]);
    other.close();
    removeDataDir(folder);
  });

  it("lists every fault of the configuration and ends with 78", async () => {
    const refused = await ServiceProcess.launch(makeDataDir(), {
      PORT: "none",
      DEMO: "maybe",
      TRUST_PROXY: "all",
    });
    expect(await refused.exited).toBe(78);
    for (const name of ["PORT", "DEMO", "TRUST_PROXY"])
      expect(refused.output).toMatch(new RegExp(`^ {2}${name}: `, "m"));
    removeDataDir(refused.dataDir);
  });
});
