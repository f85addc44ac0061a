import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import { axisDeviationRequest, type AxisDeviationRequest } from "../../shared/schemas/axis-deviations.ts";
import { asFoundMm as base, mm } from "../../tests/support/axis-requests.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

function faultsOf(request: AxisDeviationRequest): readonly Fault[] {
  try {
    axisDeviationKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return error.faults;
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`);

describe("axisDeviationKind.answer: refusals", () => {
  it("names every fault of every station and of the axis at once", () => {
    const { stations } = base;
    const request: AxisDeviationRequest = {
      ...base,
      axis: { method: "two_station", through: ["brg-1", "nobody", "brg-1"] },
      stations: [
        {
          ...stations[0]!,
          covariance: [
            [1, 2],
            [2, 1],
          ],
          tolerance: { h: [0.1, 0.1], v: [1, -1] },
        },
        { ...stations[1]!, id: "brg-1" },
        {
          ...stations[2]!,
          covariance: [
            [1, 0.1],
            [0.2, 1],
          ],
        },
        stations[3]!,
      ],
    };
    expect(places(faultsOf(request)).sort()).toEqual(
      [
        "/axis/through reference_count",
        "/axis/through/1 unknown_reference",
        "/axis/through/2 duplicate_id",
        "/stations/0/covariance covariance_not_positive",
        "/stations/0/tolerance/h tolerance_invalid",
        "/stations/0/tolerance/v tolerance_invalid",
        "/stations/1/id duplicate_id",
        "/stations/2/covariance covariance_not_positive",
      ].sort(),
    );
  });

  it("points at each reference station whose covariance is missing", () => {
    const stations = base.stations.map((station, index) =>
      index >= 2 ? { ...station, covariance: null } : station,
    );
    expect(places(faultsOf({ ...base, stations }))).toEqual([
      "/stations/2/covariance weights_incomplete",
      "/stations/3/covariance weights_incomplete",
    ]);
  });

  it("refuses reference stations at one z, and a method without its stations", () => {
    const stations = base.stations.map((station) => ({ ...station, z: 500 }));
    expect(places(faultsOf({ ...base, stations }))).toEqual(["/axis/through stations_coincident"]);
    expect(places(faultsOf({ ...base, axis: { method: "least_squares" } }))).toEqual([
      "/axis/through reference_count",
    ]);
    expect(places(faultsOf({ ...base, axis: { ...base.axis, method: "line_of_sight" } }))).toEqual([
      "/axis/through reference_count",
    ]);
  });

  it("points at each reference station whose weight is missing, where a weight counts", () => {
    const stations = base.stations.map((station, index) =>
      index === 2 ? { ...station, weight: 3 } : station,
    );
    for (const method of ["minimum_zone", "least_absolute"] as const) {
      const axis = { ...base.axis, method };
      expect(places(faultsOf({ ...base, axis, stations }))).toEqual([
        "/stations/0/weight weights_incomplete",
        "/stations/3/weight weights_incomplete",
      ]);
      expect(places(faultsOf({ ...base, axis: { ...axis, through: ["brg-1", "shr-2"] } }))).toEqual([
        "/axis/through reference_count",
      ]);
    }
    expect(faultsOf({ ...base, stations })).toEqual([]);
  });
});

describe("axisDeviationKind.faultsBesideSchema", () => {
  const beside = (body: unknown) => places(axisDeviationKind.faultsBesideSchema!(body, []));

  it("finds the faults of the sound stations beside one that the schema refuses", () => {
    const stations = [
      { ...base.stations[0]!, centre: { h: 0, w: 0 } },
      { ...base.stations[1]!, tolerance: { h: [2, 1], v: 1 } },
      { ...base.stations[2]!, id: "brg-1" },
      base.stations[3]!,
    ];
    expect(beside({ ...base, units: undefined, stations })).toEqual([
      "/stations/2/id duplicate_id",
      "/stations/1/tolerance/h tolerance_invalid",
      "/axis/through/1 unknown_reference",
    ]);
  });

  it("does not take a broken reference station for an unknown one", () => {
    const stations = [{ ...base.stations[0]!, z: "far" }, ...base.stations.slice(1)];
    expect(beside({ ...base, stations })).toEqual([]);
  });

  it("makes something of any body", () => {
    fc.assert(
      fc.property(fc.anything(), fc.anything(), fc.anything(), (body, stations, axis) => {
        expect(Array.isArray(beside(body))).toBe(true);
        expect(Array.isArray(beside({ ...base, stations, axis }))).toBe(true);
        expect(Array.isArray(beside({ ...base, stations: [stations, axis] }))).toBe(true);
      }),
    );
  });
});

describe("axisDeviationRequest", () => {
  it("requires units, axis method, ids, z and centre, and nothing else", () => {
    const minimal = {
      units: mm,
      axis: { method: "line_of_sight" },
      stations: [{ id: "a", z: 0, centre: { h: 0, v: 0 } }],
    };
    expect(axisDeviationRequest.safeParse(minimal).success).toBe(true);
    for (const member of ["units", "axis", "stations"]) {
      expect(axisDeviationRequest.safeParse({ ...minimal, [member]: undefined }).success).toBe(false);
    }
    for (const member of ["id", "z", "centre"]) {
      const stations = [{ ...minimal.stations[0], [member]: undefined }];
      expect(axisDeviationRequest.safeParse({ ...minimal, stations }).success).toBe(false);
    }
  });

  it("takes 0 for an exact target, and refuses a negative or infinite uncertainty", () => {
    const parse = (targetUncertainty: unknown) => {
      const stations = [{ ...base.stations[0], targetUncertainty }];
      return axisDeviationRequest.safeParse({ ...base, stations }).success;
    };
    expect(parse({ h: 0, v: 0.02 })).toBe(true);
    expect(parse({ h: -0.01, v: 0.02 })).toBe(false);
    expect(parse({ h: Infinity, v: 0.02 })).toBe(false);
  });
});
