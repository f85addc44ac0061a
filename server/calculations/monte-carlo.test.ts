import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import { alignmentRequest, alignmentResult, type AlignmentRequest } from "../../shared/schemas/alignments.ts";
import {
  axisDeviationRequest,
  axisDeviationResult,
  type AxisDeviationRequest,
} from "../../shared/schemas/axis-deviations.ts";
import { boreFitRequest, boreFitResult, type BoreFitRequest } from "../../shared/schemas/bore-fits.ts";
import type { MonteCarloFigure, MonteCarloRequest } from "../../shared/schemas/monte-carlo.ts";
import { asFoundMm } from "../../tests/support/axis-requests.ts";
import { everyFormMm, pointsBore, wireBore } from "../../tests/support/bore-requests.ts";
import { alignmentKind } from "./alignment.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { boreFitKind } from "./bore-fit.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

const few: MonteCarloRequest = { trials: 1_000, seed: 3 };
const fitsOf = (request: BoreFitRequest) => boreFitKind.answer(request).result.bores;
const stationsOf = (request: AxisDeviationRequest) => axisDeviationKind.answer(request).result.stations;
const wire = <Value>(value: Value): Value => JSON.parse(JSON.stringify(value)) as Value;
const example = (path: string): unknown =>
  JSON.parse(readFileSync(new URL(`../../examples/requests/${path}`, import.meta.url), "utf8"));

