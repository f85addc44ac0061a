import { describe, expect, it } from "vitest";
import { fitLine } from "./fit-line.ts";
import { leastSquaresGains, twoStationGains } from "./line-gains.ts";

describe("fitLine", () => {
  // Powers of two: heights and products are exact in binary, so that the line put in is the line to be found.
  const at0Mm = 3 * 2 ** -10;
  const slope = 2 ** -20;
  const z = [0, 1, 3, 4, 9].map((step) => 2 ** 30 + step * 1024);
  const y = z.map((along) => at0Mm + slope * along);

  it("finds at0 and slope to their last bits a million metres from the stations", () => {
    const line = fitLine(leastSquaresGains(z, [1, 2, 3, 4, 5]), z, y);
    expect(Math.abs(line.at0Mm - at0Mm)).toBeLessThanOrEqual(2 ** -61);
    expect(Math.abs(line.slope - slope)).toBeLessThanOrEqual(2 ** -73);
  });

  it("does so through two stations as well", () => {
    const line = fitLine(twoStationGains(z[0]!, z[4]!), [z[0]!, z[4]!], [y[0]!, y[4]!]);
    expect(Math.abs(line.at0Mm - at0Mm)).toBeLessThanOrEqual(2 ** -61);
    expect(Math.abs(line.slope - slope)).toBeLessThanOrEqual(2 ** -73);
  });
});
