import { describe, expect, it } from "vitest";
import { withoutGap, type JobEvent } from "./watch-job.ts";

describe("withoutGap", () => {
  const event = (number: number): JobEvent => ({ number, type: "entry", data: "" });
  const numbers = (last: number, ...seen: number[]) =>
    withoutGap(last, seen.map(event)).map(({ number }) => number);

  it("puts the events of both tables in the order in which they were kept", () => {
    expect(numbers(4, 7, 5, 6)).toEqual([5, 6, 7]);
    expect(numbers(0)).toEqual([]);
  });

  it("lets a later event wait where one before it was not seen yet", () => {
    expect(numbers(4, 5, 7, 8)).toEqual([5]);
    expect(numbers(4, 6)).toEqual([]);
  });
});
