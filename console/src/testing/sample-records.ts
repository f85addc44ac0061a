import {
  axisDeviationRequest,
  axisDeviationResponse,
  type AxisDeviationRequest,
} from "../../../shared/schemas/axis-deviations.ts";
import { boreFitRequest, boreFitResponse, type BoreFitRequest } from "../../../shared/schemas/bore-fits.ts";
import type { CalculationRecord, CalculationSummary } from "../../../shared/schemas/calculations.ts";
import {
  shimMoveRequest,
  shimMoveResponse,
  type ShimMoveRequest,
} from "../../../shared/schemas/shim-moves.ts";
import { sampleSummary } from "./samples.ts";

const units = { axial: "mm", bore: "mm", offset: "mm" } as const;

/** Four points of a circle of radius 180 about (0.1, 0.05), the fourth read 0.08 too far out and put aside. */
export const boreRequest: BoreFitRequest = boreFitRequest.parse({
  note: "As found",
  units,
  seen: "downstream",
  bores: ["brg-1", "brg-2"].map((id) => ({
    id,
    form: "points",
    points: [
      { h: 0.1, v: 180.05 },
      { h: 180.1, v: 0.05 },
      { h: 0.1, v: -179.95 },
      { h: -179.98, v: 0.05 },
    ],
  })),
});

const fit = (id: string, warned: boolean) => ({
  id,
  form: "points",
  method: "least_squares",
  centre: { h: 0.1, v: 0.05 },
  diameter: 360,
  roundness: 0.004,
  residuals: [0.002, -0.001, -0.002, 0.08],
  used: [true, true, true, false],
  exclusions: [{ index: 3, ratio: 21.4 }],
  contacts: null,
  covariance: null,
  expandedUncertainty: null,
  arc: { coverageDeg: 180, largestGapDeg: 180 },
  taper: null,
  tilt: null,
  ellipse: null,
  statistics: {
    readingsUsed: 3,
    parameters: 3,
    rms: 0.0017,
    chiSquare: null,
    varianceInflation: null,
    dilution: 1.4,
    iterations: 2,
  },
  warnings: warned
    ? [{ code: "no_redundancy", detail: "Three readings leave nothing to judge them by." }]
    : [],
});

export const axisRequest: AxisDeviationRequest = axisDeviationRequest.parse({
  note: "As found",
  units,
  axis: { method: "two_station", through: ["brg-1", "brg-2"] },
  stations: [
    { id: "brg-1", z: 0, centre: { h: 0, v: 0 }, tolerance: { radial: 0.05 } },
    {
      id: "cas-1",
      z: 1200,
      centre: { h: 0.12, v: -0.31 },
      target: { h: 0, v: -0.1 },
      tolerance: { radial: 0.1 },
    },
    { id: "cas-2", z: 2400, centre: { h: 0.03, v: -0.08 }, tolerance: { h: 0.1, v: [-0.1, 0.05] } },
    { id: "brg-2", z: 3600, centre: { h: 0, v: 0 } },
  ],
});

const station = (
  id: string,
  z: number,
  h: number,
  v: number,
  verdict: "conforms" | "undecided" | "exceeds" | null,
) => ({
  id,
  z,
  deviation: { h, v, radial: Math.hypot(h, v), clockDeg: h === 0 && v === 0 ? null : 90 },
  expandedUncertainty: { h: 0.01, v: 0.01, radial: 0.012, k: 2, kRadial: 2.45, dof: null },
  covariance: null,
  verdict,
  ratio: verdict === null ? null : 0.5,
  reference: id.startsWith("brg"),
  warnings: [],
});

export const moveRequest: ShimMoveRequest = shimMoveRequest.parse({
  note: "Moves to the axis",
  units,
  stations: [
    { id: "brg-1", z: 0, deviation: { h: 0, v: 0 }, tolerance: { radial: 0.05 } },
    { id: "cas-1", z: 1200, deviation: { h: 0.12, v: -0.31 }, tolerance: { radial: 0.1 } },
    { id: "exh-1", z: 3600, deviation: { h: 0, v: -0.6 }, tolerance: { radial: 0.1 } },
  ],
  reference: ["brg-1"],
  components: [
    {
      id: "casing",
      kind: "casing",
      stations: ["cas-1"],
      supports: [
        {
          id: "feet",
          z: 1200,
          form: "feet",
          stacks: { left: { thickness: 8, shims: [8] }, right: { thickness: 8, shims: [8] } },
        },
      ],
    },
    {
      id: "exhaust",
      stations: ["exh-1"],
      supports: [{ id: "exhaust-feet", z: 3600, form: "feet", travel: { v: [0, 0.3] } }],
    },
  ],
  shims: { cutToSize: { increment: 0.01 } },
  maximumIncrement: 0.25,
});

