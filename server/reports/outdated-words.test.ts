import { describe, expect, it } from "vitest";
import { asFoundReadings } from "../demo/fellgate-job.ts";
import { writeFellgateJob } from "../../tests/support/job-record.ts";
import { tabulateReadings } from "./tables/reading-tables.ts";
import { moveSections } from "./pdf/sections/move-sections.ts";
import { conditionsSheet } from "./xlsx/conditions-sheet.ts";

describe("a job one of whose bores was read again after its plan", () => {
  const job = writeFellgateJob("planned");
  const [survey] = job.record().surveys;
  const [first] = asFoundReadings();
  if (!survey || !first) throw new Error("The demo has a survey.");
  const read = (takenAt: string) =>
    job.add("reading", { survey: survey.id, reading: { ...first, takenAt }, sourceFile: null });
  read("2026-11-05T08:00:00Z");
  const slip = read("2026-11-05T09:00:00Z");
  job.add("withdrawal", { entry: slip, reason: "Read at the wrong bore." });
  const record = job.record();

  it("says of each reading whether it counts, and why not, in the workbook and on paper", () => {
    const words = ["no, read again", "yes", "no, withdrawn"];
    const said = (cells: unknown) => words.filter((word) => JSON.stringify(cells).includes(`"${word}`));
    const [readAgain] = record.surveys;
    if (!readAgain) throw new Error("The job has a survey.");
    const rows = tabulateReadings(record, readAgain).rows.filter((row) =>
      JSON.stringify(row).includes(`"${first.station}"`),
    );
    // In the order in which they were taken: the opening reading, and the two after it.
    expect(rows.map(said)).toEqual([["no, read again"], ["yes"], ["no, withdrawn"]]);
    expect(said(conditionsSheet(record).rows)).toEqual(words);
  });

  it("says on paper that the plan is outdated, beside the deviations that it was made from", () => {
    const outdated = (of: typeof record) => JSON.stringify(moveSections(of)).includes("plan again.");
    expect([outdated(writeFellgateJob("planned").record()), outdated(record)]).toEqual([false, true]);
    expect(record.plans[0]?.from).toEqual(writeFellgateJob("planned").record().plans[0]?.from);
  });
});
