import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import { casing, moveRequest as base, padBearing } from "../../tests/support/move-requests.ts";
import { CalculationRefusal } from "./calculation-kind.ts";
import { shimMoveKind } from "./shim-move.ts";

function faultsOf(request: ShimMoveRequest): readonly Fault[] {
  try {
    shimMoveKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return error.faults;
    throw error;
  }
  return [];
}

const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`).sort();
const seat = padBearing.supports![0]!;

describe("shimMoveKind.answer: refusals", () => {
  it("names every fault of stations, references, components and indicators at once", () => {
    const [brg, fore, aft] = base.stations;
    const request: ShimMoveRequest = {
      ...base,
      stations: [
        {
          ...brg!,
          covariance: [
            [1, 2],
            [2, 1],
          ],
        },
        { ...fore!, id: "brg", tolerance: { h: [0.1, 0.1], v: 1 } },
        {
          ...aft!,
          covariance: [
            [1, 0.1],
            [0.2, 1],
          ],
        },
      ],
      reference: ["nobody", "aft", "aft"],
      components: [
        { ...padBearing, stations: ["brg", "aft", "lost"], supports: [seat, seat] },
        { ...casing, id: "bearing", stations: ["aft"], allowReferenceMove: true, supports: [] },
      ],
      indicators: [
        { id: "dial", component: "bearing", z: 0, clockDeg: 0 },
        { id: "dial", component: "ghost", z: 0, clockDeg: 0 },
      ],
    };
    expect(places(faultsOf(request))).toEqual(
      [
        "/components/0/stations/2 unknown_reference",
        "/components/0/supports/1/id duplicate_id",
        "/components/1/id duplicate_id",
        "/components/1/stations/0 combination_invalid",
        "/components/1/supports supports_insufficient",
        "/indicators/1/component unknown_reference",
        "/indicators/1/id duplicate_id",
        "/reference/0 unknown_reference",
        "/reference/2 duplicate_id",
        "/stations/0/covariance covariance_not_positive",
        "/stations/1/id duplicate_id",
        "/stations/1/tolerance/h tolerance_invalid",
        "/stations/2/covariance covariance_not_positive",
      ].sort(),
    );
  });

  it("names every fault of supports, pads and stacks at once", () => {
    const stack = { thickness: 3, shims: [2, 0.9], min: 2, max: 1 };
    const request: ShimMoveRequest = {
      ...base,
      components: [
        {
          ...padBearing,
          supports: [
            {
              id: "seat",
              z: 0,
              form: "pads",
              travel: { h: [1, -1], v: [0, 0] },
              pads: [
                { id: "right", clockDeg: 135, stack },
                { id: "right", clockDeg: 225, stack: { thickness: 0, shims: [] } },
              ],
            },
          ],
        },
        {
          ...casing,
          supports: [
            { id: "feet", z: 0, form: "feet", stacks: { left: { thickness: 1 } } },
            { id: "keys", z: 9, form: "joint_keys", stacks: { "key-right": { thickness: 1, shims: [0.5] } } },
          ],
        },
      ],
    };
    expect(places(faultsOf(request))).toEqual(
      [
        "/components/0/supports/0/pads/0/stack/max combination_invalid",
        "/components/0/supports/0/pads/0/stack/shims combination_invalid",
        "/components/0/supports/0/pads/1/id duplicate_id",
        "/components/0/supports/0/travel/h combination_invalid",
        "/components/1/supports/0/stacks combination_invalid",
        "/components/1/supports/1/stacks combination_invalid",
        "/components/1/supports/1/stacks/key-right/shims combination_invalid",
      ].sort(),
    );
  });

  it("names carriers, couplings, tilts and rolls that refer to nothing or to themselves", () => {
    const request: ShimMoveRequest = {
      ...base,
      components: [
        {
          ...padBearing,
          carriedBy: "casing",
          tilt: { tolerance: { h: 1e-5, v: 1e-5 } },
          roll: {
            radians: 0.001,
            feet: [
              { support: "seat", place: "right", h: 100, v: -100 },
              { support: "nowhere", place: "left", h: 100, v: -100 },
            ],
          },
        },
        { ...casing, carriedBy: "bearing" },
        { id: "cover", fixed: true, carriedBy: "ghost" },
      ],
      couplings: [
        { component: "casing", support: "rear", station: "aft", h: 0, v: 0.1 },
        { component: "casing", support: "seat", station: "lost", h: 0, v: 0.1 },
        { component: "ghost", support: "seat", station: "brg", h: 0, v: 0.1 },
      ],
    };
    expect(places(faultsOf(request))).toEqual(
      [
        "/components/0/carriedBy combination_invalid",
        "/components/0/roll/feet combination_invalid",
        "/components/0/roll/feet/0/place unknown_reference",
        "/components/0/roll/feet/1/support unknown_reference",
        "/components/0/tilt combination_invalid",
        "/components/1/carriedBy combination_invalid",
        "/components/2/carriedBy unknown_reference",
        "/couplings/0/station combination_invalid",
        "/couplings/1/station unknown_reference",
        "/couplings/1/support unknown_reference",
        "/couplings/2/component unknown_reference",
      ].sort(),
    );
  });

  it("takes shims from stock, their reuse, and minimax", () => {
    const request: ShimMoveRequest = {
      ...base,
      shims: { stock: [{ thickness: 0.05, quantity: 4 }, { thickness: 0.1 }], reuse: true },
      objective: "minimax",
    };
    expect(faultsOf(request)).toEqual([]);
  });

  it("takes pieces that add up but for their rounding, and an empty stock beside shims cut to size", () => {
    const stack = { thickness: 0.3, shims: [0.1, 0.1, 0.1] };
    const pads = [
      { id: "a", clockDeg: 135, stack },
      { id: "b", clockDeg: 225, stack },
    ];
    const components = [
      { ...padBearing, supports: [{ id: "s", z: 0, form: "pads" as const, pads }] },
      casing,
    ];
    expect(0.1 + 0.1 + 0.1).not.toBe(0.3);
    expect(faultsOf({ ...base, components, shims: { stock: [], cutToSize: { increment: 0.01 } } })).toEqual(
      [],
    );
    expect(faultsOf({ ...base, components, shims: { stock: [] } })).toEqual([]);
  });

  it("refuses to split moves into more parts than one call takes", () => {
    let refusal: unknown;
    try {
      shimMoveKind.answer({ ...base, maximumIncrement: 1e-5 });
    } catch (error) {
      refusal = error;
    }
    expect(refusal).toMatchObject({ code: "combination_invalid", details: { at: ["maximumIncrement"] } });
  });
});

describe("shimMoveKind.faultsBesideSchema", () => {
  const beside = (body: unknown) => places(shimMoveKind.faultsBesideSchema!(body, []));

  it("finds the faults of sound parts beside those that the schema refuses", () => {
    const body = {
      ...base,
      units: undefined,
      stations: [{ ...base.stations[0], z: "far" }, ...base.stations.slice(1)],
      reference: ["brg", "nobody"],
      components: [
        { ...padBearing, stations: ["brg", "lost"] },
        { ...casing, supports: "none" },
      ],
      objective: "minimax",
      shims: { stock: "much" },
    };
    expect(beside(body)).toEqual(
      ["/components/0/stations/1 unknown_reference", "/reference/1 unknown_reference"].sort(),
    );
  });

  it("makes something of any body", () => {
    fc.assert(
      fc.property(fc.anything(), fc.anything(), fc.anything(), (body, one, other) => {
        expect(Array.isArray(beside(body))).toBe(true);
        expect(Array.isArray(beside({ ...base, components: one, stations: other }))).toBe(true);
        expect(Array.isArray(beside({ ...base, components: [one, other], indicators: [one] }))).toBe(true);
      }),
    );
  });
});
