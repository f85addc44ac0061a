import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import {
  boreFitRequest,
  boreFitResult,
  type BoreFitRequest,
  type BoreFitResult,
  type BoreRequest,
} from "../../shared/schemas/bore-fits.ts";
import { unitChoices, type Units } from "../../shared/units.ts";
import {
  everyFormMm,
  gaugeBore,
  pointsBore,
  targetBore,
  taperBore,
  wireBore,
} from "../../tests/support/bore-requests.ts";
import { boreFitKind } from "./bore-fit.ts";

const bores = (request: BoreFitRequest) => boreFitKind.answer(request).result.bores;
const one = (bore: BoreRequest, rest: Partial<BoreFitRequest> = {}) =>
  bores({ ...everyFormMm, ...rest, bores: [bore] })[0]!;

/** Exact by definition (international inch, 1959), stated here so that the service's own table is not its own witness. */
const millimetresPer = { mm: 1, um: 0.001, m: 1000, in: 25.4, mil: 0.0254, ft: 304.8 };
/** Which unit each member of a bore is stated in; what is not named here has none. */
const dimensionOf: Record<string, keyof Units> = {
  h: "bore",
  v: "bore",
  nominalDiameter: "bore",
  left: "bore",
  right: "bore",
  bottom: "bore",
  top: "bore",
  wireDiameter: "bore",
  z: "axial",
  u: "offset",
  readingUncertainty: "offset",
  reading: "offset",
  gaugeSag: "offset",
  sag: "offset",
};

/** The same bores in other units. The spots of a target, unlike points, are read in offset units. */
function inUnits(request: BoreFitRequest, units: Units): BoreFitRequest {
  const convert = (value: unknown, key: string, spots: boolean): unknown => {
    if (Array.isArray(value)) return value.map((item) => convert(item, key, spots || key === "spots"));
    if (typeof value === "object" && value !== null) {
      return Object.fromEntries(
        Object.entries(value).map(([name, inner]) => [name, convert(inner, name, spots)]),
      );
    }
    const dimension = spots && (key === "h" || key === "v") ? "offset" : dimensionOf[key];
    return typeof value === "number" && dimension ? value / millimetresPer[units[dimension]] : value;
  };
  return { ...request, units, bores: convert(request.bores, "bores", false) as BoreRequest[] };
}

const near = (
  got: number | null | undefined,
  wanted: number | null | undefined,
  within = 1e-9 * Math.abs(wanted ?? 0),
) =>
  wanted === null || wanted === undefined
    ? expect(got).toBe(wanted)
    : expect(Math.abs((got ?? NaN) - wanted)).toBeLessThanOrEqual(within + 1e-15);

function expectSameInMm(got: BoreFitResult, units: Units, wanted: BoreFitResult): void {
  const offset = millimetresPer[units.offset];
  const perAxial = offset / millimetresPer[units.axial];
  const inMm = (value: number | null | undefined, factor: number) =>
    value === null || value === undefined ? value : value * factor;
  const flat = (one: BoreFitResult) =>
    one.residuals.flatMap((residual) => (typeof residual === "number" ? residual : [residual.h, residual.v]));
  near(inMm(got.centre.h, offset), wanted.centre.h, 1e-9);
  near(inMm(got.centre.v, offset), wanted.centre.v, 1e-9);
  near(inMm(got.diameter, millimetresPer[units.bore]), wanted.diameter);
  near(inMm(got.roundness, offset), wanted.roundness, 1e-9);
  flat(got).forEach((residual, i) => near(residual * offset, flat(wanted)[i], 1e-9));
  wanted.covariance?.flat().forEach((cell, i) => near(got.covariance!.flat()[i]! * offset ** 2, cell, 1e-11));
  for (const key of ["h", "v", "diameter"] as const) {
    near(inMm(got.expandedUncertainty?.[key], offset), wanted.expandedUncertainty?.[key], 1e-7);
  }
  near(got.expandedUncertainty?.k, wanted.expandedUncertainty?.k, 1e-7);
  near(inMm(got.tilt?.h, perAxial), wanted.tilt?.h, 1e-10);
  near(inMm(got.tilt?.v, perAxial), wanted.tilt?.v, 1e-10);
  near(got.taper?.halfAngleDeg, wanted.taper?.halfAngleDeg, 1e-9);
  near(inMm(got.statistics.rms, offset), wanted.statistics.rms, 1e-9);
  near(got.statistics.chiSquare, wanted.statistics.chiSquare, 1e-6);
  near(got.statistics.dilution, wanted.statistics.dilution);
  near(got.arc?.coverageDeg, wanted.arc?.coverageDeg, 1e-9);
  expect(got.warnings.map(({ code }) => code)).toEqual(wanted.warnings.map(({ code }) => code));
  expect([got.used, got.exclusions.map(({ index }) => index)]).toEqual([
    wanted.used,
    wanted.exclusions.map(({ index }) => index),
  ]);
}

