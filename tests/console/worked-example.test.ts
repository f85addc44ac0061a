import { describe, expect, it } from "vitest";
import { exampleOf, type AlignmentExample } from "../../console/src/features/guide/api/get-worked-example.ts";
import { decimalsAcross } from "../../shared/figures/write-number.ts";
import {
  checkAxis,
  checkDeviation,
  verdictInWords,
} from "../../console/src/features/guide/worked/work-axis.ts";
import { checkFit, gaugePoints } from "../../console/src/features/guide/worked/work-bore.ts";
import {
  checkPrediction,
  checkStacks,
  componentOf,
} from "../../console/src/features/guide/worked/work-moves.ts";
import { followExample } from "../../console/src/features/guide/worked/follow-example.ts";
import type { Check } from "../../console/src/features/guide/worked/check.ts";
import { document } from "./read-document.ts";

function documented(): AlignmentExample {
  const example = exampleOf(document as Parameters<typeof exampleOf>[0]);
  if (!example) throw new Error("The document has no call from readings to moves.");
  return example;
}
const example = documented();
const followed = followExample(example);
const decimals = decimalsAcross(example.request.units.offset);

/** Worked in the page from answered numbers, which are whole; what differs is rounding, mm. */
const within = 1e-9;
const wrong = (checks: readonly Check[]) =>
  checks.filter(({ here, answered }) => !(Math.abs(here - answered) <= within));

describe("the worked example", () => {
  it("is followed at the station that uses most of its tolerance, in every part", () => {
    expect(followed?.stationId).toBe(example.result.summary.worst?.id);
    const { points, fit, axis, deviation, verdict, prediction, stacks } = followed!;
    expect([points, fit, deviation, verdict, prediction, stacks]).not.toContain(null);
    expect(axis).toHaveLength(2);
  });

  it("comes by hand to every residual's scatter that the service answered, at the best centre", () => {
    const bore = example.request.bores[followed!.boreIndex]!;
    const points = gaugePoints(bore, example.request.units, example.request.seen);
    const checks = checkFit(points!, example.result.fits[followed!.boreIndex]!, decimals);
    expect(checks).toHaveLength(4);
    expect(wrong(checks)).toEqual([]);
    expect(checks[1]!.answered).toBeGreaterThan(0.001); // mm: the readings do scatter
  });

  it("comes by hand to the axis, the deviation and its uncertainty", () => {
    const { slopes, heights } = checkAxis(example, decimals);
    const deviation = checkDeviation(example, followed!.stationId, decimals);
    expect([slopes.length, heights.length, deviation.length]).toEqual([2, 2, 4]);
    // A slope is a million times smaller than an offset.
    expect(slopes.filter(({ here, answered }) => Math.abs(here - answered) > 1e-15)).toEqual([]);
    expect(wrong([...heights, ...deviation])).toEqual([]);
  });

  it("gives the verdict of the service in words with numbers", () => {
    const { verdict } = example.result.stations.find(({ id }) => id === followed!.stationId)!;
    expect(verdictInWords(example, followed!.stationId, decimals)).toMatch(new RegExp(`: ${verdict}\\.$`));
  });

  it("comes by hand to what each stack is asked, and to where the station is left", () => {
    const part = componentOf(example, followed!.stationId)!;
    const stacks = checkStacks(part, decimals);
    expect(stacks).toHaveLength(part.answered.stacks.length);
    expect(wrong(stacks)).toEqual([]);
    const left = checkPrediction(example, followed!.stationId, decimals);
    expect(left).toHaveLength(2);
    expect(wrong(left)).toEqual([]);
  });

  it("shows a number of the page that is not the service's", () => {
    const [station] = example.result.stations.filter(({ id }) => id === followed!.stationId);
    const falsified: AlignmentExample = structuredClone(example);
    const other = falsified.result.stations.find(({ id }) => id === station!.id)!;
    other.deviation.v += 0.001;
    expect(wrong(checkDeviation(falsified, station!.id, decimals)).map(({ what }) => what)).toEqual([
      "deviation in v",
    ]);
  });
});
