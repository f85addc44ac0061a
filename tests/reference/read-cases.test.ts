import { describe, expect, it } from "vitest";
import { mismatches } from "./read-cases.ts";

describe("mismatches", () => {
  const tolerance = {
    centre: { abs: 0.01 },
    radius: { rel: 0.1 },
    matrix: { rel_to_max: 0.01 },
    ids: "exact set",
  };
  const expected = {
    centre: [1, 2],
    radius: 10,
    matrix: [
      [100, 1],
      [1, 4],
    ],
    ids: ["a", "b"],
  };

  it("finds nothing where every number is within its tolerance", () => {
    const got = {
      centre: [1.009, 2],
      radius: 10.9,
      matrix: [
        [100, 1.9],
        [1, 4],
      ],
      ids: ["b", "a"],
    };
    expect(mismatches({ expected, tolerance }, got)).toEqual([]);
  });

  it.each([
    ["centre", { centre: [1.011, 2] }],
    ["centre", { centre: [1] }],
    ["centre", { centre: [NaN, 2] }],
    ["radius", { radius: 11.1 }],
    ["radius", { radius: undefined }],
    [
      "matrix",
      {
        matrix: [
          [100, 2.1],
          [1, 4],
        ],
      },
    ],
    ["ids", { ids: ["a", "c"] }],
  ])("names %s when it is %j", (field, change) => {
    expect(mismatches({ expected, tolerance }, { ...expected, ...change }).map((one) => one.field)).toEqual([
      field,
    ]);
  });

  it("names a field that is missing on either side", () => {
    expect(mismatches({ expected: {}, tolerance: { radius: { abs: 1 } } }, { radius: 1 })).toHaveLength(1);
  });

  it("passes over a tolerance that is free text", () => {
    expect(mismatches({ expected, tolerance: { radius: "about ten" } }, { radius: 99 })).toEqual([]);
  });
});
