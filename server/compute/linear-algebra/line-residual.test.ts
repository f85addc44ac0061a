import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { lineResidual } from "./line-residual.ts";

/** A double as an exact fraction over 2^1074. */
function exact(value: number): bigint {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, value);
  const bits = view.getBigUint64(0);
  const exponent = Number((bits >> 52n) & 0x7ffn);
  const fraction = bits & 0xfffffffffffffn;
  const size = exponent === 0 ? fraction : (fraction | 0x10000000000000n) << BigInt(exponent - 1);
  return bits >> 63n ? -size : size;
}

const shift = 1074n;

/** y − at0 − slope·z without rounding, over 2^1074, cut below. */
function exactResidual(y: number, at0: number, slope: number, z: number): bigint {
  return exact(y) - exact(at0) - ((exact(slope) * exact(z)) >> shift);
}

describe("lineResidual", () => {
  it("keeps what plain arithmetic loses when the terms cancel", () => {
    // 0.1 × 3 is 0.3 + 2^-54 + …; the plain difference is 5.6e-17, the true one 2.8e-17
    expect(0.3 - 0 - 0.1 * 3).not.toBe(lineResidual(0.3, 0, 0.1, 3));
    expect(exact(lineResidual(0.3, 0, 0.1, 3))).toBe(exactResidual(0.3, 0, 0.1, 3));
  });

  it("is the exact residual rounded, to two units in its last place, over any cancellation", () => {
    const number = (limit: number) => fc.double({ min: -limit, max: limit, noNaN: true });
    fc.assert(
      fc.property(number(1e3), number(1), number(1e5), number(1e-9), (at0, slope, z, rest) => {
        const y = at0 + slope * z + rest;
        const wanted = exactResidual(y, at0, slope, z);
        const got = exact(lineResidual(y, at0, slope, z));
        const error = got > wanted ? got - wanted : wanted - got;
        const size = wanted < 0n ? -wanted : wanted;
        // Relative to the residual, or to the square of the working precision of the largest term.
        const floor = exact(1e5 * Number.EPSILON ** 2);
        expect(error <= (size >> 51n) + floor).toBe(true);
      }),
    );
  });
});
