import { describe, expect, it } from "vitest";
import { axisInput, evenCovariance, stationAt } from "../../../tests/support/axis-stations.ts";
import type { AxisInput, AxisMethod } from "./axis-input.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";
import { findFaults } from "./find-faults.ts";

const radial = (halfWidthMm: number) => ({ form: "radial", halfWidthMm }) as const;
const u = (uMm: number) => ({ covariance: evenCovariance(uMm) });

const refusals = (input: AxisInput) => () => deviationsFromAxis(input);
const withCode = (code: string, ...at: (string | number)[]) =>
  expect.objectContaining({ code, details: expect.objectContaining({ at }) as unknown }) as Error;

function deepFreeze<T>(value: T): T {
  if (typeof value === "object" && value !== null) {
    for (const inner of Object.values(value) as unknown[]) deepFreeze(inner);
    Object.freeze(value);
  }
  return value;
}

describe("findFaults, and deviationsFromAxis that throws the first", () => {
  const three = [stationAt(0, 0, 0), stationAt(1, 0, 0), stationAt(2, 0, 0)];

  it.each([
    ["two_station", [0]],
    ["two_station", [0, 1, 2]],
    ["least_squares", []],
    ["least_squares", [1]],
    ["line_of_sight", [0]],
    ["minimum_zone", [0, 1]],
    ["least_absolute", [0, 1]],
  ] as [AxisMethod, number[]][])("%s does not take the reference stations %j", (method, reference) => {
    expect(refusals(axisInput(method, reference, three))).toThrow(
      withCode("reference_count", "axis", "through"),
    );
  });

  it.each(["minimum_zone", "least_absolute"] as const)(
    "%s takes weights at all reference stations or none",
    (method) => {
      const weighted = three.map((station, index) => (index === 1 ? station : { ...station, weight: 2 }));
      expect(refusals(axisInput(method, [0, 1, 2], weighted))).toThrow(
        withCode("weights_incomplete", "stations", 1, "weight"),
      );
      const elsewhere = [...three, stationAt(3, 0, 0, { weight: 2 })];
      expect(refusals(axisInput(method, [0, 1, 2], elsewhere))).not.toThrow();
    },
  );

  it.each(["minimum_zone", "least_absolute"] as const)(
    "%s takes covariances at some stations only",
    (method) => {
      const stations = three.map((station, index) => (index === 1 ? station : { ...station, ...u(0.001) }));
      expect(refusals(axisInput(method, [0, 1, 2], stations))).not.toThrow();
    },
  );

  it("refuses reference stations at one z, however far from 0", () => {
    for (const z of [0, 1, 6900, 1e9]) {
      const same = [stationAt(z, 0, 0), stationAt(z, 1, 1), stationAt(z * (1 + Number.EPSILON), 2, 2)];
      for (const reference of [
        [0, 1],
        [0, 1, 2],
      ]) {
        expect(refusals(axisInput("least_squares", reference, same))).toThrow(
          withCode("stations_coincident", "axis", "through"),
        );
      }
    }
  });

  it.each([0, 1, 2])("refuses a covariance missing at reference station %i only", (missing) => {
    const stations = three.map((station, index) =>
      index === missing ? station : { ...station, ...u(0.001) },
    );
    expect(refusals(axisInput("least_squares", [0, 1, 2], stations))).toThrow(
      withCode("weights_incomplete", "stations", missing, "covariance"),
    );
  });

  it.each([
    { hhMm2: -1e-9, hvMm2: 0, vvMm2: 1e-6 },
    { hhMm2: 1e-6, hvMm2: 0, vvMm2: -1e-6 },
    { hhMm2: 1e-6, hvMm2: 1.001e-6, vvMm2: 1e-6 },
    { hhMm2: 1e-6, hvMm2: -2e-6, vvMm2: 1e-6 },
    { hhMm2: Number.NaN, hvMm2: 0, vvMm2: 1e-6 },
  ])("refuses the covariance %j, at its station", (covariance) => {
    const stations = [three[0]!, { ...three[1]!, covariance }];
    expect(refusals(axisInput("line_of_sight", [], stations))).toThrow(
      withCode("covariance_not_positive", "stations", 1, "covariance"),
    );
  });

  it("takes a covariance whose correlation is 1 to its rounding", () => {
    const covariance = { hhMm2: 1e-6, hvMm2: 2e-6, vvMm2: 4e-6 };
    const stations = [stationAt(0, 0, 0, { covariance }), stationAt(1, 0, 0, { covariance })];
    expect(refusals(axisInput("two_station", [0, 1], stations))).not.toThrow();
  });

  it("refuses to weigh by a variance of 0, and takes it where the target's makes up for it", () => {
    const sure = { covariance: { hhMm2: 1e-6, hvMm2: 0, vvMm2: 0 } };
    const make = (rest: object) =>
      axisInput(
        "least_squares",
        [0, 1, 2],
        [stationAt(0, 0, 0, u(1)), stationAt(1, 0, 0, { ...sure, ...rest }), stationAt(2, 0, 0, u(1))],
      );
    expect(refusals(make({}))).toThrow(withCode("covariance_not_positive", "stations", 1, "covariance"));
    expect(refusals(make({ targetUncertainty: { hMm: 0, vMm: 0.01 } }))).not.toThrow();
  });

  it("refuses weights so far apart that one station would set a line", () => {
    const stations = [
      stationAt(0, 0, 0, u(1e-150)),
      stationAt(1, 0, 0, u(1e20)),
      stationAt(2, 0, 0, u(1e20)),
    ];
    expect(refusals(axisInput("least_squares", [0, 1, 2], stations))).toThrow(
      expect.objectContaining({ code: "rank_deficient" }),
    );
  });

  it("refuses a tolerance without room, at its station", () => {
    const stations = [three[0]!, { ...three[1]!, tolerance: radial(0) }];
    expect(refusals(axisInput("line_of_sight", [], stations))).toThrow(
      withCode("tolerance_invalid", "stations", 1, "tolerance", "radial"),
    );
  });

  it("refuses what overflows, and never answers a number that JSON cannot hold", () => {
    const stations = [stationAt(0, 1e300, 0), stationAt(1e-8, -1e308, 0), stationAt(1e300, 0, 0)];
    expect(refusals(axisInput("two_station", [0, 1], stations))).toThrow(
      expect.objectContaining({ code: "result_overflow" }),
    );
  });

  it("leaves its input as it was", () => {
    const stations = three.map((station) => ({ ...station, ...u(0.002), tolerance: radial(0.05) }));
    const input = deepFreeze(axisInput("least_squares", [0, 1, 2], stations));
    expect(refusals(input)).not.toThrow();
  });

  it("finds all of them at once", () => {
    const stations = [
      stationAt(5, 0, 0, { ...u(1), tolerance: radial(-1) }),
      stationAt(5, 0, 0, {
        tolerance: { form: "planes", h: { minMm: 1, maxMm: 1 }, v: { minMm: 1, maxMm: 0 } },
      }),
      stationAt(5, 0, 0, { covariance: { hhMm2: -1, hvMm2: 0, vvMm2: 1 } }),
    ];
    const faults = findFaults(axisInput("two_station", [0, 1, 2], stations));
    expect(faults.map(({ code, details }) => `${details.at!.join("/")} ${code}`)).toEqual([
      "axis/through reference_count",
      "stations/0/tolerance/radial tolerance_invalid",
      "stations/1/tolerance/h tolerance_invalid",
      "stations/1/tolerance/v tolerance_invalid",
      "stations/2/covariance covariance_not_positive",
      "stations/1/covariance weights_incomplete",
      "axis/through stations_coincident",
    ]);
  });
});
