import { describe, expect, it } from "vitest";
import { axisInput, evenCovariance, stationAt } from "../../../tests/support/axis-stations.ts";
import type { AxisStation } from "./axis-input.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";

const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm unless said

const radial = (halfWidthMm: number) => ({ form: "radial", halfWidthMm }) as const;
const u = (uMm: number) => ({ covariance: evenCovariance(uMm) });

describe("deviationsFromAxis: two_station", () => {
  const stations = [
    stationAt(0, 0.125, -0.25, { target: { hMm: 0, vMm: -0.25 } }),
    stationAt(500, 0.5, 0.5),
    stationAt(1000, 0.375, 0.5, { target: { hMm: 0, vMm: 0.25 } }),
  ];

  it("lays the axis through centre less target of both, and finds their deviations exactly 0", () => {
    const { axis, stations: found } = deviationsFromAxis(axisInput("two_station", [0, 2], stations));
    expect(axis.h).toEqual({ at0Mm: 0.125, slope: 0.00025 });
    expect(axis.v).toEqual({ at0Mm: 0, slope: 0.00025 });
    expect(found.map(({ deviation }) => deviation)).toEqual([
      { hMm: 0, vMm: 0 },
      { hMm: 0.25, vMm: 0.375 },
      { hMm: 0, vMm: 0 },
    ]);
    expect(found.map(({ reference }) => reference)).toEqual([true, false, true]);
  });

  it("does not mind which of the two is named first", () => {
    const forward = deviationsFromAxis(axisInput("two_station", [0, 2], stations));
    const backward = deviationsFromAxis(axisInput("two_station", [2, 0], stations));
    near(forward.axis.v.at0Mm, backward.axis.v.at0Mm);
    near(forward.stations[1]!.deviation.hMm, backward.stations[1]!.deviation.hMm);
  });

  it("knows no uncertainty without covariances, says so, and cannot decide", () => {
    const judged = stations.map((station) => ({ ...station, tolerance: radial(10) }));
    const { axis, stations: found } = deviationsFromAxis(axisInput("two_station", [0, 2], judged));
    expect(axis.covariance).toBeNull();
    expect(axis.warnings.map(({ code }) => code)).toEqual(["no_redundancy"]);
    for (const station of found) {
      expect(station).toMatchObject({ covariance: null, expandedUncertainty: null, verdict: "undecided" });
      expect(station.warnings.map(({ code }) => code)).toEqual(["uncertainty_unknown"]);
    }
    const simple = deviationsFromAxis(axisInput("two_station", [0, 2], judged, { rule: "simple" }));
    expect(simple.stations.map(({ verdict }) => verdict)).toEqual(["conforms", "conforms", "conforms"]);
    expect(simple.stations.flatMap(({ warnings }) => warnings)).toEqual([]);
  });

  it("spreads the two uncertainties as λ² to a station between, and adds its own", () => {
    const measured = [
      stationAt(0, 0, 0, u(0.003)),
      stationAt(250, 0, 0, u(0.002)),
      stationAt(1000, 0, 0, u(0.005)),
    ];
    const { stations: found } = deviationsFromAxis(axisInput("two_station", [0, 2], measured));
    // By hand: 0.002² + 0.75²·0.003² + 0.25²·0.005²
    near(found[1]!.covariance!.hhMm2, 4e-6 + 0.5625 * 9e-6 + 0.0625 * 25e-6, 1e-18); // mm²
    expect(found[0]!.covariance).toEqual({ hhMm2: 0, hvMm2: 0, vvMm2: 0 });
  });
});

