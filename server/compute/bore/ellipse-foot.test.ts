import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { distanceByLooking } from "../../../tests/support/ellipse-oracle.ts";
import { footOnEllipse } from "./ellipse-foot.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

describe("footOnEllipse", () => {
  it("is the nearest of all points of the ellipse, inside and outside, on the axes and far off", () => {
    const lengths = fc.oneof(
      fc.constantFrom(0, 1, 2, 3.9, 4.1, 1e3),
      fc.double({ min: -6, max: 6, noNaN: true }),
    );
    fc.assert(
      fc.property(fc.double({ min: 0.05, max: 4, noNaN: true }), lengths, lengths, (b, x, y) => {
        const foot = new Float64Array(2);
        const away = footOnEllipse(4, b, x, y, foot);
        near((foot[0]! / 4) ** 2 + (foot[1]! / b) ** 2, 1, 1e-9);
        near(Math.hypot(x - foot[0]!, y - foot[1]!), Math.abs(away), 1e-12 * (1 + Math.abs(away)));
        near(Math.abs(away), distanceByLooking([0, 0, 4, b, 0], [x, y]), 1e-7);
        const outside = (x / 4) ** 2 + (y / b) ** 2;
        if (Math.abs(outside - 1) > 1e-9) expect(Math.sign(away)).toBe(outside > 1 ? 1 : -1);
      }),
    );
  });
});
