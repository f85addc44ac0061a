import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { reach, stepped } from "../../../tests/support/beam-samples.ts";
import { stateAt } from "./beam.ts";
import type { BeamInput } from "./beam-input.ts";
import { solveBeam } from "./solve-beam.ts";

/** Within a share of the larger of a value and a size. */
const near = (got: number, wanted: number, share = 1e-12, size = 0) =>
  expect(Math.abs(got - wanted), `${got} for ${wanted}`).toBeLessThanOrEqual(
    share * Math.max(Math.abs(wanted), size),
  );

const even: BeamInput = {
  startMm: 0,
  pieces: [{ lengthMm: 1000, stiffnessNmm2: 1e12, loadNPerMm: 4 }],
  loads: [],
  supports: [
    { zMm: 0, upMm: 0 },
    { zMm: 1000, upMm: 0 },
  ],
};

describe("solveBeam, properties", () => {
  it("carries all weight and all moment of it", () => {
    fc.assert(
      fc.property(stepped, (input) => {
        const { supports } = solveBeam(input);
        const loads = [...input.loads];
        let fromMm = input.startMm;
        for (const { lengthMm, loadNPerMm } of input.pieces) {
          loads.push({ zMm: fromMm + lengthMm / 2, downN: loadNPerMm * lengthMm });
          fromMm += lengthMm;
        }
        const forces = supports.map(({ reactionN }) => Math.abs(reactionN));
        const size = Math.max(1, ...forces, ...loads.map(({ downN }) => downN));
        const arm = (weigh: (zMm: number) => number) =>
          supports.reduce((sum, one) => sum + one.reactionN * weigh(one.zMm), 0) -
          loads.reduce((sum, one) => sum + one.downN * weigh(one.zMm), 0);
        near(
          arm(() => 1),
          0,
          1e-12,
          size,
        );
        near(
          arm((zMm) => zMm),
          0,
          1e-12,
          size * (fromMm - input.startMm + 300),
        );
      }),
    );
  });

  it("adds: two sets of loads and heights together bend as their sum", () => {
    fc.assert(
      fc.property(stepped, fc.double({ min: -3, max: 3, noNaN: true }), (input, share) => {
        const part = (factor: number): BeamInput => ({
          ...input,
          pieces: input.pieces.map((one) => ({ ...one, loadNPerMm: one.loadNPerMm * factor })),
          loads: input.loads.map((one) => ({ ...one, downN: one.downN * factor })),
          supports: input.supports.map((one) => ({ ...one, upMm: one.upMm * factor })),
        });
        const [all, some, rest] = [solveBeam(input), solveBeam(part(share)), solveBeam(part(1 - share))];
        for (const { fromMm } of all.elements) {
          const sum = stateAt(some, fromMm).upMm + stateAt(rest, fromMm).upMm;
          near(sum, stateAt(all, fromMm).upMm, 1e-10, 10 * Math.max(1, reach(all)));
        }
      }),
    );
  });

  it("mirrors: the reversed beam bends the reversed way, whatever the order of supports", () => {
    fc.assert(
      fc.property(stepped, (input) => {
        const lengthMm = input.pieces.reduce((sum, one) => sum + one.lengthMm, 0);
        const flip = <Placed extends { readonly zMm: number }>(one: Placed) => ({
          ...one,
          zMm: 2 * input.startMm + lengthMm - one.zMm,
        });
        const beam = solveBeam(input);
        const mirrored = solveBeam({
          startMm: input.startMm,
          pieces: [...input.pieces].reverse(),
          loads: input.loads.map(flip),
          supports: input.supports.map(flip),
        });
        const size = Math.max(1, reach(beam));
        for (const element of beam.elements) {
          const { upMm, slope } = stateAt(mirrored, flip({ zMm: element.fromMm }).zMm);
          near(upMm, element.upMm, 1e-10, size);
          near(-slope, element.slope, 1e-10, size / 50);
        }
        beam.supports.forEach(({ reactionN }, i) =>
          near(mirrored.supports[i]!.reactionN, reactionN, 1e-8, 1e4),
        );
      }),
    );
  });

  it("scales: f times the size under the same even loads and stiffness bends f⁴ times as far", () => {
    fc.assert(
      fc.property(stepped, fc.double({ min: 1e-3, max: 1e3, noNaN: true }), (input, factor) => {
        const beam = solveBeam(input);
        const scaled = solveBeam({
          startMm: input.startMm * factor,
          pieces: input.pieces.map((one) => ({ ...one, lengthMm: one.lengthMm * factor })),
          loads: input.loads.map(({ zMm, downN }) => ({ zMm: zMm * factor, downN: downN * factor })),
          supports: input.supports.map(({ zMm, upMm }) => ({ zMm: zMm * factor, upMm: upMm * factor ** 4 })),
        });
        const size = Math.max(1, reach(beam));
        for (const { fromMm, upMm } of beam.elements)
          near(stateAt(scaled, fromMm * factor).upMm / factor ** 4, upMm, 1e-9, size);
      }),
    );
  });

  it("is reciprocal: a force at a lowers b as far as the same force at b lowers a (Maxwell 1864)", () => {
    fc.assert(
      fc.property(stepped, fc.nat(), fc.nat(), (input, first, second) => {
        const bare = {
          ...input,
          pieces: input.pieces.map((one) => ({ ...one, loadNPerMm: 0 })),
          supports: input.supports.map(({ zMm }) => ({ zMm, upMm: 0 })),
        };
        const lengthMm = input.pieces.reduce((sum, one) => sum + one.lengthMm, 0);
        const [a, b] = [first, second].map((n) => input.startMm + (n % (lengthMm + 1)));
        const lowered = (at: number, by: number) =>
          stateAt(solveBeam({ ...bare, loads: [{ zMm: by, downN: 1000 }] }), at).upMm;
        const sizes = [lowered(a!, a!), lowered(b!, b!)].map(Math.abs);
        near(lowered(a!, b!), lowered(b!, a!), 1e-9, Math.max(...sizes, 1e-12));
      }),
    );
  });

  it("does not mind into how many pieces an even stretch is cut, nor the order of loads", () => {
    fc.assert(
      fc.property(stepped, fc.integer({ min: 2, max: 7 }), (input, parts) => {
        const cut = input.pieces.flatMap((one) =>
          Array.from({ length: parts }, () => ({ ...one, lengthMm: one.lengthMm / parts })),
        );
        const beam = solveBeam(input);
        const other = solveBeam({ ...input, pieces: cut, loads: [...input.loads].reverse() });
        for (const { fromMm, upMm } of beam.elements)
          near(stateAt(other, fromMm).upMm, upMm, 1e-10, Math.max(1, reach(beam)));
      }),
    );
  });

  it("leaves its input as it was", () => {
    const input = structuredClone({ ...even, loads: [{ zMm: 400, downN: 10 }] });
    for (const list of [input.pieces, input.loads, input.supports]) list.forEach(Object.freeze);
    solveBeam(Object.freeze(input));
    expect(input).toEqual({ ...even, loads: [{ zMm: 400, downN: 10 }] });
  });
});
