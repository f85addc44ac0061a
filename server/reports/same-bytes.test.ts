import { createHash } from "node:crypto";
import { afterEach, describe, expect, it, vi } from "vitest";
import { farApartJob, hostileJob, oneStationJob } from "../../tests/support/hostile-job.ts";
import { fellgateReport, writeFellgateJob } from "../../tests/support/job-record.ts";
import { runProgram } from "../../tests/support/run-program.ts";
import { reportFormats } from "./index.ts";

const sha256 = (bytes: Buffer) => createHash("sha256").update(bytes).digest("hex");

describe("the same record is the same bytes", () => {
  afterEach(() => vi.useRealTimers());

  it("on another day and in another zone, in a process of its own", async () => {
    const { record, context } = fellgateReport({ signed: true });
    const here = await Promise.all(
      reportFormats.map(
        async ({ extension, write }) => `${extension} ${sha256(await write(record, context))}`,
      ),
    );
    const { code, stdout, stderr } = await runProgram(
      ["node", "--import", "tsx", "tests/support/report-in-zone.ts"],
      { TZ: "Pacific/Chatham", LC_ALL: "tr_TR.UTF-8" },
    );
    expect(stderr).toBe("");
    expect(code).toBe(0);
    expect(stdout.trim().split("\n")).toEqual(here);
  }, 60_000);

  describe.each(reportFormats.map((format) => [format.extension, format] as const))("%s", (_, { write }) => {
    it.each([
      ["a job just begun", () => writeFellgateJob("started")],
      ["one survey alone", () => writeFellgateJob("found")],
      ["one station", oneStationJob],
      ["stations two million kilometres apart", farApartJob],
      ["names that are traps, in inches and mils", hostileJob],
    ])(
      "of %s, twice, a year apart",
      async (_words, begin) => {
        const job = begin();
        const [record, context] = [job.record(), job.context()];
        vi.useFakeTimers({ toFake: ["Date"], now: new Date("2026-03-29T00:30:00Z") });
        const first = await write(record, context);
        vi.setSystemTime(new Date("2027-07-01T23:59:59Z"));
        const again = await write(record, context);
        expect(first.length).toBeGreaterThan(500);
        expect(again.equals(first)).toBe(true);
      },
      30_000,
    );
  });
});
