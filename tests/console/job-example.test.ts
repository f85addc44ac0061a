import { describe, expect, it } from "vitest";
import {
  jobExampleOf,
  type ConfirmationExample,
} from "../../console/src/features/guide/api/get-job-example.ts";
import type { Check } from "../../console/src/features/guide/worked/check.ts";
import {
  checkAchieved,
  checkAgreement,
  checkPlanned,
  checkReferences,
  openPoints,
  worstMoved,
} from "../../console/src/features/guide/worked/work-job.ts";
import { decimalsAcross } from "../../shared/figures/write-number.ts";
import { document } from "./read-document.ts";

function documented(): ConfirmationExample {
  const example = jobExampleOf(document as Parameters<typeof jobExampleOf>[0]);
  if (!example) throw new Error("The document has no confirmation of a survey with moves.");
  return example;
}
const example = documented();
const moved = worstMoved(example)!;
const decimals = decimalsAcross(example.request.units.offset);

/** Worked from the numbers sent, which are short; what differs is rounding. mm, or no unit. */
const within = 1e-9;
const wrong = (checks: readonly Check[]) =>
  checks.filter(({ here, answered }) => !(Math.abs(here - answered) <= within)).map(({ what }) => what);

describe("the job in numbers", () => {
  it("follows the station that did least as planned", () => {
    const statistics = example.result.moved.map(({ statistic }) => statistic ?? 0);
    expect(moved.statistic).toBe(Math.max(...statistics));
    expect(moved.agrees).toBe(false);
  });

  it("comes by hand to what was planned, achieved and left", () => {
    const [planned, achieved] = [
      checkPlanned(example, moved, decimals),
      checkAchieved(example, moved, decimals),
    ];
    expect([planned.length, achieved.length]).toEqual([2, 4]);
    expect(wrong([...planned, ...achieved])).toEqual([]);
  });

  it("comes by hand to the ratio, and to every statistic that the service tests by", () => {
    const [agreement, references] = [
      checkAgreement(example, moved, decimals),
      checkReferences(example, decimals),
    ];
    expect([agreement.length, references.length]).toEqual([2, example.request.reference?.length]);
    expect(wrong([...agreement, ...references])).toEqual([]);
  });

  it("shows a number of the page that is not the service's", () => {
    const falsified = structuredClone(example);
    const other = falsified.request.after.stations.find(({ id }) => id === moved.id)!;
    other.centre.v += 0.001;
    expect(wrong(checkAchieved(falsified, moved, decimals))).toEqual(["achieved v"]);
  });

  it("names what is open: what was not measured again, and what does not conform", () => {
    const verdicts = example.result.verdicts.filter(
      ({ verdict }) => verdict !== null && verdict !== "conforms",
    );
    expect(openPoints(example)).toHaveLength(example.result.outstanding.length + verdicts.length);
    const bad = structuredClone(example);
    bad.result.reference.repeats = null;
    bad.result.outstanding.unshift("brg-1");
    expect(openPoints(bad).map(({ code }) => code)).toEqual([
      "reference_not_remeasured",
      ...example.result.outstanding.map(() => "station_not_remeasured"),
      "reference_repeat_unknown",
      ...verdicts.map(() => "station_does_not_conform"),
    ]);
  });
});
