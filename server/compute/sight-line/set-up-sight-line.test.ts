import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { ComputeError } from "../compute-error.ts";
import { radialMm, type PlaneVector } from "../plane.ts";
import { setUpSightLine } from "./set-up-sight-line.ts";
import type { SightLineInput } from "./sight-line-input.ts";

const pair = (hMm: number, vMm: number): PlaneVector => ({ hMm, vMm });
const zero = pair(0, 0);

/** A source 2 m upstream of the first bore; all numbers of the test by hand from these. */
const base: SightLineInput = {
  sourceZMm: -2000,
  stations: [
    { zMm: 0, beam: pair(0.8, -1.2), expected: zero },
    { zMm: 8000, beam: pair(-2.4, 2), expected: zero },
  ],
  wantedMm: 0.1,
  uncertaintyMm: null,
  level: 0.95,
  closing: null,
  adjusterZMm: [-1900, -2300],
};
const closing = (hMm: number, vMm: number, shareOut = false) => ({
  beam: pair(hMm, vMm),
  allowedMm: 0.055,
  shareOut,
});
const near = (got: PlaneVector, hMm: number, vMm: number, withinMm = 1e-12) => {
  expect(Math.abs(got.hMm - hMm)).toBeLessThan(withinMm); // mm
  expect(Math.abs(got.vMm - vMm)).toBeLessThan(withinMm); // mm
};

describe("setUpSightLine", () => {
  it("shifts and tilts the source so that the beam goes through both centres", () => {
    const { move, amplification, next, stations, sourceInside } = setUpSightLine(base);
    // By hand: the beam must move by (−0.8, 1.2) at 0 and (2.4, −2) at 8000, so by 3.2/8000 and −3.2/8000 per mm of z.
    expect(Math.abs(move!.tilt.h - 4e-4)).toBeLessThan(1e-18);
    expect(Math.abs(move!.tilt.v + 4e-4)).toBeLessThan(1e-18);
    near(move!.shift, -0.8 - 2000 * 4e-4, 1.2 + 2000 * 4e-4);
    near(move!.at[0]!, -1.56, 1.96);
    near(move!.at[1]!, -1.72, 2.12);
    // a = 10000/8000 = 1.25, √(1.25² + 0.25²).
    expect(Math.abs(amplification - Math.sqrt(1.625))).toBeLessThan(1e-15);
    expect([next, sourceInside]).toEqual(["adjust_and_read_again", false]);
    expect(stations.map(({ role, within, after }) => [role, within, after!.within])).toEqual([
      ["near", false, true],
      ["far", false, true],
    ]);
  });

  it("judges the distance with its guard, on its border to the last micrometre", () => {
    // k₂ = 2.4477 at 0.95 (χ² of two degrees of freedom, 5.9915): 0.02 · 2.4477 = 0.04895.
    const at = (hMm: number, uncertaintyMm: number | null) =>
      setUpSightLine({
        ...base,
        uncertaintyMm,
        stations: [
          { zMm: 0, beam: pair(hMm, 0), expected: zero },
          { zMm: 8000, beam: zero, expected: zero },
        ],
      });
    expect(at(0.1, null).next).toBe("go_on");
    expect(at(0.1001, null).next).toBe("adjust_and_read_again");
    expect(at(0.051, 0.02).next).toBe("go_on");
    expect(at(0.0511, 0.02).next).toBe("adjust_and_read_again");
    expect(Math.abs(at(0, 0.02).guardMm! - 0.02 * Math.sqrt(5.991464547))).toBeLessThan(1e-11); // mm
  });

  it("leads the beam past a centre where it is wanted there", () => {
    const [first, second] = base.stations;
    const expected = pair(0.3, -0.5);
    const { move, stations } = setUpSightLine({ ...base, stations: [{ ...first, expected }, second] });
    near(stations[0].after!.beam, 0.3, -0.5);
    near(stations[1].after!.beam, 0, 0);
    expect(Math.abs(move!.tilt.h - (2.4 - (0.3 - 0.8)) / 8000)).toBeLessThan(1e-18);
  });

  it("calls the station nearer to the source the near one, in whichever order they were read", () => {
    const [first, second] = base.stations;
    const turned = setUpSightLine({ ...base, stations: [second, first] });
    expect(turned.stations.map(({ role }) => role)).toEqual(["far", "near"]);
    expect(setUpSightLine({ ...base, sourceZMm: 9000 }).stations.map(({ role }) => role)).toEqual([
      "far",
      "near",
    ]);
    near(turned.move!.shift, -1.6, 2);
  });

  it.each([
    [4000, true],
    [0, true],
    [8000, true],
    [8001, false],
    [-1, false],
  ])("tells a source at %d between the stations: %s", (sourceZMm, inside) => {
    expect(setUpSightLine({ ...base, sourceZMm }).sourceInside).toBe(inside);
  });

  it("accepts a drift that is allowed, shares it out when asked, and refuses the survey beyond", () => {
    const accepted = setUpSightLine({ ...base, closing: closing(0.83, -1.24) });
    expect(accepted.drift).toMatchObject({ within: true, verdict: "accepted" });
    near(accepted.drift!.change, 0.03, -0.04);
    near(accepted.move!.shift, -1.6, 2);

    // The second reading was half-way: (−2.4, 2) less half of (0.03, −0.04).
    const shared = setUpSightLine({ ...base, closing: closing(0.83, -1.24, true) });
    expect(shared.drift!.verdict).toBe("shared_out");
    near(shared.stations[0].beam, 0.8, -1.2);
    near(shared.stations[1].beam, -2.415, 2.02);

    for (const shareOut of [false, true]) {
      const refused = setUpSightLine({ ...base, closing: closing(0.84, -1.25, shareOut) });
      expect(refused).toMatchObject({ move: null, next: "read_again", drift: { verdict: "refused" } });
      expect(refused.stations.map(({ after }) => after)).toEqual([null, null]);
    }
  });

  it("refuses two stations at one z, and a tilt that no number can hold", () => {
    const [first, second] = base.stations;
    const at = (zMm: number) => () => setUpSightLine({ ...base, stations: [first, { ...second, zMm }] });
    expect(at(0)).toThrow(ComputeError);
    expect(at(0)).toThrow("stand at different z");
    expect(at(1e-320)).toThrow("not a finite number");
  });
});