const feet = (h: number, v: number) => [{ support: "feet", h, v }];
const stack = (place: string) => ({
  support: "feet",
  place,
  ideal: 0.31,
  change: 0.31,
  from: 8,
  to: 8.31,
  add: [0.3, 0.01],
  remove: [],
  misfit: 0,
});

const moveResult = {
  components: [
    {
      id: "casing",
      fixed: false,
      moves: feet(-0.12, 0.31),
      realised: feet(-0.12, 0.31),
      stacks: [stack("left"), stack("right")],
    },
    {
      id: "exhaust",
      fixed: false,
      moves: [{ support: "exhaust-feet", h: 0, v: 0.3 }],
      realised: [{ support: "exhaust-feet", h: 0, v: 0.3 }],
      stacks: [],
      unreachable: {
        cause: "limit",
        reason: "The travel stops at 0.3 mm.",
        limit: "/components/1/supports/0/travel/v/1",
      },
    },
  ],
  predicted: [
    { id: "brg-1", deviation: { h: 0, v: 0, radial: 0, clockDeg: null }, verdict: "conforms" },
    { id: "cas-1", deviation: { h: 0, v: 0, radial: 0, clockDeg: null }, verdict: "conforms" },
    { id: "exh-1", deviation: { h: 0, v: -0.3, radial: 0.3, clockDeg: 180 }, verdict: "exceeds" },
  ],
  steps: [
    {
      order: 1,
      component: "casing",
      increments: [
        { moves: feet(-0.06, 0.155), indicators: [{ id: "di-1", reading: 0.155 }] },
        { moves: feet(-0.12, 0.31), indicators: [{ id: "di-1", reading: 0.31 }] },
      ],
      watch: [{ station: "brg-1", change: { h: 0, v: 0 }, stopAt: { h: [-0.02, 0.02], v: [-0.02, 0.02] } }],
    },
  ],
  remeasure: ["brg-1", "cas-1", "exh-1"],
  advice: [{ code: "shim_practice", detail: "At most four pieces in a stack." }],
};

const results = {
  "bore-fit": { request: boreRequest, result: { bores: [fit("brg-1", true), fit("brg-2", false)] } },
  "axis-deviation": {
    request: axisRequest,
    result: {
      axis: {
        method: "two_station",
        through: ["brg-1", "brg-2"],
        h: { at0: 0, slope: 0 },
        v: { at0: 0, slope: 0 },
        covariance: null,
        warnings: [],
      },
      stations: [
        station("brg-1", 0, 0, 0, "conforms"),
        station("cas-1", 1200, 0.12, -0.21, "exceeds"),
        station("cas-2", 2400, 0.03, -0.08, "undecided"),
        station("brg-2", 3600, 0, 0, null),
      ],
      summary: { conforms: 1, undecided: 1, exceeds: 1, worst: { id: "cas-1", ratio: 2.42 } },
    },
  },
  "shim-move": { request: moveRequest, result: moveResult },
} as const;

const schemas = {
  "bore-fit": boreFitResponse,
  "axis-deviation": axisDeviationResponse,
  "shim-move": shimMoveResponse,
} as const;

export type SampledKind = keyof typeof results;

/** What the service answers to the sample call of a kind. */
export function sampleResponse(kind: SampledKind): Record<string, unknown> {
  const { id, engineVersion, inputHash, createdAt } = sampleSummary();
  const { request, result } = results[kind];
  const extra = kind === "bore-fit" ? { seen: "downstream" } : { cautions: [] };
  const body = { id, kind, engineVersion, inputHash, createdAt, units: request.units, ...extra, result };
  schemas[kind].parse(body);
  return body;
}

/** A record of a kind that succeeded. */
export function sampleRecord(
  kind: SampledKind,
  overrides: Partial<CalculationSummary> = {},
): CalculationRecord {
  const request: Record<string, unknown> = { ...results[kind].request };
  const note = results[kind].request.note ?? null;
  return {
    ...sampleSummary({ kind, note, ...overrides }),
    request,
    response: sampleResponse(kind),
    problem: null,
  };
}

/** A record of a call that the engine refused. */
export function refusedRecord(): CalculationRecord {
  const detail = "2 readings cannot determine 3 unknowns.";
  return {
    ...sampleSummary({ status: "failed", resultHash: null }),
    request: { ...boreRequest },
    response: null,
    problem: {
      type: "/v1/problems/too_few_points",
      title: "There are fewer readings than the fit needs",
      status: 422,
      detail,
      code: "too_few_points",
      requestId: "req-200",
      errors: [{ pointer: "/bores/0/points", code: "too_few_points", detail }],
    },
  };
}
