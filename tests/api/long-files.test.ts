import { afterAll, beforeAll, describe, expect, it } from "vitest";
import writeExcelFile from "write-excel-file/node";
import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import { readFile, type ReadingFile } from "../../server/jobs/reading-files/read-file.ts";
import { readMachineWorkbook } from "../../server/machines/workbook/read-machine-workbook.ts";
import { writeMachineWorkbook } from "../../server/machines/workbook/write-machine-workbook.ts";
import { ComputePool } from "../../server/services/compute-pool.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";

const xlsx = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet" as const;
const columns = ["station", "form", "taken at", "sense", "zero", "clock (deg)", "reading (mm)"];

/** A workbook of readings: `rows` of them, on one bore. */
async function workbook(rows: number, more = 0): Promise<Buffer> {
  const head = [...columns, ...Array.from({ length: more }, (_, index) => `extra ${index}`)];
  const row = (index: number): (string | number)[] => [
    "brg-1",
    "turned_gauge",
    "2026-11-04T07:40:00Z",
    "larger_is_farther",
    "nominal",
    (index * 7) % 360,
    0.01 * (index % 9),
    ...Array.from({ length: more }, (_, column) => index + column),
  ];
  const sheet = [head, ...Array.from({ length: rows }, (_, index) => row(index))].map((cells) =>
    cells.map((value) => ({ value, type: typeof value === "number" ? Number : String })),
  );
  return writeExcelFile([{ data: sheet, sheet: "Readings" }]).toBuffer();
}

const fileOf = (content: Uint8Array): ReadingFile => ({
  mediaType: xlsx,
  content,
  names: new Map(),
  ignored: [],
  units: fellgateDocument.units,
});

describe("files read in a thread", () => {
  const pool = new ComputePool();
  let small: Buffer;
  beforeAll(async () => {
    small = await workbook(8);
    await pool.readings(fileOf(small));
  }, 30_000);
  afterAll(() => pool.close());

  it("say what this thread would say of them: readings, machines, and files that are neither", async () => {
    const here = await readFile(fileOf(small));
    expect(here.readings).toHaveLength(1);
    expect(await pool.readings(fileOf(small))).toEqual(here);
    const nonsense = Buffer.from("no workbook");
    const refused = await pool.readings(fileOf(nonsense));
    expect(refused).toEqual(await readFile(fileOf(nonsense)));
    expect(refused.faults).toMatchObject([{ line: 1, code: "file_not_as_stated" }]);

    const options = { description: "Test", createdAt: new Date("2026-11-04T08:00:00Z") };
    const machine = await writeMachineWorkbook(fellgateDocument, options);
    expect(await pool.machine(machine)).toEqual(await readMachineWorkbook(machine));
    expect(await pool.machine(nonsense)).toMatchObject({ unreadable: { code: "file_not_as_stated" } });
  });

  it("are given up when they take too long, and the next is read", async () => {
    const hasty = new ComputePool({ readingMs: 20 });
    const large = await workbook(15_000, 10);
    const readings = await hasty.readings(fileOf(large));
    expect(readings.faults).toMatchObject([{ line: 1, column: null, code: "call_too_large" }]);
    expect(readings.readings).toEqual([]);
    expect(await hasty.machine(large)).toMatchObject({ unreadable: { code: "call_too_large" } });
    await hasty.close();
    expect((await pool.readings(fileOf(small))).readings).toHaveLength(1);
  }, 60_000);
});

describe("the service while it reads a large workbook", () => {
  let app: ListeningApp;
  beforeAll(async () => {
    app = await openListeningApp();
  });
  afterAll(() => app.close());

  it("answers others before it has read it", async () => {
    const job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.start();
    const survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
    const send = (path: string, content: Buffer) =>
      fetch(`${app.url}${path}`, {
        method: "POST",
        headers: { Authorization: `Bearer ${job.token}`, "Content-Type": xlsx },
        body: new Uint8Array(content),
      });
    const path = `/v1/jobs/${job.id}/surveys/${survey}/reading-previews?name=r.xlsx`;
    const large = await workbook(15_000, 20);
    // The thread is up, so that what is waited for is the reading alone.
    expect((await send(path, await workbook(8))).status).toBe(200);
    for (const address of [path, "/v1/machine-imports"]) {
      const order: string[] = [];
      const reading = send(address, large).then(async (answer) => {
        order.push("read");
        return (await answer.json()) as { faults: unknown[] };
      });
      for (let asked = 0; asked < 20; asked += 1) {
        expect((await fetch(`${app.url}/livez`)).status).toBe(200);
        order.push("live");
      }
      expect((await reading).faults.length).toBeGreaterThan(0);
      expect(order.indexOf("read"), address).toBe(20);
    }
  }, 120_000);
});