describe("deviationsFromAxis: least_squares", () => {
  it("finds the line that was put in, to the last digits, over 100 m and far from z = 0", () => {
    for (const start of [0, 5e6, -3e8]) {
      const z = [0, 12_345.678, 40_000, 77_777.7, 100_000].map((along) => start + along);
      const middle = start + 50_000;
      const put = z.map((at) => ({ h: 0.001 + 1e-8 * (at - middle), v: -0.002 + 3e-8 * (at - middle) }));
      const stations = z.map((at, i) => stationAt(at, put[i]!.h, put[i]!.v));
      const { axis, stations: found } = deviationsFromAxis(
        axisInput("least_squares", [0, 1, 2, 3, 4], stations),
      );
      near(axis.h.slope, 1e-8, 1e-21); // 1: the offsets are rounded at 1e-19 mm
      near(axis.v.slope, 3e-8, 1e-21);
      near(axis.h.at0Mm + axis.h.slope * middle, 0.001, 1e-15);
      for (const { deviation } of found) {
        near(deviation.hMm, 0, 1e-18);
        near(deviation.vMm, 0, 1e-18);
      }
    }
  });

  it("weighs each plane by its own variance of centre and target together", () => {
    const stations = [
      stationAt(0, 0, 0, {
        covariance: { hhMm2: 1e-6, hvMm2: 0, vvMm2: 1e-6 },
        targetUncertainty: { hMm: 0, vMm: 0.01 },
      }),
      stationAt(1000, 0.01, 0.01, u(0.001)),
      stationAt(1000, 0.03, 0.03, {
        covariance: { hhMm2: 4e-6, hvMm2: 0, vvMm2: 4e-6 },
        targetUncertainty: { hMm: 0, vMm: 0.002 },
      }),
    ];
    const { axis } = deviationsFromAxis(axisInput("least_squares", [0, 1, 2], stations));
    // At z = 1000 the weighted mean of 0.01 and 0.03: weights 1 and 1/4 in h, 1 and 1/8 in v.
    near(axis.h.at0Mm + 1000 * axis.h.slope, (0.01 + 0.03 / 4) / 1.25);
    near(axis.v.at0Mm + 1000 * axis.v.slope, (0.01 + 0.03 / 8) / 1.125);
    near(axis.h.at0Mm, 0);
  });

  it("takes the scatter of each plane from the residuals when nothing is stated", () => {
    const stations = [
      stationAt(0, 1, 0),
      stationAt(1, -2, 0),
      stationAt(2, 1, 0),
      stationAt(1, 7, 7, { target: { hMm: 7, vMm: 7 } }),
    ];
    const { axis, stations: found } = deviationsFromAxis(axisInput("least_squares", [0, 1, 2], stations));
    // Residuals 1, −2, 1 of the line h = 0: s² = 6/(3 − 2)
    near(axis.scatterMm!.h, Math.sqrt(6), 1e-14);
    expect(axis.scatterMm!.v).toBe(0);
    expect(axis.dof).toBe(1);
    expect(axis.chiSquare).toBeNull();
    // xᵀCx = s²/3 at the middle, s²·(1/3 + 1/2) at the ends
    near(found[3]!.covariance!.hhMm2, 6 * (1 + 1 / 3), 1e-13);
    near(found[1]!.covariance!.hhMm2, 6 * (1 - 1 / 3), 1e-13);
    near(found[0]!.covariance!.hhMm2, 6 * (1 - 5 / 6), 1e-13);
    // One estimate of scatter serves all: its degrees of freedom do not add up.
    for (const station of found) near(station.expandedUncertainty!.dof!, 1, 1e-12);
    near(found[3]!.expandedUncertainty!.k, 12.706204736174694, 1e-9);
  });

  it("adds a target's uncertainty to the scatter only where the scatter does not hold it yet", () => {
    const uncertain = { targetUncertainty: { hMm: 0.5, vMm: 0 } };
    const stations = [
      stationAt(0, 1, 0, uncertain),
      stationAt(1, -2, 0, uncertain),
      stationAt(2, 1, 0, uncertain),
      stationAt(1, 0, 0, uncertain),
    ];
    const { stations: found } = deviationsFromAxis(axisInput("least_squares", [0, 1, 2], stations));
    near(found[1]!.covariance!.hhMm2, 6 * (1 - 1 / 3), 1e-13);
    near(found[3]!.covariance!.hhMm2, 6 * (1 + 1 / 3) + 0.25, 1e-13);
    // Welch–Satterthwaite of the scatter (1 degree of freedom) and the known target
    near(found[3]!.expandedUncertainty!.dof!, (8.25 / 8) ** 2, 1e-12);
  });

  it("leaves a station without covariance undecided when the others state theirs", () => {
    const stations = [
      stationAt(0, 0, 0, u(0.001)),
      stationAt(1000, 0, 0, u(0.001)),
      stationAt(500, 0, 0, { tolerance: radial(1) }),
    ];
    const { stations: found } = deviationsFromAxis(axisInput("least_squares", [0, 1], stations));
    expect(found[2]).toMatchObject({ covariance: null, verdict: "undecided" });
    expect(found[2]!.warnings.map(({ code }) => code)).toEqual(["uncertainty_unknown"]);
  });

  it("passes through two stations exactly, with the covariance that they state", () => {
    const stations = [
      stationAt(3, 0.1, 0.7, u(0.004)),
      stationAt(10, 0.3, -0.1, u(0.001)),
      stationAt(5, 0, 0, u(0.002)),
    ];
    const squares = deviationsFromAxis(axisInput("least_squares", [0, 1], stations));
    const two = deviationsFromAxis(axisInput("two_station", [0, 1], stations));
    expect(squares.stations).toEqual(two.stations);
    expect(squares.stations[0]!.deviation).toEqual({ hMm: 0, vMm: 0 });
    expect(squares.axis.chiSquare).toBeNull();
  });

  it("warns when chi-square passes its 0.95 quantile, and enlarges nothing", () => {
    const bent = (v: number) => [
      stationAt(0, 0, 0, u(0.001)),
      stationAt(1000, 0, v, u(0.001)),
      stationAt(2000, 0, 0, u(0.001)),
    ];
    // χ² = v²·(2/3)/u²; the 0.95 quantile for 1 degree of freedom is 3.841 (NIST e-Handbook 1.3.6.7.4)
    const limit = Math.sqrt(3.841459 * 1.5) * 0.001;
    const below = deviationsFromAxis(axisInput("least_squares", [0, 1, 2], bent(limit - 1e-8)));
    const above = deviationsFromAxis(axisInput("least_squares", [0, 1, 2], bent(limit + 1e-8)));
    expect(below.axis.warnings).toEqual([]);
    expect(above.axis.warnings.map(({ code }) => code)).toEqual(["chi_square_high"]);
    expect(above.axis.warnings[0]!.detail).toContain("In v ");
    near(above.axis.chiSquare!.v, 3.841459, 1e-4);
    expect(above.axis.covariance).toEqual(below.axis.covariance);
  });

  it("stands a station that is known a million million times better than the others", () => {
    const stations = [
      stationAt(1e5, 0.25, 0, u(1e-12)),
      stationAt(2e5, 0.35, 0, u(1)),
      stationAt(3e5, 0.45, 0, u(1)),
    ];
    const { axis, stations: found } = deviationsFromAxis(axisInput("least_squares", [0, 1, 2], stations));
    near(axis.h.slope, 1e-6, 1e-20);
    near(axis.h.at0Mm, 0.15, 1e-15);
    near(found[2]!.covariance!.hhMm2, 1 - 4 / 5, 1e-12); // slope from dz 1 and 2 about a fixed point
  });

  it("lets one poor station give the slope where all good ones stand at one z", () => {
    const sizes = [0.51, 0.77, 0.93, 1.13, 1.29, 1.37, 1.49];
    const good = sizes.map((size) => stationAt(95_604.1, 0.25, 0, u(size * 1e-12)));
    const poor = stationAt(195_604.1, 0.35, 0, u(1e6));
    const reference = [...good.keys(), good.length];
    const { axis } = deviationsFromAxis(axisInput("least_squares", reference, [...good, poor]));
    near(axis.h.slope, 1e-6, 1e-16);
  });
});

