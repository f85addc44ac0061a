import type { ConfirmationRequest, SurveyStationRequest } from "../../shared/schemas/confirmations.ts";
import type { Units } from "../../shared/units.ts";

type Pair = readonly [h: number, v: number];

const mm: Units = { axial: "mm", bore: "mm", offset: "mm" };
const u2 = 0.005 ** 2;

export const surveyCovariance = [
  [u2, 0.2 * u2],
  [0.2 * u2, u2],
];

/** Where the bores of the small machine lay first, and at which z. */
const machine: readonly (readonly [id: string, z: number, h: number, v: number])[] = [
  ["brg-1", 0, 0.01, -0.07],
  ["cas-1", 620, 0.05, -0.01],
  ["cas-2", 1240, 0.11, -0.14],
  ["noz-1", 3720, 0.18, -0.31],
  ["shr-1", 5150, 0.21, -0.38],
  ["brg-2", 6900, 0.24, -0.49],
];

/** A survey of it with some bores moved, and a shift and tilt of the whole. */
export function surveyOf(
  changes: Readonly<Record<string, Pair>> = {},
  [shift, tilt]: readonly [Pair, Pair] = [
    [0, 0],
    [0, 0],
  ],
): { stations: SurveyStationRequest[] } {
  return {
    stations: machine.map(([id, z, h, v]) => {
      const [byH, byV] = changes[id] ?? [0, 0];
      return {
        id,
        z,
        centre: { h: h + byH + shift[0] + tilt[0] * z, v: v + byV + shift[1] + tilt[1] * z },
        covariance: surveyCovariance,
        tolerance: { radial: 0.15 },
      };
    }),
  };
}

/** The casing moved as planned, to nine tenths; a reference at both ends and one between. */
export const confirmed: ConfirmationRequest = {
  units: mm,
  sameSetUp: true,
  before: surveyOf(),
  after: surveyOf({ "cas-1": [-0.09, 0.045], "cas-2": [-0.18, 0.09], "shr-1": [0.002, -0.003] }),
  reference: ["brg-1", "shr-1", "brg-2"],
  components: [
    {
      id: "casing",
      stations: ["cas-1", "cas-2"],
      supports: [
        { id: "fore", z: 620 },
        { id: "aft", z: 1240 },
      ],
    },
  ],
  moves: [
    { component: "casing", support: "fore", h: -0.1, v: 0.05 },
    { component: "casing", support: "aft", h: -0.2, v: 0.1 },
  ],
};
