import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import { boreFitRequest, type BoreFitRequest, type BoreRequest } from "../../shared/schemas/bore-fits.ts";
import {
  badWire,
  everyFormMm,
  faultsOfThose,
  faultyBores,
  gaugeBore,
  pointsBore,
  targetBore,
  taperBore,
  tiltBore,
  wireBore,
} from "../../tests/support/bore-requests.ts";
import { readingsInCall } from "./bore-faults.ts";
import { boreFitKind } from "./bore-fit.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

function faultsOf(request: BoreFitRequest): readonly Fault[] {
  try {
    boreFitKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return error.faults;
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`);
const ofBores = (bores: BoreRequest[]) => places(faultsOf({ ...everyFormMm, bores }));
describe("boreFitKind.answer: refusals", () => {
  it("names every fault of every bore at once, each at its place", () => {
    expect(boreFitRequest.safeParse({ ...everyFormMm, bores: [...faultyBores] }).success).toBe(true);
    expect(ofBores([...faultyBores])).toEqual(faultsOfThose);
  });

  it("says of a fault what was sent", () => {
    const faults = faultsOf({ ...everyFormMm, bores: [...faultyBores] });
    expect(faults.find(({ code }) => code === "duplicate_id")?.value).toBe("brg-1");
    expect(faults.find(({ pointer }) => pointer === "/bores/5/method")?.value).toBe("ellipse");
    for (const { detail } of faults) expect(detail).toMatch(/^\S.*\.$/);
  });

  it("fails the whole call for one bore that only the fit itself refuses", () => {
    const bottomOnly = tiltBore.points.map((point, i) => ({ ...point, z: i === 0 ? 90 : 0 }));
    expect(ofBores([pointsBore, { ...tiltBore, points: bottomOnly }, wireBore])).toEqual([
      "/bores/1/points rank_deficient",
    ]);
  });

  it("names the member of each form that holds its readings", () => {
    expect(
      ofBores([
        { ...pointsBore, points: [] },
        { ...gaugeBore, readings: [] },
        { ...targetBore, spots: [] },
        {
          ...taperBore,
          readingUncertainty: null,
          points: taperBore.points.map((p, i) => (i ? p : { ...p, u: null })),
        },
        { ...pointsBore, id: "line", points: pointsBore.points.map((_, i) => ({ h: i, v: 2 * i })) },
        { ...pointsBore, id: "place", points: pointsBore.points.map(() => ({ h: 5, v: 5 })) },
        { ...taperBore, id: "plane", points: taperBore.points.map((p) => ({ ...p, z: 10 })) },
        { ...taperBore, id: "tip", taper: { halfAngleDeg: 88 } },
      ]),
    ).toEqual([
      "/bores/0/points too_few_points",
      "/bores/1/readings too_few_points",
      "/bores/2/spots too_few_points",
      "/bores/3/points uncertainty_incomplete",
      "/bores/4/points points_collinear",
      "/bores/5/points points_coincident",
      "/bores/6/taper rank_deficient",
      "/bores/7/taper radius_not_positive",
    ]);
  });

  it("says which forms have no criterion but least squares", () => {
    const methods = ["minimum_zone", "maximum_inscribed", "minimum_circumscribed", "ellipse"] as const;
    for (const method of methods) {
      expect(
        ofBores([
          { ...pointsBore, method },
          { ...gaugeBore, method },
          { ...targetBore, method },
          { ...wireBore, method },
        ]),
      ).toEqual(["/bores/2/method combination_invalid", "/bores/3/method combination_invalid"]);
    }
  });

  it("names what a criterion does not take", () => {
    const known = { ...taperBore, taper: { halfAngleDeg: 5 } };
    const { taper: _taper, ...planes } = taperBore;
    const half = { ...pointsBore, outliers: null, points: pointsBore.points.slice(0, 5) };
    expect(
      ofBores([
        { ...taperBore, id: "a", method: "minimum_zone" },
        { ...known, id: "b", method: "ellipse" },
        { ...known, id: "c", method: "minimum_circumscribed" },
        { ...planes, id: "d", method: "maximum_inscribed" },
        { ...half, id: "e", method: "maximum_inscribed" },
        { ...half, id: "f", method: "ellipse" },
        { ...half, id: "g", method: "ellipse", points: half.points.slice(0, 4) },
      ]),
    ).toEqual([
      "/bores/0/taper combination_invalid",
      "/bores/1/taper combination_invalid",
      "/bores/3/points combination_invalid",
      "/bores/4/points no_inscribed_circle",
      "/bores/5/points coverage_insufficient",
      "/bores/6/points too_few_points",
    ]);
  });

  it("asks for the wire's diameter only where its surface was touched", () => {
    expect(ofBores([{ ...wireBore, wire: { ...badWire, measuredTo: "centre" } }])).toEqual([]);
    expect(ofBores([{ ...wireBore, wire: badWire }])).toEqual(["/bores/0/wire/wireDiameter required"]);
  });

  it("refuses more readings than a call takes, with the count and the limit, and takes as many", () => {
    const { points } = pointsBore;
    const bores = (last: number) =>
      [1e4, 1e4, 1e4, 1e4, last].map((count, index) => ({
        ...pointsBore,
        id: `bore-${index}`,
        outliers: null,
        points: Array.from({ length: count }, (_, i) => points[i % points.length]!),
      }));
    const fill = 1e4 - 4;
    expect(faultsOf({ ...everyFormMm, bores: [...bores(fill + 1), wireBore] })).toMatchObject([
      { pointer: "/bores", code: "call_too_large", value: 50_001, allowed: { max: limits.readingsPerCall } },
    ]);
    expect(readingsInCall({ bores: [...bores(fill), wireBore] })).toBe(50_000);
    expect(faultsOf({ ...everyFormMm, bores: [...bores(fill), wireBore] })).toEqual([]);
  });
});
