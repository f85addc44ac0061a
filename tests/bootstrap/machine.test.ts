import { chmodSync, mkdirSync, mkdtempSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { databaseNeeds, installCommand, missingPackages } from "../../server/bootstrap/debian-packages.mjs";
import { askHolder, claimFolder } from "../../server/bootstrap/folder-claim.mjs";
import { keepPrivateText, makeSocketFolder, readPrivateFile } from "../../server/bootstrap/private-files.mjs";

const folder = mkdtempSync(join(tmpdir(), "borewright-machine-"));
afterAll(() => rmSync(folder, { recursive: true }));

function folderOfPrograms(name: string, programs: readonly string[], mode = 0o755): string {
  const path = join(folder, name);
  mkdirSync(path);
  for (const program of programs) writeFileSync(join(path, program), "", { mode });
  return path;
}

describe("missingPackages", () => {
  it("names the package of each program that is not there, once", () => {
    expect(missingPackages(databaseNeeds, [])).toEqual(["mariadb-server-core", "mariadb-client-core"]);
    const some = folderOfPrograms("some", ["mariadbd", "my_print_defaults"]);
    expect(missingPackages(databaseNeeds, [some])).toEqual(["mariadb-server-core"]);
    const all = folderOfPrograms("all", ["mariadb-install-db"]);
    expect(missingPackages(databaseNeeds, [some, all])).toEqual([]);
  });

  it("does not take a file that cannot be run for a program", () => {
    const plain = folderOfPrograms("plain", ["mariadbd", "my_print_defaults", "mariadb-install-db"], 0o644);
    expect(missingPackages(databaseNeeds, [plain])).toHaveLength(2);
  });
});

describe("installCommand", () => {
  it("is one line to paste, for the core packages that start no server of their own", () => {
    expect(installCommand(missingPackages(databaseNeeds, []))).toBe(
      "sudo apt-get update && sudo apt-get install -y --no-install-recommends mariadb-server-core mariadb-client-core",
    );
  });
});

describe("claimFolder", () => {
  it("gives a folder to one at a time, tells others who has it, and gives it again when released", async () => {
    const first = await claimFolder(folder, "data");
    expect(first).not.toBeNull();
    first?.announce("http://127.0.0.1:4100");
    expect(await claimFolder(folder, "data")).toBeNull();
    expect(await askHolder(folder, "data")).toEqual({ pid: process.pid, url: "http://127.0.0.1:4100" });
    first?.release();
    const second = await claimFolder(folder, "data");
    expect(second).not.toBeNull();
    second?.release();
  });

  it("keeps the folder's data and its preparation apart", async () => {
    const claims = [await claimFolder(folder, "data"), await claimFolder(folder, "preparation")];
    expect(claims).not.toContain(null);
    for (const claim of claims) claim?.release();
  });

  it("knows a folder by any of its names", async () => {
    const claim = await claimFolder(folder, "data");
    expect(await claimFolder(join(folder, ".", "..", folder.split("/").at(-1) ?? ""), "data")).toBeNull();
    claim?.release();
  });
});

describe("keepPrivateText", () => {
  it("makes a text once and keeps it to its owner, even after a copy has opened it to others", () => {
    const path = join(folder, "secret");
    expect(keepPrivateText(path, () => "first")).toBe("first");
    expect(keepPrivateText(path, () => "second")).toBe("first");
    chmodSync(path, 0o644);
    expect(readPrivateFile(path)).toBe("first");
    expect((statSync(path).mode & 0o777).toString(8)).toBe("600");
  });

  it("makes it anew when the file is empty, as a full disk may leave it", () => {
    const path = join(folder, "empty");
    writeFileSync(path, "");
    expect(keepPrivateText(path, () => "made")).toBe("made");
  });
});

describe("makeSocketFolder", () => {
  it("is short however deep the data folder is", () => {
    const path = makeSocketFolder(join(folder, "deep/".repeat(60)));
    expect(path.length).toBeLessThan(tmpdir().length + 50);
    rmSync(path, { recursive: true });
  });

  it("refuses a folder that stands open to others, for someone else may have put it there", () => {
    const path = makeSocketFolder(folder);
    chmodSync(path, 0o755);
    expect(() => makeSocketFolder(folder)).toThrow(/open to others/);
    rmSync(path, { recursive: true });
  });
});
