import type { AxisDeviationRequest } from "../../shared/schemas/axis-deviations.ts";
import type { Units } from "../../shared/units.ts";

export const mm: Units = { axial: "mm", bore: "mm", offset: "mm" };
const even = (u: number) => [
  [u * u, 0],
  [0, u * u],
];

/** Four bores in millimetres, three of them reference, one without a tolerance. */
export const asFoundMm: AxisDeviationRequest = {
  units: mm,
  axis: { method: "least_squares", through: ["brg-1", "shr-2", "brg-2"] },
  stations: [
    {
      id: "brg-1",
      z: 0,
      centre: { h: 0.01, v: -0.24 },
      covariance: even(0.003),
      dof: 21,
      target: { h: 0, v: -0.2 },
      targetUncertainty: { h: 0, v: 0.01 },
      tolerance: { h: 0.05, v: [-0.03, 0.09] },
    },
    {
      id: "cas-2",
      z: 1240,
      centre: { h: 0.13, v: -0.05 },
      covariance: even(0.004),
      tolerance: { radial: 0.15 },
    },
    {
      id: "shr-2",
      z: 5150,
      centre: { h: 0.02, v: 0.03 },
      covariance: [
        [9e-6, 2e-6],
        [2e-6, 16e-6],
      ],
      tolerance: { radial: 0.1 },
    },
    { id: "brg-2", z: 6900, centre: { h: -0.02, v: 0.02 }, covariance: even(0.005), dof: 9 },
  ],
};