describe("deviationsFromAxis: degrees of freedom", () => {
  const measured = { hhMm2: 4e-6, hvMm2: 3.9e-6, vvMm2: 4e-6 };
  const dofOf = (rest: Partial<AxisStation>) => {
    const station = stationAt(0, 0, 0, { covariance: measured, dof: 7, ...rest });
    return deviationsFromAxis(axisInput("line_of_sight", [], [station])).stations[0]!.expandedUncertainty!
      .dof;
  };
  const target = (h2: number, v2: number) => ({
    targetUncertainty: { hMm: Math.sqrt(h2), vMm: Math.sqrt(v2) },
  });

  it("are the centre's own where the target is exact, and infinite where the centre's are", () => {
    near(dofOf({})!, 7);
    expect(dofOf({ dof: null })).toBeNull();
  });

  it("are the least of those along h, along v and along the worst direction", () => {
    // Uncorrelated: h and v are the directions. 7·(total/measured)² in each.
    const even = { covariance: { ...measured, hvMm2: 0 } };
    near(dofOf({ ...even, ...target(3e-6, 0) })!, 7, 1e-9);
    near(dofOf({ ...even, ...target(0, 3e-6) })!, 7, 1e-9);
    near(dofOf({ ...even, ...target(3e-6, 5e-6) })!, 7 * (7 / 4) ** 2, 1e-9);
    near(dofOf({ ...even, ...target(5e-6, 3e-6) })!, 7 * (7 / 4) ** 2, 1e-9);
    // Correlated: along the diagonal the measurement is 7.9 of 10.9, along h and v only 4 of 7.
    near(dofOf(target(3e-6, 3e-6))!, 7 * (10.9 / 7.9) ** 2, 1e-9);
  });

  it("add up over the stations that set the axis", () => {
    const known = { ...u(0.003), dof: 10 };
    const stations = [
      stationAt(0, 0, 0, known),
      stationAt(2, 0, 0, known),
      stationAt(1, 0, 0, { ...u(0.003), dof: 40 }),
    ];
    const { stations: found } = deviationsFromAxis(axisInput("two_station", [0, 1], stations));
    // Shares 1/4, 1/4 and 1 of the variance: (3/2)²/(1/16/10 + 1/16/10 + 1/40)
    near(found[2]!.expandedUncertainty!.dof!, 2.25 / (1 / 160 + 1 / 160 + 1 / 40), 1e-9);
  });
});

