import { describe, expect, it } from "vitest";
import { fewestMovesRequest } from "../../shared/schemas/fewest-moves.ts";
import { fewestRequest as base } from "../../tests/support/fewest-requests.ts";
import { fewestMovesFaults, fewestMovesFaultsBesideSchema } from "./fewest-moves-faults.ts";

const placesOf = (body: object) =>
  fewestMovesFaults(fewestMovesRequest.parse({ ...base, ...body }))
    .map(({ pointer, code }) => `${pointer} ${code}`)
    .sort();
const [casing, ring] = base.components;

describe("fewestMovesFaults", () => {
  it("finds none in a sound call", () => expect(placesOf({})).toEqual([]));

  it("names every faulty part of a call at once", () => {
    const places = placesOf({
      stations: [
        ...base.stations,
        { id: "brg-1", z: 1, deviation: { h: 0, v: 0 }, tolerance: { h: [1, 0], v: 1 } },
        {
          id: "odd",
          z: 2,
          deviation: { h: 0, v: 0 },
          covariance: [
            [1, 5],
            [5, 1],
          ],
        },
      ],
      reference: [{ id: "brg-1", float: { h: [1, -1] } }, { id: "nobody" }, { id: "brg-1" }],
      components: [
        { ...casing, stations: ["cas-1", "nothing"] },
        { ...ring, id: "casing", stations: ["cas-1"], carriedBy: "none" },
        { id: "bare", stations: [] },
      ],
    });
    expect(places).toEqual([
      "/components/0/stations/1 unknown_reference",
      "/components/1/carriedBy unknown_reference",
      "/components/1/id duplicate_id",
      "/components/1/stations/0 combination_invalid",
      "/components/1/supports/0/travel combination_invalid",
      "/components/2/supports supports_insufficient",
      "/reference/0/float/h combination_invalid",
      "/reference/1/id unknown_reference",
      "/reference/2/id duplicate_id",
      "/stations/6/id duplicate_id",
      "/stations/6/tolerance/h tolerance_invalid",
      "/stations/7/covariance covariance_not_positive",
    ]);
  });

  it("holds an axis that floats at two stations apart along z", () => {
    expect(placesOf({ reference: [{ id: "brg-1" }] })).toEqual(["/reference reference_count"]);
    const together = base.stations.map((station) => ({ ...station, z: 5 }));
    expect(placesOf({ stations: together })).toEqual(["/reference stations_coincident"]);
    expect(placesOf({ reference: [] })).toEqual([]);
  });

  it("refuses what it would have to leave out", () => {
    const tilt = { tolerance: { h: 0.001, v: 0.001 } };
    const feet = [
      { support: "aft", place: "left", h: -1000, v: -500 },
      { support: "aft", place: "right", h: 1000, v: -500 },
    ];
    expect(placesOf({ components: [{ ...casing, tilt, roll: { radians: 0.001, feet } }] })).toEqual([
      "/components/0/roll not_available",
      "/components/0/tilt not_available",
    ]);
  });

  it("asks parts that carry each other for their travel in each plane, but not those that may not move", () => {
    const linked = (rest: object, carrier: object = {}) =>
      placesOf({
        components: [
          { ...casing, ...carrier },
          { ...ring, carriedBy: "casing", ...rest },
        ],
      });
    expect(linked({})).toEqual(["/components/1/supports/0/travel combination_invalid"]);
    expect(linked({ fixed: true })).toEqual([]);
    const supports = [{ id: "keys", z: 3000, form: "joint_keys", blocked: ["h"], travel: { v: [-1, 1] } }];
    expect(linked({ supports })).toEqual([]);
    expect(linked({ supports }, { supports: [{ id: "f", z: 0, form: "feet" }] })).toEqual([
      "/components/0/supports/0/travel combination_invalid",
    ]);
    expect(linked({ carriedBy: "ring-a" })).toContain("/components/1/carriedBy combination_invalid");
  });
});

describe("fewestMovesFaultsBesideSchema", () => {
  it("names domain faults of the sound parts of any body", () => {
    const body = {
      stations: [base.stations[0], { id: "x", z: "far" }],
      reference: [{ id: "brg-1" }, 7, { id: "gone", float: { v: [2, 1] } }],
      components: [{ ...ring, stations: ["unknown"] }, { cost: -1 }],
    };
    expect(fewestMovesFaultsBesideSchema(body).map(({ pointer, code }) => `${pointer} ${code}`)).toEqual([
      "/reference/2/id unknown_reference",
      "/reference/2/float/v combination_invalid",
      "/components/0/stations/0 unknown_reference",
    ]);
    for (const odd of [null, [], "text", { stations: 4, reference: {}, components: null }]) {
      expect(fewestMovesFaultsBesideSchema(odd)).toEqual([]);
    }
  });
});