describe("a line of sight that is built and moved", () => {
  const coordinate = fc.double({ min: -20_000, max: 20_000, noNaN: true });
  const offset = fc.double({ min: -5, max: 5, noNaN: true });
  const vector = fc.tuple(offset, offset).map(([h, v]) => pair(h, v));
  const machine = fc
    .record({ sourceZMm: coordinate, z1: coordinate, z2: coordinate, front: coordinate, rear: coordinate })
    .filter(({ z1, z2, front, rear }) => Math.abs(z1 - z2) > 500 && Math.abs(front - rear) > 100);

  it("passes where it is wanted after its two supports are moved as answered", () => {
    fc.assert(
      fc.property(
        machine,
        fc.tuple(vector, vector, vector, vector),
        ({ sourceZMm, z1, z2, front, rear }, [a, b, centre1, centre2]) => {
          // The beam as points in space at the two supports; bores with centres of their own.
          const beamAt = (f: PlaneVector, r: PlaneVector, z: number): PlaneVector => {
            const share = (z - front) / (rear - front);
            return pair(f.hMm + share * (r.hMm - f.hMm), f.vMm + share * (r.vMm - f.vMm));
          };
          const less = (p: PlaneVector, q: PlaneVector) => pair(p.hMm - q.hMm, p.vMm - q.vMm);
          const expected = pair(0.2, -0.1);
          const scale = Math.abs(front - rear);
          const { move } = setUpSightLine({
            ...base,
            sourceZMm,
            adjusterZMm: [front, rear],
            stations: [
              { zMm: z1, beam: less(beamAt(a, b, z1), centre1), expected },
              { zMm: z2, beam: less(beamAt(a, b, z2), centre2), expected: zero },
            ],
          });
          const plus = (p: PlaneVector, q: PlaneVector) => pair(p.hMm + q.hMm, p.vMm + q.vMm);
          const [f, r] = [plus(a, move!.at[0]!), plus(b, move!.at[1]!)];
          const at1 = less(beamAt(f, r, z1), plus(centre1, expected));
          const at2 = less(beamAt(f, r, z2), centre2);
          // Rounding grows with how far the stations are from the supports, in spans of these.
          const slack = 1e-11 * (1 + 40_000 / scale) ** 2;
          expect(radialMm(at1)).toBeLessThan(slack); // mm
          expect(radialMm(at2)).toBeLessThan(slack); // mm
        },
      ),
    );
  });

  it("moves its source the same wherever z begins, and turned with the cross-section", () => {
    fc.assert(
      fc.property(machine, vector, vector, fc.integer({ min: -9, max: 9 }), (places, one, two, metres) => {
        const of = (by: number, turn: (v: PlaneVector) => PlaneVector) =>
          setUpSightLine({
            ...base,
            sourceZMm: places.sourceZMm + by,
            adjusterZMm: [],
            stations: [
              { zMm: places.z1 + by, beam: turn(one), expected: zero },
              { zMm: places.z2 + by, beam: turn(two), expected: zero },
            ],
          });
        const quarter = ({ hMm, vMm }: PlaneVector) => pair(vMm, -hMm);
        const plain = of(0, (v) => v);
        const turned = of(1000 * metres, quarter);
        const { hMm, vMm } = quarter(plain.move!.shift);
        near(turned.move!.shift, hMm, vMm, 1e-8);
        expect(Math.abs(turned.amplification / plain.amplification - 1)).toBeLessThan(1e-9);
      }),
    );
  });
});

describe("the amplification", () => {
  it("is the scatter of the shift at the source over that of the spots", () => {
    // Seeded Monte Carlo: 40,000 pairs of readings; the standard deviation is known to 1/√(2n) = 0.4 %.
    const shifts: number[] = [];
    const random = seededRandom(5);
    for (let i = 0; i < 40_000; i += 1) {
      const { move } = setUpSightLine({
        ...base,
        sourceZMm: -5000,
        stations: [
          { zMm: 0, beam: pair(random.normal(), 0), expected: zero },
          { zMm: 1000, beam: pair(random.normal(), 0), expected: zero },
        ],
      });
      shifts.push(move!.shift.hMm);
    }
    const sd = Math.sqrt(shifts.reduce((sum, shift) => sum + shift * shift, 0) / shifts.length);
    const { amplification } = setUpSightLine({
      ...base,
      sourceZMm: -5000,
      stations: [base.stations[0], { ...base.stations[1], zMm: 1000 }],
    });
    expect(Math.abs(amplification - Math.sqrt(61))).toBeLessThan(1e-12);
    expect(Math.abs(sd / amplification - 1)).toBeLessThan(0.015);
  });
});
