import { describe, expect, it } from "vitest";
import { entry, details, survey, reading, result } from "../../tests/support/job-entries.ts";
import { readJobLog, standingOf } from "./job-log.ts";

describe("readJobLog", () => {
  it("counts of each station the latest reading taken, whatever the order of entry", () => {
    const late = reading("found", "cas-1", "2026-11-04T10:00:00Z", {}, "late");
    const early = reading("found", "cas-1", "2026-11-04T08:00:00Z", {}, "early");
    const [state] = readJobLog([details, survey("found", "as_found"), late, early]).surveys;
    expect([...(state?.counting ?? [])]).toEqual(["late"]);
  });

  it("keeps the closing reading beside the opening one", () => {
    const opening = reading("found", "brg-1", "2026-11-04T08:00:00Z", {}, "opening");
    const closing = reading("found", "brg-1", "2026-11-04T10:00:00Z", { closing: true }, "closing");
    const [state] = readJobLog([details, survey("found", "as_found"), opening, closing]).surveys;
    expect([...(state?.counting ?? [])].sort()).toEqual(["closing", "opening"]);
  });

  it("tells a reading that was taken back from one that was read again", () => {
    const at = (time: string, id: string) => reading("found", "cas-1", `2026-11-04T${time}:00Z`, {}, id);
    const taken = [at("08:00", "first"), at("09:00", "second"), at("10:00", "third")];
    const back = entry("withdrawal", { entry: "third", reason: "Wrong bore." });
    const [state] = readJobLog([details, survey("found", "as_found"), ...taken, back]).surveys;
    const standings = taken.map(({ id }) => state && standingOf(state, id));
    expect(standings).toEqual(["superseded", "in_use", "withdrawn"]);
  });

  it("falls back to the reading before when the latest is withdrawn, and calls the result outdated", () => {
    const first = reading("found", "cas-1", "2026-11-04T08:00:00Z", {}, "first");
    const second = reading("found", "cas-1", "2026-11-04T09:00:00Z", {}, "second");
    const entries = [details, survey("found", "as_found"), first, second, result("found", ["second"])];
    expect(readJobLog(entries).surveys[0]?.isCurrent).toBe(true);
    const withdrawn = [...entries, entry("withdrawal", { entry: "second", reason: "Wrong bore." })];
    const [state] = readJobLog(withdrawn).surveys;
    expect([...(state?.counting ?? [])]).toEqual(["first"]);
    expect(state?.isCurrent).toBe(false);
  });
});
