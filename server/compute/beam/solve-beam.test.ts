import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bendByBrackets, bendByFiniteElements } from "../../../tests/support/beam-oracles.ts";
import { beams, reach, stepped } from "../../../tests/support/beam-samples.ts";
import { ComputeError } from "../compute-error.ts";
import { stateAt } from "./beam.ts";
import type { BeamInput } from "./beam-input.ts";
import { solveBeam } from "./solve-beam.ts";

/** Within a share of the larger of a value and a size. */
const near = (got: number, wanted: number, share = 1e-12, size = 0) =>
  expect(Math.abs(got - wanted), `${got} for ${wanted}`).toBeLessThanOrEqual(
    share * Math.max(Math.abs(wanted), size),
  );

const even = (lengthMm: number, stiffnessNmm2: number, loadNPerMm: number) => ({
  lengthMm,
  stiffnessNmm2,
  loadNPerMm,
});
const level = (...places: number[]) => places.map((zMm) => ({ zMm, upMm: 0 }));
const simple: BeamInput = { startMm: 0, pieces: [even(1000, 1e12, 4)], loads: [], supports: level(0, 1000) };

describe("solveBeam, against closed forms of handbooks (Roark; AISC Manual, table 3-23)", () => {
  it("bends an evenly loaded span by 5wL⁴/384EI, its ends by wL³/24EI", () => {
    const beam = solveBeam(simple);
    near(stateAt(beam, 500).upMm, (-5 * 4 * 1000 ** 4) / (384 * 1e12));
    near(stateAt(beam, 500).momentNmm, (4 * 1000 ** 2) / 8);
    near(beam.supports[0]!.slope, (-4 * 1000 ** 3) / (24 * 1e12));
    near(beam.supports[1]!.slope, (4 * 1000 ** 3) / (24 * 1e12));
    expect(beam.supports.map(({ reactionN }) => reactionN)).toEqual([2000, 2000]);
  });

  it("bends an off-centre force by Pa²b²/3EIL beneath it", () => {
    const pieces = [even(1000, 1e12, 0)];
    const beam = solveBeam({ ...simple, pieces, loads: [{ zMm: 300, downN: 5000 }] });
    near(stateAt(beam, 300).upMm, (-5000 * 300 ** 2 * 700 ** 2) / (3 * 1e12 * 1000));
    near(beam.supports[0]!.reactionN, 3500);
    near(stateAt(beam, 300).momentNmm, 3500 * 300);
  });

  it("bends an overhang's tip by Pa²(L + a)/3EI", () => {
    const pieces = [even(1300, 1e12, 0)];
    const beam = solveBeam({ ...simple, pieces, loads: [{ zMm: 1300, downN: 700 }] });
    near(stateAt(beam, 1300).upMm, (-700 * 300 ** 2 * 1300) / (3 * 1e12));
    near(beam.supports[1]!.momentNmm, -700 * 300);
    near(beam.supports[0]!.reactionN, (-700 * 300) / 1000);
    near(beam.supports[1]!.reactionN, (700 * 1300) / 1000);
  });

  it("bends two even spans by wL⁴/184.6EI, with 3/8, 10/8, 3/8 of wL at the supports", () => {
    const beam = solveBeam({ ...simple, pieces: [even(2000, 1e12, 4)], supports: level(0, 1000, 2000) });
    near(beam.supports[0]!.reactionN, (3 / 8) * 4000);
    near(beam.supports[1]!.reactionN, (10 / 8) * 4000);
    near(beam.supports[1]!.momentNmm, (-4 * 1000 ** 2) / 8);
    near(stateAt(beam, 421.5351654086268).upMm, (-0.0054161216058287295 * 4 * 1000 ** 4) / 1e12, 1e-12);
  });

  it("bends a weightless beam on a raised middle support as a force of 48EIδ/L³ would", () => {
    const pieces = [even(2000, 1e12, 0)];
    const supports = [...level(0, 2000), { zMm: 1000, upMm: 0.3 }];
    const beam = solveBeam({ ...simple, pieces, supports });
    near(beam.supports[2]!.reactionN, (48 * 1e12 * 0.3) / 2000 ** 3);
    near(stateAt(beam, 500).upMm, (0.3 * 11) / 16);
  });

  it("leaves a weightless beam on two supports straight, carried on beyond them", () => {
    const supports = [
      { zMm: 800, upMm: 0.5 },
      { zMm: 200, upMm: -0.1 },
    ];
    const beam = solveBeam({ ...simple, pieces: [even(1000, 1e12, 0)], supports });
    for (const zMm of [0, 137, 200, 500, 800, 1000])
      near(stateAt(beam, zMm).upMm, -0.3 + zMm / 1000, 1e-14, 1);
    expect(beam.supports.map(({ reactionN }) => Math.abs(reactionN))).toEqual([0, 0]);
  });

  it("keeps twelve digits over 500 pieces, where stiffness matrices of as many elements lose eight", () => {
    const pieces = Array.from({ length: 500 }, () => even(2, 1e12, 4));
    near(stateAt(solveBeam({ ...simple, pieces }), 500).upMm, (-5 * 4 * 1000 ** 4) / (384 * 1e12), 1e-12);
  });

  it("holds a beam on 500 supports: wl²/12 over those within", () => {
    const supports = level(...Array.from({ length: 500 }, (_, i) => i * 10));
    const beam = solveBeam({ ...simple, pieces: [even(4990, 1e12, 4)], supports });
    near(beam.supports[250]!.momentNmm, (-4 * 10 ** 2) / 12, 1e-12);
    expect(beam.closure).toBeLessThan(1e-12);
  });
});

