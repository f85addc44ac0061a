import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import { confirmationRequest, type ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import { confirmed as base, surveyOf } from "../../tests/support/confirmation-requests.ts";
import { CalculationRefusal } from "./calculation-kind.ts";
import { confirmationKind } from "./confirmation.ts";

function faultsOf(request: ConfirmationRequest): readonly Fault[] {
  try {
    confirmationKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return error.faults;
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`).sort();

describe("confirmationKind.answer: refusals", () => {
  it("names every fault of both surveys, the reference, components, moves and log at once", () => {
    const [brg, cas1, cas2, noz, shr, brg2] = base.before.stations;
    const request: ConfirmationRequest = {
      ...base,
      before: {
        stations: [
          {
            ...brg!,
            covariance: [
              [1, 2],
              [2, 1],
            ],
          },
          cas1!,
          { ...cas2!, id: "cas-1" },
          noz!,
          shr!,
          brg2!,
        ],
      },
      after: {
        stations: [
          {
            ...brg!,
            covariance: [
              [1, 0.1],
              [0.2, 1],
            ],
          },
          { ...cas1!, tolerance: { h: [1, 1], v: 1 } },
          { ...noz!, z: 3721 },
          shr!,
        ],
      },
      reference: ["brg-1", "nobody", "brg-1"],
      components: [
        {
          id: "casing",
          stations: ["cas-1", "lost"],
          supports: [
            { id: "fore", z: 1 },
            { id: "fore", z: 2 },
          ],
        },
        { id: "casing", stations: ["cas-1"], carriedBy: "ghost" },
      ],
      moves: [
        { station: "nowhere", h: 0, v: 1 },
        { component: "ghost", support: "fore", h: 0, v: 1 },
        { component: "casing", support: "middle", h: 0, v: 1 },
        { component: "casing", h: 0, v: 1 },
        { support: "fore", h: 0, v: 1 },
        { h: 0, v: 1 },
        { station: "cas-1", component: "casing", support: "fore", h: 0, v: 1 },
        { station: "noz-1", h: 0, v: 1 },
        { station: "noz-1", h: 0, v: 2 },
      ],
      log: [
        { at: "2026-03-11T12:00:00Z", event: "moved" },
        { at: "2026-03-11T12:00:00Z", event: "moved", station: "lost" },
        { at: "2026-03-11T12:00:00Z", event: "measured", component: "lost" },
        { at: "2026-03-11T12:00:00Z", event: "measured", station: "noz-1", component: "casing" },
      ],
    };
    expect(places(faultsOf(request))).toEqual(
      [
        "/after/stations/0/covariance covariance_not_positive",
        "/after/stations/1/tolerance/h tolerance_invalid",
        "/after/stations/2/z combination_invalid",
        "/before/stations/0/covariance covariance_not_positive",
        "/before/stations/2/id duplicate_id",
        "/components/0/stations/1 unknown_reference",
        "/components/0/supports/1/id duplicate_id",
        "/components/1/carriedBy unknown_reference",
        "/components/1/id duplicate_id",
        "/components/1/stations/0 combination_invalid",
        "/log/0 combination_invalid",
        "/log/1/station unknown_reference",
        "/log/2/component unknown_reference",
        "/log/3 combination_invalid",
        "/moves/0/station unknown_reference",
        "/moves/1/component unknown_reference",
        "/moves/2/support unknown_reference",
        "/moves/3 combination_invalid",
        "/moves/4 combination_invalid",
        "/moves/5 combination_invalid",
        "/moves/6 combination_invalid",
        "/moves/8 combination_invalid",
        "/reference/1 unknown_reference",
        "/reference/2 duplicate_id",
      ].sort(),
    );
  });

  it("asks for two reference stations that stayed, where the set-up is new", () => {
    expect(places(faultsOf({ ...base, sameSetUp: false, reference: ["brg-1"] }))).toEqual([
      "/reference reference_count",
    ]);
    const moves = [...base.moves!, { station: "brg-2", h: 0.1, v: 0 }];
    expect(places(faultsOf({ ...base, sameSetUp: false, moves, reference: ["brg-1", "brg-2"] }))).toEqual([
      "/reference reference_count",
    ]);
    // With the set-up untouched one will do.
    expect(faultsOf({ ...base, reference: ["brg-1"] })).toEqual([]);
    expect(places(faultsOf({ ...base, sameSetUp: false, axis: { method: "line_of_sight" } }))).toEqual([
      "/axis/method combination_invalid",
    ]);
  });

  it("refuses reference stations at one z, and covariances of some of them", () => {
    const atOne = (survey: ConfirmationRequest["after"]) => ({
      stations: survey.stations.map((station) => ({ ...station, z: 100 })),
    });
    expect(places(faultsOf({ ...base, before: atOne(base.before), after: atOne(base.after) }))).toEqual([
      "/reference stations_coincident",
    ]);
    const stations = base.after.stations.map((station) =>
      station.id === "shr-1" ? { ...station, covariance: null } : station,
    );
    expect(places(faultsOf({ ...base, after: { stations } }))).toEqual([
      "/after/stations/4/covariance weights_incomplete",
    ]);
  });

  it("refuses a change that would be exact in some direction: nothing could be tested", () => {
    const exact = (survey: ConfirmationRequest["after"], covariance: number[][]) => ({
      stations: survey.stations.map((station) =>
        station.id === "noz-1" ? { ...station, covariance } : station,
      ),
    });
    for (const covariance of [
      [
        [0, 0],
        [0, 0],
      ],
      [
        [1, 1],
        [1, 1],
      ],
      [
        [1, 0],
        [0, 0],
      ],
    ]) {
      const request = {
        ...base,
        before: exact(base.before, covariance),
        after: exact(base.after, covariance),
      };
      expect(places(faultsOf(request))).toEqual(["/after/stations/3/covariance covariance_not_positive"]);
    }
    // One survey may be exact, or flat in another direction, when the other is not.
    const one = {
      ...base,
      before: exact(base.before, [
        [0, 0],
        [0, 0],
      ]),
    };
    expect(faultsOf(one)).toEqual([]);
  });

  it("wants a part's move at all of its supports, and a station's move once", () => {
    expect(places(faultsOf({ ...base, moves: base.moves!.slice(1) }))).toEqual([
      "/moves combination_invalid",
    ]);
    const twice = [...base.moves!, { station: "cas-1", h: 0, v: 0.1 }];
    expect(places(faultsOf({ ...base, moves: twice }))).toEqual(["/moves/2 combination_invalid"]);
  });

  it("refuses parts that carry each other in a ring, whatever its length", () => {
    const ring = (...ids: string[]) => ids.map((id, i) => ({ id, carriedBy: ids[(i + 1) % ids.length]! }));
    expect(places(faultsOf({ ...base, components: ring("a"), moves: [] }))).toEqual([
      "/components/0/carriedBy combination_invalid",
    ]);
    const components = [{ id: "x", carriedBy: "a" }, ...ring("a", "b", "c")];
    expect(places(faultsOf({ ...base, components, moves: [] }))).toEqual(
      [0, 1, 2, 3].map((i) => `/components/${i}/carriedBy combination_invalid`),
    );
  });
});

describe("confirmationKind.faultsBesideSchema", () => {
  const beside = (body: unknown) => places(confirmationKind.faultsBesideSchema!(body, []));

  it("finds the faults of the sound parts beside one that the schema refuses", () => {
    const [first, ...rest] = base.after.stations;
    const body = {
      ...base,
      units: undefined,
      after: {
        stations: [
          { ...first, centre: { h: 0 } },
          { ...rest[0], tolerance: { radial: 0 }, id: "brg-1" },
          ...rest.slice(1),
        ],
      },
      reference: ["brg-1", "nobody"],
      log: [{ at: "yesterday" }, { at: "2026-03-11T12:00:00Z", event: "moved" }],
    };
    expect(beside(body)).toEqual([
      "/after/stations/1/id duplicate_id",
      "/log/1 combination_invalid",
      "/reference/1 unknown_reference",
    ]);
  });

  it("does not take what hangs on a broken part for a fault of its own", () => {
    const stations = [{ ...base.after.stations[0], z: "far" }, ...base.after.stations.slice(1)];
    expect(beside({ ...base, sameSetUp: false, reference: ["brg-1"], after: { stations } })).toEqual([]);
    expect(beside({ ...base, components: [{ ...base.components![0], stations: "all" }] })).toEqual([]);
    expect(beside({ ...base, sameSetUp: "yes", reference: ["brg-1"] })).toEqual([]);
  });

  it("makes something of any body", () => {
    fc.assert(
      fc.property(fc.anything(), fc.anything(), fc.anything(), (one, two, three) => {
        expect(Array.isArray(beside(one))).toBe(true);
        expect(Array.isArray(beside({ ...base, before: one, components: two, moves: [three, one] }))).toBe(
          true,
        );
        expect(Array.isArray(beside({ ...base, after: { stations: [one, two] }, log: three }))).toBe(true);
      }),
    );
  });
});

describe("confirmationRequest", () => {
  it("requires units, both surveys and whether the set-up is the same, and nothing else", () => {
    const minimal = {
      units: base.units,
      sameSetUp: true,
      before: { stations: [{ id: "a", z: 0, centre: { h: 0, v: 0 } }] },
      after: { stations: [{ id: "a", z: 0, centre: { h: 0, v: 0 } }] },
    };
    expect(confirmationRequest.safeParse(minimal).success).toBe(true);
    for (const member of ["units", "sameSetUp", "before", "after"]) {
      expect(confirmationRequest.safeParse({ ...minimal, [member]: undefined }).success).toBe(false);
    }
    const wrong = { ...surveyOf().stations[0], weight: 1 };
    expect(confirmationRequest.safeParse({ ...minimal, before: { stations: [wrong] } }).success).toBe(false);
  });
});
