import { describe, expect, it } from "vitest";
import { axisInput, stationAt, stationsOnLine } from "../../../tests/support/axis-stations.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";
import { publishedLines, type PrintedFigure } from "./published-cases.ts";

function expectPrinted(got: number | undefined, printed: PrintedFigure | undefined): void {
  if (printed) expect(Math.abs(got! - printed.value)).toBeLessThan(printed.within);
}

describe("deviationsFromAxis against published lines", () => {
  for (const line of publishedLines) {
    it(`gives the printed figures of ${line.source}, in both planes`, () => {
      const { x, y, u, predicted } = line;
      const stations = [...stationsOnLine(x, y, u), stationAt(predicted?.x ?? 0, 0, 0)];
      const reference = x.map((_, index) => index);
      const { axis, stations: found } = deviationsFromAxis(axisInput("least_squares", reference, stations));
      for (const plane of ["h", "v"] as const) {
        const sign = plane === "h" ? 1 : -1;
        const covariance = axis.covariance![plane];
        const uAt0 = Math.sqrt(covariance[0][0]);
        const uSlope = Math.sqrt(covariance[1][1]);
        expectPrinted(sign * axis[plane].at0Mm, line.at0);
        expectPrinted(sign * axis[plane].slope, line.slope);
        expectPrinted(uAt0, line.uAt0);
        expectPrinted(uSlope, line.uSlope);
        expectPrinted(covariance[0][1], line.covariance);
        expectPrinted(covariance[0][1] / uAt0 / uSlope, line.correlation);
        expectPrinted(axis.chiSquare?.[plane], line.chiSquare);
        expectPrinted(axis.scatterMm?.[plane], line.scatter);
        if (!predicted) continue;
        // The last station reads 0 there: its deviation is minus the line, its variance s² more than the line's.
        const last = found.at(-1)!;
        expectPrinted(-sign * last.deviation[plane === "h" ? "hMm" : "vMm"], predicted.y);
        const ofDeviation = last.covariance![plane === "h" ? "hhMm2" : "vvMm2"];
        expectPrinted(Math.sqrt(ofDeviation - axis.scatterMm![plane] ** 2), predicted.u);
      }
    });
  }
});
