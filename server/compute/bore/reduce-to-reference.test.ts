import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { ComputeError } from "../compute-error.ts";
import { reductionFactor, reductionRefusals, type Warmth } from "./reduce-to-reference.ts";

const warm = (expansionPerK: number, aboveReferenceK: number): Warmth => ({ expansionPerK, aboveReferenceK });
const warmth = fc
  .record({
    expansionPerK: fc.double({ min: -3e-5, max: 3e-5, noNaN: true }),
    aboveReferenceK: fc.double({ min: -200, max: 900, noNaN: true }),
  })
  .map(({ expansionPerK, aboveReferenceK }) => warm(expansionPerK, aboveReferenceK));

describe("reductionFactor", () => {
  it("takes a 500 mm steel rod read at 23.7 °C to 500.013 mm", () => {
    // National Physical Laboratory, frequently asked questions, "How do I correct lengths to 20 °C?": 500.035 mm read,
    // 11.7e-6 per °C, printed to three decimals.
    expect((500.035 * reductionFactor({ gauge: null, part: warm(11.7e-6, 3.7) })).toFixed(3)).toBe("500.013");
  });

  it("takes 0.36 mm off a 1200 mm steel bore at 45 °C", () => {
    // By hand: 12e-6 · 25 = 3e-4, of 1200 mm 0.36 mm.
    const at20Mm = 1200.36 * reductionFactor({ gauge: null, part: warm(12e-6, 25) });
    expect(Math.abs(at20Mm - 1200)).toBeLessThan(1e-9); // mm
  });

  it("finds the length of a gauge block by a standard of another temperature, by the relation of GUM H.1", () => {
    // JCGM 100:2008, H.1.1 (from memory): l(1 + αθ) = l_s(1 + α_s·θ_s) + d, here with d = 0. By hand, with 11.5e-6/K, the standard at −0.1 K and
    // the block at +0.4 K off 20 °C: 50.000623 · (1 − 1.15e-6)/(1 + 4.6e-6) = 50.000623 − 50.000623 · 5.75e-6 = 50.0003355.
    const factor = reductionFactor({ gauge: warm(11.5e-6, -0.1), part: warm(11.5e-6, 0.4) });
    expect(Math.abs(50.000623 * factor - 50.0003355)).toBeLessThan(1e-7); // mm
  });

  it("leaves a part read by a gauge as warm and as expanding, and anything at 20 °C", () => {
    fc.assert(
      fc.property(warmth, (both) => {
        expect(reductionFactor({ gauge: both, part: both })).toBe(1);
        expect(reductionFactor({ gauge: warm(both.expansionPerK, 0), part: null })).toBe(1);
      }),
    );
    expect(reductionFactor({ gauge: null, part: null })).toBe(1);
  });

  it("is undone by changing gauge and part, and is made of the two alone", () => {
    fc.assert(
      fc.property(warmth, warmth, (gauge, part) => {
        const both = reductionFactor({ gauge, part });
        expect(Math.abs(both * reductionFactor({ gauge: part, part: gauge }) - 1)).toBeLessThan(1e-15);
        const inTurn = reductionFactor({ gauge, part: null }) * reductionFactor({ gauge: null, part });
        expect(Math.abs(both - inTurn)).toBeLessThan(1e-15);
      }),
    );
  });

  it("refuses an expansion that no metal has, of each side by its name", () => {
    const refusals = reductionRefusals({ gauge: warm(1e-3, -60), part: warm(1e-3, 51) });
    expect(refusals.map(({ code, details }) => [code, details.at])).toEqual([
      ["out_of_range", ["gauge"]],
      ["out_of_range", ["part"]],
    ]);
    expect(() => reductionFactor({ gauge: null, part: warm(-1e-3, 1e5) })).toThrow(ComputeError);
    expect(reductionRefusals({ gauge: warm(1e-3, 50), part: warm(-1e-3, 50) })).toEqual([]);
  });
});