describe("deviationsFromAxis: line_of_sight", () => {
  it("takes the beam for the axis: height and covariance 0", () => {
    const station = stationAt(4321, 0.3, -0.1, {
      covariance: { hhMm2: 4e-6, hvMm2: 1e-6, vvMm2: 9e-6 },
      dof: 7,
      target: { hMm: 0.1, vMm: -0.2 },
      targetUncertainty: { hMm: 0, vMm: 0.004 },
    });
    const { axis, stations: found } = deviationsFromAxis(axisInput("line_of_sight", [], [station]));
    expect(axis.h).toEqual({ at0Mm: 0, slope: 0 });
    expect(axis.covariance!.hv).toEqual([
      [0, 0],
      [0, 0],
    ]);
    near(found[0]!.deviation.hMm, 0.2);
    near(found[0]!.deviation.vMm, 0.1);
    near(found[0]!.covariance!.vvMm2, 25e-6, 1e-20);
    // h has the centre's 7; v (9² /7 of 25²) and the worst direction have more: the cautious one is told.
    near(found[0]!.expandedUncertainty!.dof!, 7, 1e-12);
  });

  it("needs no uncertainty to answer a deviation", () => {
    const { axis, stations: found } = deviationsFromAxis(
      axisInput("line_of_sight", [], [stationAt(1, 2, 3)]),
    );
    expect(found[0]).toMatchObject({
      deviation: { hMm: 2, vMm: 3 },
      covariance: null,
      verdict: null,
      ratio: null,
    });
    expect(axis.warnings).toEqual([]);
  });
});
