import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import { sightLineResult, type SightLineResult } from "../../shared/schemas/sight-line-answers.ts";
import { sightLineSetupRequest, type SightLineSetupRequest } from "../../shared/schemas/sight-line-setups.ts";
import { sightRequest as base } from "../../tests/support/sight-line-requests.ts";
import { ComputeError } from "../compute/compute-error.ts";
import { CalculationRefusal } from "./calculation-kind.ts";
import { sightLineSetupKind } from "./sight-line-setup.ts";

const answer = (request: SightLineSetupRequest): SightLineResult =>
  sightLineSetupKind.answer(sightLineSetupRequest.parse(request)).result;
const codes = ({ warnings }: SightLineResult) => warnings.map(({ code }) => code);
function placesOf(request: SightLineSetupRequest): string[] {
  try {
    sightLineSetupKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return places(error.faults);
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`).sort();
const { sightPath: _air, drift: _drift, adjuster: _adjuster, ...plain } = base;

/** The numbers of both in the same order of members, and everything else equal. */
function near(got: unknown, wanted: unknown, scale: (path: string) => number, path = ""): void {
  if (typeof wanted === "number" && typeof got === "number") {
    expect(Math.abs(got * scale(path) - wanted), path).toBeLessThan(1e-9);
  } else if (typeof wanted === "object" && wanted !== null && typeof got === "object" && got !== null) {
    expect(Object.keys(got), path).toEqual(Object.keys(wanted));
    for (const [name, inner] of Object.entries(wanted)) {
      near((got as Record<string, unknown>)[name], inner, scale, `${path}/${name}`);
    }
  } else {
    expect(got, path).toEqual(wanted);
  }
}

describe("sightLineSetupKind.answer", () => {
  it("says what each support moves, where the beam then runs, and what to do next", () => {
    const found = answer({ ...plain, adjuster: base.adjuster });
    // By hand: off by (0.8, −1.2) and (−2.5, 1.8); tilt (0.8 + 2.5)/8000 = 0.0004125 and (−1.2 − 1.8)/8000 = −0.000375.
    const { shift, tilt, tiltMilliradians, moves } = found.adjustment!;
    const expected: [number, number][] = [
      [tilt.h, 0.0004125],
      [tilt.v, -0.000375],
      [tiltMilliradians.h, 0.4125],
      [shift.h, -0.8 - 0.0004125 * 2000],
      [shift.v, 1.2 + 0.000375 * 2000],
      [moves![0]!.h, -0.8 - 0.0004125 * 1900],
      [moves![1]!.v, 1.2 + 0.000375 * 2300],
      [found.stations[1]!.off.h, -2.5],
      [found.stations[1]!.off.v, 1.8],
      [found.stations[1]!.after!.beam.v, 0.2],
      [found.stations[1]!.after!.distance, 0],
    ];
    for (const [got, wanted] of expected) expect(Math.abs(got - wanted)).toBeLessThan(1e-7);
    expect(moves!.map(({ at, z }) => [at, z])).toEqual([
      ["front", -1900],
      ["rear", -2300],
    ]);
    expect(found).toMatchObject({ repeat: true, next: "adjust_and_read_again", warnings: [] });
    expect("drift" in found || "bend" in found).toBe(false);
  });

  it("answers the shift at a pivot, and no moves without an adjuster", () => {
    const { adjustment } = answer({ ...plain, adjuster: { kind: "shift_and_tilt", z: -2000 } });
    expect(adjustment!.moves).toEqual([{ at: "pivot", z: -2000, ...adjustment!.shift }]);
    expect(answer(plain).adjustment!.moves).toBeNull();
  });

  it("shares a drift out over the second reading, or refuses the survey and answers no move", () => {
    const { drift, stations } = answer(base);
    expect(drift).toMatchObject({ within: true, verdict: "shared_out", allowed: 0.06 });
    expect(drift!.corrections.map(({ id }) => id)).toEqual(["brg-1", "brg-2"]);
    expect(Math.abs(drift!.corrections[1]!.h + 0.015)).toBeLessThan(1e-12); // mm
    expect(Math.abs(stations[1]!.beam.v - 2.02)).toBeLessThan(1e-12); // mm
    const refused = answer({ ...base, drift: { ...base.drift!, allowed: 0.04 } });
    expect(refused).toMatchObject({ adjustment: null, repeat: true, next: "read_again" });
    expect(refused.drift).toMatchObject({ within: false, verdict: "refused", corrections: [] });
    expect(codes(refused)).toContain("drift_refused");
  });

  it("bends the beam by the gradient across it, per metre with C and per foot with F", () => {
    const bend = answer({ ...base, sourceZ: -2000, sightPath: { gradient: { h: 1, v: 0 } } }).bend!;
    // By hand: ½ · 10² m² · 0.93e-6 = 46.5e-6 m at 10 m, a twenty-fifth of it at 2 m.
    expect(Math.abs(bend.h + 0.0465)).toBeLessThan(1e-12); // mm
    expect(Math.abs(bend.stations[0]!.h + 0.00186)).toBeLessThan(1e-12); // mm
    expect(bend.length).toBe(10_000);
    const inFahrenheit = answer({
      ...base,
      units: { ...base.units, temperature: "F" },
      sightPath: { gradient: { h: 1.8 * 0.3048, v: 0 } },
    }).bend!;
    expect(Math.abs(inFahrenheit.h - bend.h)).toBeLessThan(1e-15); // mm
  });

  it("is the same of readings taken from the other end, of negated spots, and of one station turned alone", () => {
    const mirror = ({ h, v }: { h: number; v: number }) => ({ h: -h, v });
    const [first, second] = base.stations;
    const turnedFirst = { ...first!, spot: mirror(first!.spot) };
    const turnedSecond = {
      ...second!,
      spot: mirror(second!.spot),
      expected: mirror(second!.expected!),
    };
    const drift = { ...base.drift!, closing: mirror(base.drift!.closing) };
    const upstream = answer({
      ...base,
      seen: "upstream",
      stations: [turnedFirst, turnedSecond],
      sightPath: { gradient: { h: -0.1, v: 0.5 } },
      drift,
    });
    expect(upstream).toEqual(answer(base));
    const mixed = answer({ ...base, stations: [{ ...turnedFirst, seen: "upstream" }, second!], drift });
    expect(mixed).toEqual(answer(base));
    const negate = ({ h, v }: { h: number; v: number }) => ({ h: -h, v: -v });
    const fromSpot = answer({
      ...base,
      sense: "target_from_spot",
      stations: base.stations.map((station) => ({ ...station, spot: negate(station.spot) })),
      drift: { ...base.drift!, closing: negate(base.drift!.closing) },
    });
    expect(fromSpot).toEqual(answer(base));
  });

  it("says the same in other units", () => {
    const [mil, inch] = [0.0254, 25.4];
    const pair = ({ h, v }: { h: number; v: number }) => ({ h: h / mil, v: v / mil });
    const other = answer({
      ...base,
      units: { axial: "in", bore: "in", offset: "mil", temperature: "C" },
      sourceZ: base.sourceZ / inch,
      stations: base.stations.map(({ id, z, spot, expected }) => ({
        id,
        z: z / inch,
        spot: pair(spot),
        expected: pair(expected ?? { h: 0, v: 0 }),
      })),
      wanted: base.wanted / mil,
      readingUncertainty: 0.02 / mil,
      adjuster: {
        kind: "two_supports",
        supports: [
          { id: "front", z: -1900 / inch },
          { id: "rear", z: -2300 / inch },
        ],
      },
      drift: { closing: pair(base.drift!.closing), allowed: 0.06 / mil, shareOut: true },
    });
    near(other, answer(base), (path) => {
      if (/clockDeg|amplification|Milliradians/.test(path)) return 1;
      if (/\/(z|length)$/.test(path)) return inch;
      return /\/tilt\//.test(path) ? mil / inch : mil;
    });
  });
});

describe("the warnings of a line of sight", () => {
  const at = (rest: Partial<SightLineSetupRequest>) => codes(answer({ ...plain, ...rest }));
  const [first, second] = base.stations;

  it("tell a source between the stations, stations close together, and a tilt that is none", () => {
    expect(at({ sourceZ: 4000 })).toEqual(["source_inside_stations"]);
    // a = 6, √(6² + 5²) = 7.8 for a source five spans away; 3.6 for one two spans away.
    expect(at({ sourceZ: -40_000 })).toEqual(["stations_close_together"]);
    expect(at({ sourceZ: -16_000 })).toEqual([]);
    expect(at({ stations: [{ ...first!, spot: { h: 401, v: 0 } }, second!] })).toEqual(["tilt_not_small"]);
  });

  it("tell a distance wanted that no reading can show, and air that bends more than a spot is uncertain", () => {
    // 2.4477 · 0.041 = 0.1004.
    expect(at({ readingUncertainty: 0.041 })).toEqual(["wanted_below_guard"]);
    expect(at({ readingUncertainty: 0.0408 })).toEqual([]);
    expect(at({ sightPath: { gradient: { h: 0, v: 0.5 } } })).toEqual(["bend_exceeds_uncertainty"]);
    expect(at({ sightPath: { gradient: { h: 0, v: 0.4 } } })).toEqual([]);
    expect(at({ sightPath: { gradient: { h: 0, v: 9 } }, readingUncertainty: null })).toEqual([]);
  });
});

describe("the faults of a line of sight", () => {
  const supports = [
    { id: "foot", z: -1900 },
    { id: "foot", z: -1900 },
  ];
  const faulty: SightLineSetupRequest = {
    ...base,
    units: { axial: "mm", bore: "mm", offset: "mm" },
    stations: [base.stations[0]!, { ...base.stations[0]!, spot: { h: 0, v: 0 } }],
    adjuster: { kind: "two_supports", supports },
  };
  const expected = [
    "/adjuster/supports/1/id duplicate_id",
    "/adjuster/supports/1/z combination_invalid",
    "/stations/1/id duplicate_id",
    "/stations/1/z stations_coincident",
    "/units/temperature units_missing",
  ];

  it("are all named at once, each at its place", () => {
    expect(placesOf(faulty)).toEqual(expected);
  });

  it("are named beside faults of the schema too", () => {
    const body = { ...faulty, seen: "sideways", wanted: -1 };
    expect(places(sightLineSetupKind.faultsBesideSchema!(body, []))).toEqual(expected);
    for (const broken of [
      null,
      3,
      [],
      { stations: {} },
      { stations: [1, null], units: "mm", sightPath: 5 },
    ]) {
      expect(sightLineSetupKind.faultsBesideSchema!(broken, [])).toEqual([]);
    }
  });
});

describe("a hostile line of sight", () => {
  const number = (max: number) =>
    fc.oneof(fc.constantFrom(0, -0, 1e-300, max, -max, 5e-324), fc.double({ min: -max, max, noNaN: true }));
  const pair = fc.record({ h: number(1e9), v: number(1e9) });
  const positive = (max: number) => fc.double({ min: 1e-12, max, noNaN: true });
  const request = fc.record({
    units: fc.record({
      axial: fc.constantFrom("mm", "m", "in", "ft"),
      bore: fc.constant("mm"),
      offset: fc.constantFrom("mm", "um", "in", "mil"),
      temperature: fc.constantFrom("C", "F"),
    }),
    seen: fc.constantFrom("downstream", "upstream"),
    sense: fc.constantFrom("spot_on_target", "target_from_spot"),
    level: fc.double({ min: 0.5, max: 1, noNaN: true, minExcluded: true, maxExcluded: true }),
    sourceZ: number(1e10),
    stations: fc.tuple(
      fc.record({ id: fc.constant("a"), z: number(1e10), spot: pair }),
      fc.record({ id: fc.constant("b"), z: number(1e10), spot: pair, expected: pair }),
    ),
    wanted: positive(1e9),
    readingUncertainty: positive(1e9),
    adjuster: fc.record({ kind: fc.constant("shift_and_tilt"), z: number(1e10) }),
    sightPath: fc.record({
      gradient: fc.record({ h: number(1e4), v: number(1e4) }),
      length: fc.double({ min: 1e-6, max: 1e10, noNaN: true }),
    }),
    drift: fc.record({ closing: pair, allowed: positive(1e9), shareOut: fc.boolean() }),
  });

  it("is answered in the schema's shape with finite numbers only, or refused with a code", () => {
    let answered = 0;
    fc.assert(
      fc.property(request, (sent) => {
        const parsed = sightLineSetupRequest.parse(sent);
        try {
          const { result } = sightLineSetupKind.answer(parsed);
          // zod refuses NaN and infinities.
          expect(sightLineResult.safeParse(result).success).toBe(true);
          expect(JSON.parse(JSON.stringify(result))).toEqual(result);
          answered += 1;
        } catch (error) {
          const refused =
            error instanceof CalculationRefusal ? error.faults.map(({ code }) => code) : [codeOf(error)];
          expect(["stations_coincident", "result_overflow"]).toEqual(expect.arrayContaining(refused));
        }
      }),
      { numRuns: 500 },
    );
    expect(answered).toBeGreaterThan(200);
  });
});

function codeOf(error: unknown): string {
  if (error instanceof ComputeError) return error.code;
  throw error;
}
