import type { MeasurementPlanRequest } from "../../shared/schemas/measurement-plans.ts";

/** A bearing whose lower half was read with a gauge, its upper half in reach, and a target turned in another. */
export const planRequest: MeasurementPlanRequest = {
  units: { axial: "mm", bore: "mm", offset: "mm" },
  readingUncertainty: 0.01,
  wanted: { tolerance: { radial: 0.05 } },
  bores: [
    {
      id: "brg-1",
      form: "turned_gauge",
      read: [90, 112.5, 135, 157.5, 180, 202.5, 225, 247.5, 270].map((clockDeg) => ({ clockDeg })),
      reachable: { ranges: [{ fromDeg: 285, toDeg: 75 }], stepDeg: 15 },
    },
    {
      id: "brg-2",
      form: "rotating_target",
      wanted: { expandedUncertainty: { h: 0.01, v: 0.02 } },
      readingUncertainty: 0.02,
      read: [{ clockDeg: 0 }, { clockDeg: 90, u: 0.03 }],
      reachable: { clockDegs: [0, 45, 90, 135, 180, 225, 270, 315], readingsPerPlace: 5 },
    },
  ],
};