describe("boreFitKind.answer", () => {
  it("answers every form in the order sent, in the shape of its schema and the view downstream", () => {
    expect(boreFitRequest.parse(everyFormMm)).toEqual(everyFormMm);
    const { units, seen, level, result } = boreFitKind.answer(everyFormMm);
    expect({ units, seen, level }).toEqual({ units: everyFormMm.units, seen: "downstream", level: 0.95 });
    expect(result.bores.map((bore) => boreFitResult.parse(bore))).toEqual(result.bores);
    expect(result.bores.map(({ id, form }) => [id, form])).toEqual(
      everyFormMm.bores.map(({ id, form }) => [id, form]),
    );
    expect(
      result.bores.every(
        ({ method, ellipse, contacts }) => method === "least_squares" && !ellipse && !contacts,
      ),
    ).toBe(true);
  });

  it.each(
    unitChoices.axial.flatMap((axial) =>
      unitChoices.bore.flatMap((bore) => unitChoices.offset.map((offset) => ({ axial, bore, offset }))),
    ),
  )("gives the same bores in $axial, $bore and $offset", (units) => {
    const wanted = bores(everyFormMm);
    bores(inUnits(everyFormMm, units)).forEach((bore, i) => expectSameInMm(bore, units, wanted[i]!));
  });

  it("turns what was read looking upstream, whether the call or the bore says so", () => {
    for (const bore of [pointsBore, taperBore, gaugeBore, targetBore, wireBore]) {
      const { seen: _, ...unsaid } = bore;
      const up = one({ ...unsaid, seen: "upstream" });
      expect(one(unsaid, { seen: "upstream" })).toEqual(up);
      expect(one({ ...unsaid, seen: "upstream" }, { seen: "upstream" })).toEqual(up);
      const down = one({ ...unsaid, seen: "downstream" }, { seen: "upstream" });
      expect(down).toEqual(one(unsaid));
      near(up.centre.h, -down.centre.h, 1e-9);
      near(up.centre.v, down.centre.v, 1e-9);
      expect(Math.abs(down.centre.h)).toBeGreaterThan(0.01);
    }
  });

  it("takes null for absent in every optional member", () => {
    const nulls = { readingUncertainty: null, nominalDiameter: null, taper: null, outliers: null };
    const points = pointsBore.points.map((point) => ({ ...point, z: null, u: null }));
    expect(one({ ...pointsBore, ...nulls, points })).toEqual(
      one({ id: "brg-1", form: "points", points: pointsBore.points }),
    );
    const { top: _, sag: __, ...wire } = wireBore.wire;
    expect(one({ ...wireBore, wire: { ...wire, top: null, sag: null } })).toEqual(one({ ...wireBore, wire }));
    const { gaugeSag: ___, ...gauge } = gaugeBore;
    expect(one({ ...gauge, gaugeSag: null })).toEqual(one(gauge));
  });

  it("lets a reading's own uncertainty come before the bore's", () => {
    const own = pointsBore.points.map((point) => ({ ...point, u: 0.05 }));
    const stated = one({ ...pointsBore, readingUncertainty: 0.05 });
    expect(one({ ...pointsBore, points: own })).toEqual(stated);
    expect(stated.expandedUncertainty).not.toEqual(one(pointsBore).expandedUncertainty);
  });

  it("expands at 0.95 unless told otherwise, and excludes past 3.5 unless told otherwise", () => {
    const { level: _, ...unsaid } = everyFormMm;
    expect(boreFitKind.answer(unsaid)).toEqual(boreFitKind.answer({ ...unsaid, level: 0.95 }));
    expect(one(pointsBore, { level: 0.99 }).expandedUncertainty!.k).toBeGreaterThan(2.5);
    const points = pointsBore.points.map((point, i) => (i === 3 ? { ...point, h: point.h + 0.3 } : point));
    const withRule = (outliers: typeof pointsBore.outliers) => one({ ...pointsBore, points, outliers });
    expect(withRule({ rule: "mad" })).toEqual(withRule({ rule: "mad", threshold: 3.5 }));
    expect(withRule({ rule: "mad" }).exclusions.map(({ index }) => index)).toEqual([3]);
    expect(withRule({ rule: "none" }).exclusions).toEqual([]);
    // Opposite readings off alike: by hand the largest stands at 3.18, between 3 and 3.5.
    const offs = [0.5, 0.01, -0.01, 0.02, -0.02, 0];
    const readings = [...offs, ...offs].map((reading, i) => ({ clockDeg: 30 * i, reading }));
    const excluded = (outliers: typeof pointsBore.outliers) =>
      one({ ...gaugeBore, sense: "larger_is_farther", readings, outliers }).exclusions.length;
    expect([excluded({ rule: "mad" }), excluded({ rule: "mad", threshold: 3 })]).toEqual([0, 2]);
  });

  it("gives the same answer to the last bit again, also when it went through JSON", () => {
    const first = boreFitKind.answer(everyFormMm);
    expect(JSON.stringify(boreFitKind.answer(structuredClone(everyFormMm)))).toBe(JSON.stringify(first));
    // A zero keeps its sign in memory and loses it in JSON.
    const spots = targetBore.spots.map((spot) => ({ ...spot, h: 0, v: 0 }));
    for (const answer of [first, boreFitKind.answer({ ...everyFormMm, bores: [{ ...targetBore, spots }] })]) {
      expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
    }
  });

  it("answers every example request, in the shape of its schema and with a small uncertainty", () => {
    const folder = new URL("../../examples/requests/bore-fits/", import.meta.url);
    const files = readdirSync(folder);
    expect(files.length).toBeGreaterThanOrEqual(4);
    for (const file of files) {
      const request = boreFitRequest.parse(JSON.parse(readFileSync(new URL(file, folder), "utf8")));
      const offset = millimetresPer[request.units.offset];
      for (const bore of bores(request)) {
        expect(boreFitResult.parse(bore)).toEqual(bore);
        expect(bore.expandedUncertainty!.v * offset).toBeLessThan(0.06); // mm
        expect(Math.hypot(bore.centre.h, bore.centre.v) * offset).toBeLessThan(1);
      }
    }
  });
});
