import type { ColdTargetRequest } from "../../shared/schemas/cold-targets.ts";

/** Five bores in millimetres, on a stepped shaft with a disc and an overhang, and a wire along all of it. */
export const coldMachineMm: ColdTargetRequest = {
  units: {
    axial: "mm",
    bore: "mm",
    offset: "mm",
    temperature: "C",
    mass: "kg",
    force: "N",
    density: "kg/m3",
    modulus: "GPa",
  },
  stations: [
    {
      id: "brg-1",
      z: 0,
      follows: "bearing_line",
      growth: { length: 780, coefficient: 11.7e-6, hot: 45, cold: 20, uncertainty: 0.006 },
    },
    {
      id: "cas-2",
      z: 1240,
      follows: "rotor",
      growth: [
        { direction: "v", length: 780, material: "steel_1020", hot: 95, cold: 21.5, uncertainty: 0.03 },
        { direction: "h", length: -120, coefficient: 17.2e-6, hot: 95, cold: 21.5, uncertainty: 0.004 },
        { length: -60, coefficient: 11.4e-6, hot: 70, cold: 21.5, uncertainty: 0.04 },
      ],
      closing: { h: 0.01, v: -0.02 },
    },
    { id: "shr-1", z: 4650, follows: "rotor" },
    { id: "brg-2", z: 6900, follows: "bearing_line" },
    { id: "cpl-1", z: 7500, follows: "rotor" },
  ],
  rotor: {
    z: -400,
    sections: [
      { length: 800, outer: 360 },
      { length: 6200, outer: 640, inner: 150 },
      { length: 900, outer: 380 },
    ],
    density: 7850,
    modulus: 207,
    masses: [
      { z: 4650, mass: 1200 },
      { z: 7500, mass: 300 },
    ],
    supports: [{ z: 0 }, { z: 6900, line: { h: 0, v: 0.12 } }],
    journals: [
      { z: 0, running: { h: 0.06, v: -0.11 } },
      { z: 6900, radialClearance: 0.24, lift: { h: 0.07, v: 0.12 } },
    ],
  },
  wire: { massPerLength: 0.00154, tension: 147.09975, span: [-600, 7600] },
};