describe("solveBeam, against other methods", () => {
  it("agrees with Hermite finite elements on any stepped beam", () => {
    fc.assert(
      fc.property(stepped, (input) => {
        const beam = solveBeam(input);
        const size = Math.max(1, reach(beam));
        for (const { zMm, upMm, slope } of bendByFiniteElements(input)) {
          near(stateAt(beam, zMm).upMm, upMm, 1e-8, size);
          near(stateAt(beam, zMm).slope, slope, 1e-8, size / 50);
        }
        expect(beam.closure).toBeLessThan(1e-12);
      }),
      { numRuns: 300 },
    );
  });

  it("agrees with Macaulay's brackets on any even beam", () => {
    fc.assert(
      fc.property(beams(fc.constant(2e13), 1), (input) => {
        const beam = solveBeam(input);
        const { reactionsN, upMm } = bendByBrackets(input);
        const size = Math.max(1, reach(beam));
        const force = Math.max(1, ...reactionsN.map(Math.abs));
        beam.supports.forEach(({ reactionN }, i) => near(reactionN, reactionsN[i]!, 1e-8, force));
        const lengthMm = input.pieces[0]!.lengthMm;
        for (let i = 0; i <= 7; i++) {
          const zMm = -300 + (i * lengthMm) / 7;
          near(stateAt(beam, zMm).upMm, upMm(zMm), 1e-8, size);
        }
      }),
      { numRuns: 300 },
    );
  });
});

describe("solveBeam, what cannot be bent", () => {
  const codeOf = (input: Partial<BeamInput>): string => {
    try {
      solveBeam({ ...simple, ...input });
    } catch (error) {
      if (error instanceof ComputeError) return error.code;
      throw error;
    }
    return "bent";
  };

  it("refuses a beam on fewer than two supports apart", () => {
    for (const places of [[], [0], [500], [500, 500], [0, 1e-8], [0, 1000, 1000]]) {
      expect(codeOf({ supports: level(...places) })).toBe("shaft_unsupported");
    }
    expect(codeOf({ supports: level(0, 1) })).toBe("bent");
  });

  it("refuses places beyond its ends, but for what rounding puts there", () => {
    expect(codeOf({ supports: level(-1e-3, 1000) })).toBe("out_of_range");
    expect(codeOf({ loads: [{ zMm: 1001, downN: 1 }] })).toBe("out_of_range");
    expect(codeOf({ loads: [{ zMm: NaN, downN: 1 }] })).toBe("out_of_range");
    expect(codeOf({ supports: level(-1e-7, 1000 + 1e-7), loads: [{ zMm: 1000 + 1e-7, downN: 1 }] })).toBe(
      "bent",
    );
  });

  it("refuses what no number holds", () => {
    expect(codeOf({ pieces: [even(1000, 1e-300, 1e300)] })).toBe("result_overflow");
    expect(codeOf({ loads: [{ zMm: 500, downN: Infinity }] })).toBe("result_overflow");
    expect(codeOf({ pieces: [even(1000, 1e-300, 0), even(10, 1, 1e308)], supports: level(0, 500) })).toBe(
      "result_overflow",
    );
  });

  it("bends any stiffnesses however far apart, or says that it cannot", () => {
    const far = beams(
      fc.double({ min: -30, max: 30, noNaN: true }).map((power) => 10 ** power),
      6,
    );
    const seen = new Set<string>();
    fc.assert(
      fc.property(far, (input) => {
        const code = codeOf(input);
        seen.add(code);
        if (code === "bent") {
          const beam = solveBeam(input);
          expect(beam.closure).toBeLessThan(1e-9);
          expect(beam.elements.every(({ upMm, slope }) => Number.isFinite(upMm + slope))).toBe(true);
        } else {
          expect(["not_converged", "rank_deficient"]).toContain(code);
        }
      }),
      { numRuns: 500 },
    );
    expect(seen).toContain("bent");
  });
});
