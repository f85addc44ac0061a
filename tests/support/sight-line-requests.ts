import type { SightLineSetupRequest } from "../../shared/schemas/sight-line-setups.ts";

/** A source 2 m upstream of a bearing, the other one 8 m on; 0.8 mm and more off both. */
export const sightRequest: SightLineSetupRequest = {
  units: { axial: "mm", bore: "mm", offset: "mm", temperature: "C" },
  seen: "downstream",
  sense: "spot_on_target",
  sourceZ: -2000,
  stations: [
    { id: "brg-1", z: 0, spot: { h: 0.8, v: -1.2 } },
    { id: "brg-2", z: 8000, spot: { h: -2.4, v: 2 }, expected: { h: 0.1, v: 0.2 } },
  ],
  wanted: 0.1,
  readingUncertainty: 0.02,
  adjuster: {
    kind: "two_supports",
    supports: [
      { id: "front", z: -1900 },
      { id: "rear", z: -2300 },
    ],
  },
  sightPath: { gradient: { h: 0.1, v: 0.5 } },
  drift: { closing: { h: 0.83, v: -1.24 }, allowed: 0.06, shareOut: true },
};
