import fc from "fast-check";
import type { Beam } from "../../server/compute/beam/beam.ts";
import type { BeamInput } from "../../server/compute/beam/beam-input.ts";

/** Greatest height that a beam takes above or below level, at a hundred places. */
export const reach = ({ elements }: Beam) => Math.max(...elements.map(({ upMm }) => Math.abs(upMm)), 1e-300);

const whole = fc.integer({ min: 1, max: 40 }).map((n) => n * 50);
/** Any beam of up to `pieceCount` pieces with forces, overhangs and two to five supports. */
export const beams = (stiffness: fc.Arbitrary<number>, pieceCount: number): fc.Arbitrary<BeamInput> =>
  fc
    .array(
      fc.record({
        lengthMm: whole,
        stiffnessNmm2: stiffness,
        loadNPerMm: fc.double({ min: 0, max: 6, noNaN: true }),
      }),
      { minLength: 1, maxLength: pieceCount },
    )
    .chain((pieces) => {
      const lengthMm = pieces.reduce((sum, piece) => sum + piece.lengthMm, 0);
      const place = fc.integer({ min: 0, max: lengthMm / 10 }).map((n) => n * 10 - 300);
      return fc.record({
        startMm: fc.constant(-300),
        pieces: fc.constant(pieces),
        loads: fc.array(fc.record({ zMm: place, downN: fc.double({ min: 0, max: 9e3, noNaN: true }) }), {
          maxLength: 4,
        }),
        supports: fc.uniqueArray(
          fc.record({ zMm: place, upMm: fc.double({ min: -1, max: 1, noNaN: true }) }),
          { minLength: 2, maxLength: 5, selector: ({ zMm }) => zMm },
        ),
      });
    });
/** Stiffnesses a hundredfold apart, as in a shaft. */
export const stepped = beams(
  fc.double({ min: 12, max: 14, noNaN: true }).map((power) => 10 ** power),
  6,
);