function placesOf(run: () => unknown): string[] {
  try {
    run();
  } catch (error) {
    if (error instanceof CalculationRefusal) return places(error.faults);
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`);

describe("monteCarlo of a bore fit", () => {
  it("adds to every form what its trials say, and changes nothing else", () => {
    const plain = fitsOf(everyFormMm);
    const found = fitsOf({ ...everyFormMm, monteCarlo: few });
    for (const [index, { monteCarlo, ...rest }] of found.entries()) {
      expect(rest).toEqual(plain[index]);
      expect(monteCarlo).toMatchObject({ trials: 1_000, seed: 3, failed: 0 });
      expect(boreFitResult.parse(found[index])).toEqual(found[index]);
      expect(monteCarlo!.diameter === null).toBe(rest.diameter === null);
    }
    expect(plain.some((fit) => "monteCarlo" in fit)).toBe(false);
  });

  it("confirms a whole ring of points with a hundred thousand trials", () => {
    const ring = { ...pointsBore, outliers: null };
    const [fit] = fitsOf({ ...everyFormMm, bores: [ring], monteCarlo: { trials: 100_000, seed: 1 } });
    const { monteCarlo, expandedUncertainty, diameter } = fit!;
    expect(monteCarlo).toMatchObject({ confirmed: true, warnings: [] });
    // The diameter itself in bore units, what it is known to in offset units: here both are mm.
    const [low, high] = monteCarlo!.diameter!.interval!;
    expect(Math.abs((low! + high!) / 2 - diameter!)).toBeLessThan(0.02 * expandedUncertainty!.diameter!);
  });

  it("does not confirm the inscribed circle of the example, and confirms the least squares beside it", () => {
    const request = boreFitRequest.parse(example("bore-fits/monte-carlo-of-two-criteria.json"));
    const [ring, inscribed] = fitsOf(request);
    expect(ring!.monteCarlo).toMatchObject({ confirmed: true, warnings: [] });
    expect(inscribed!.monteCarlo!.confirmed).toBe(false);
    expect(inscribed!.monteCarlo!.warnings[0]!.code).toBe("first_order_not_confirmed");
  });

  it("gives each bore the same bytes in any order and company, and others for another seed", () => {
    const { bores } = everyFormMm;
    const first = fitsOf({ ...everyFormMm, monteCarlo: few });
    const turned = fitsOf({ ...everyFormMm, bores: [...bores].reverse(), monteCarlo: few });
    expect(JSON.stringify([...turned].reverse())).toBe(JSON.stringify(first));
    const [alone] = fitsOf({ ...everyFormMm, bores: [bores[2]!], monteCarlo: few });
    expect(JSON.stringify(alone)).toBe(JSON.stringify(first[2]));
    const reseeded = fitsOf({ ...everyFormMm, monteCarlo: { ...few, seed: 4 } });
    for (const [index, { monteCarlo }] of reseeded.entries()) {
      expect(monteCarlo!.h!.mean).not.toBe(first[index]!.monteCarlo!.h!.mean);
    }
  });

  it("judges by the digits of the unit asked in, and finds the same place in any unit", () => {
    const mm = fitsOf({ ...everyFormMm, bores: [wireBore], monteCarlo: few })[0]!.monteCarlo!;
    const um = fitsOf({
      ...everyFormMm,
      units: { axial: "mm", bore: "mm", offset: "um" },
      bores: [{ ...wireBore, readingUncertainty: 10, wire: { ...wireBore.wire, sag: 110 } }],
      monteCarlo: few,
    })[0]!.monteCarlo!;
    const near = (a: number | null, b: number | null) => expect(Math.abs(a! / b! - 1)).toBeLessThan(1e-6);
    near(um.h!.standardUncertainty! / 1_000, mm.h!.standardUncertainty);
    near(um.v!.interval![0]! / 1_000, mm.v!.interval![0]!);
    near(um.diameter!.interval![1]!, mm.diameter!.interval![1]!);
    near(um.diameter!.tolerance / 1_000, mm.diameter!.tolerance);
  });

  it("says that there is nothing to confirm where no uncertainty is known", () => {
    const three = { ...pointsBore, readingUncertainty: null, outliers: null };
    const bores = [{ ...three, points: three.points.filter((_, i) => i % 4 === 0) }];
    const [fit] = fitsOf({ ...everyFormMm, bores, monteCarlo: few });
    expect(fit!.monteCarlo).toMatchObject({ h: null, v: null, diameter: null, confirmed: null });
    expect(fit!.monteCarlo!.warnings.map(({ code }) => code)).toEqual(["uncertainty_unknown"]);
  });

  it("says that readings put aside stay aside, that trials failed, and that they are too few to tell", () => {
    const slipped = pointsBore.points.map((one, i) => (i === 4 ? { ...one, v: one.v + 3 } : one));
    const flat = [176, 177, 178, 179, 180, 181, 182].map((deg) => ({
      h: 180 * Math.sin((deg * Math.PI) / 180),
      v: 180 * Math.cos((deg * Math.PI) / 180),
    }));
    const bores = [
      { ...pointsBore, points: slipped },
      { ...pointsBore, id: "flat", points: flat, readingUncertainty: 0.3, outliers: null },
    ];
    const [held, thin] = fitsOf({ ...everyFormMm, bores, monteCarlo: few });
    expect(held!.monteCarlo!.warnings.map(({ code }) => code)).toContain("exclusions_held");
    expect(thin!.monteCarlo!.failed).toBeGreaterThan(0);
    const codes = thin!.monteCarlo!.warnings.map(({ code }) => code);
    expect(codes).toContain("trials_failed");
    expect(held!.monteCarlo!.confirmed === null).toBe(
      held!.monteCarlo!.warnings.some(({ code }) => code === "trials_too_few"),
    );
  });
});

describe("monteCarlo of axis deviations", () => {
  it("adds to every station what its trials say, and changes nothing else", () => {
    const plain = stationsOf(asFoundMm);
    const { result } = axisDeviationKind.answer({ ...asFoundMm, monteCarlo: few });
    expect(axisDeviationResult.parse(result)).toEqual(result);
    for (const [index, { monteCarlo, ...rest }] of result.stations.entries()) {
      expect(rest).toEqual(plain[index]);
      expect(monteCarlo).toMatchObject({ trials: 1_000, seed: 3, failed: 0 });
      expect(monteCarlo!.h!.interval![0]!).toBeLessThan(rest.deviation.h);
      expect(monteCarlo!.h!.interval![1]!).toBeGreaterThan(rest.deviation.h);
    }
    expect(plain.some((station) => "monteCarlo" in station)).toBe(false);
  });

  it("refutes intervals of centres from few readings, as in the example", () => {
    const request = axisDeviationRequest.parse(example("axis-deviations/monte-carlo-of-few-readings.json"));
    const stations = stationsOf(request);
    const confirmed = stations.map(({ monteCarlo }) => monteCarlo!.confirmed);
    expect(confirmed).toContain(false);
    for (const { monteCarlo, deviation, expandedUncertainty } of stations) {
      const exact = ({ h }: { h: number }) => h === 0;
      if (exact(deviation)) continue;
      const width = ({ interval }: MonteCarloFigure) => interval![1]! - interval![0]!;
      expect(width(monteCarlo!.h!)).toBeGreaterThan(2 * expandedUncertainty!.h);
    }
  });

  it("gives each station the same bytes in any order of the stations", () => {
    const first = stationsOf({ ...asFoundMm, monteCarlo: few });
    const stations = [...asFoundMm.stations].reverse();
    const turned = stationsOf({ ...asFoundMm, stations, monteCarlo: few });
    expect(JSON.stringify([...turned].reverse())).toBe(JSON.stringify(first));
  });

  it("says that there is nothing to confirm where no uncertainty is known", () => {
    const stations = asFoundMm.stations.map(({ covariance: _covariance, ...rest }) => rest);
    const axis = { method: "two_station" as const, through: ["brg-1", "brg-2"] };
    for (const { monteCarlo } of stationsOf({ ...asFoundMm, axis, stations, monteCarlo: few })) {
      expect(monteCarlo).toMatchObject({ h: null, v: null, confirmed: null });
      expect(monteCarlo!.warnings.map(({ code }) => code)).toEqual(["uncertainty_unknown"]);
    }
  });
});

describe("monteCarlo of an alignment", () => {
  const base = alignmentRequest.parse(example("alignments/gauge-readings-to-shims.json"));
  const request: AlignmentRequest = { ...base, monteCarlo: few };

  it("equals what the single endpoints answer in turn, to the last bit", () => {
    const { result } = wire(alignmentKind.answer(request));
    expect(alignmentResult.parse(result)).toEqual(result);
    const { units, seen, level = 0.95 } = request;
    const bores = request.bores.map(({ station: _station, ...bore }) => bore);
    const fits = wire(fitsOf({ units, seen, level, bores, monteCarlo: few }));
    expect(result.fits).toEqual(fits);
    const stations = request.stations.map((station) => {
      const fit = fits[request.bores.findIndex((bore) => bore.station === station.id)]!;
      const { centre, covariance, expandedUncertainty } = fit;
      return { ...station, centre, covariance, dof: expandedUncertainty!.dof };
    });
    const single = { units, level, axis: request.axis, stations, monteCarlo: few };
    expect(result.stations).toEqual(wire(stationsOf(single)));
    expect(result.stations.every(({ monteCarlo }) => monteCarlo?.trials === 1_000)).toBe(true);
    // The moves know nothing of the trials.
    expect(result.moves).toEqual(wire(alignmentKind.answer(base)).result.moves);
  });

  it("names a fault of the trials once", () => {
    const asked = { ...request, level: 0.999, monteCarlo: few };
    expect(placesOf(() => alignmentKind.answer(asked))).toEqual(["/monteCarlo/trials out_of_range"]);
  });
});

describe("the faults of monteCarlo", () => {
  const asking = (monteCarlo: unknown) => boreFitRequest.safeParse({ ...everyFormMm, monteCarlo });

  it.each([
    { trials: 999, seed: 1 },
    { trials: 200_001, seed: 1 },
    { trials: 1_000.5, seed: 1 },
    { trials: 1_000, seed: -1 },
    { trials: 1_000, seed: 2 ** 32 },
    { trials: 1_000 },
    { seed: 1 },
    { trials: 1_000, seed: 1, significantDigits: 3 },
    { trials: 1_000, seed: 1, draws: 5 },
    null,
  ])("%j breaks the schema", (monteCarlo) => {
    expect(asking(monteCarlo).success).toBe(false);
  });

  it("names too few trials for the level beside the faults of bores", () => {
    const bores = [{ ...pointsBore, points: pointsBore.points.slice(0, 2) }];
    const request = { ...everyFormMm, level: 0.99, bores, monteCarlo: few };
    expect(placesOf(() => boreFitKind.answer(request))).toEqual([
      "/bores/0/points too_few_points",
      "/monteCarlo/trials out_of_range",
    ]);
    const level95 = {
      ...everyFormMm,
      level: 0.95,
      bores: [pointsBore],
      monteCarlo: { trials: 1_000, seed: 0 },
    };
    expect(placesOf(() => boreFitKind.answer(level95))).toEqual([]);
  });

  it("names more work than a call takes, and how many trials it would take", () => {
    const bores = Array.from({ length: 40 }, (_, i) => ({
      ...pointsBore,
      id: `b${i}`,
      method: "minimum_zone" as const,
    }));
    const request = { ...everyFormMm, bores, monteCarlo: { trials: 200_000, seed: 1 } };
    let allowed: unknown;
    try {
      boreFitKind.answer(request);
    } catch (error) {
      allowed = (error as CalculationRefusal).faults[0]!.allowed;
    }
    // 40 bores of 12 points: 8,000 + 50 · 12 each
    expect(allowed).toEqual({ max: Math.floor(30_000_000 / (40 * 8_600)) });
    const through = asFoundMm.stations.map(({ id }) => id);
    const searched = { ...asFoundMm, axis: { method: "minimum_zone" as const, through } };
    expect(
      placesOf(() => axisDeviationKind.answer({ ...searched, monteCarlo: { trials: 200_000, seed: 1 } })),
    ).toEqual(["/monteCarlo/trials call_too_large"]);
  });

  it("names too few trials beside a body that failed its schema elsewhere", () => {
    const body = { ...everyFormMm, level: 0.999, seen: "sideways", monteCarlo: few };
    const expected = "/monteCarlo/trials out_of_range";
    expect(places(boreFitKind.faultsBesideSchema!(body, []))).toContain(expected);
    const axis = { ...asFoundMm, level: 0.999, units: {}, monteCarlo: few };
    expect(places(axisDeviationKind.faultsBesideSchema!(axis, []))).toContain(expected);
  });

  it("computes off the main thread whatever asks for trials", () => {
    expect(boreFitKind.isLong!({ ...everyFormMm, monteCarlo: few })).toBe(true);
    expect(axisDeviationKind.isLong!({ ...asFoundMm, monteCarlo: few })).toBe(true);
    expect(boreFitKind.isLong!(everyFormMm)).toBe(false);
    expect(axisDeviationKind.isLong!(asFoundMm)).toBe(false);
  });
});
