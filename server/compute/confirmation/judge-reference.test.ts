import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { PlaneCovariance } from "../plane.ts";
import { judgeReference, type ReferenceJudgement } from "./judge-reference.ts";
import { changeOf, type StationChange } from "./survey-change.ts";

const u = 0.004;
const known: PlaneCovariance = { hhMm2: u * u, hvMm2: 0.2 * u * u, vvMm2: u * u };
const zs = [0, 1240, 2480, 3720, 5150, 6900];

type Vector = readonly [number, number];

/** Stations at the first so many z, each changed by so much, both surveys with the same covariance. */
function changed(vectors: readonly Vector[], covariance: PlaneCovariance | null = known): StationChange[] {
  return vectors.map(([hMm, vMm], i) =>
    changeOf({
      zMm: zs[i]!,
      before: { centre: { hMm: 0.02, vMm: -0.1 }, covariance, dof: null },
      after: { centre: { hMm: 0.02 + hMm, vMm: -0.1 + vMm }, covariance, dof: null },
    }),
  );
}

function judge(
  vectors: readonly Vector[],
  sameSetUp: boolean,
  extra: Partial<Parameters<typeof judgeReference>[0]> = {},
) {
  const changes = changed(vectors);
  const reference = vectors.map((_, index) => index);
  return judgeReference({ changes, reference, someMissing: false, sameSetUp, level: 0.95, ...extra });
}
const summary = ({ repeats, cause, moved, frame, notices }: ReferenceJudgement) => ({
  repeats,
  cause,
  moved,
  frame: frame.line ? "reference" : "fixed",
  notices,
});

const still: Vector = [0.002, -0.003];
const shifted = (i: number): Vector => [0.2 - 3e-5 * zs[i]! + 0.001 * (i % 2), 0.1 + 2e-5 * zs[i]!];

describe("judgeReference, set-up untouched", () => {
  it("finds that stations repeat within their uncertainty, one by one, be there one or many", () => {
    for (const count of [1, 2, 3, 6]) {
      const found = judge(
        Array.from({ length: count }, () => still),
        true,
      );
      expect(summary(found)).toEqual({
        repeats: true,
        cause: "none",
        moved: [],
        frame: "fixed",
        notices: [],
      });
      expect(found.perStation.map(({ test }) => test?.within)).toEqual(Array(count).fill(true));
    }
  });

  it("tells one station that moved from a shift and tilt that all share", () => {
    const one = judge([still, [0.06, 0], still], true);
    expect(summary(one)).toMatchObject({ repeats: false, cause: "station", moved: [1], frame: "fixed" });
    // What the two others share is not what the one that moved did.
    expect(Math.abs(one.shared!.h.at0Mm - 0.002)).toBeLessThan(1e-12);
    const common = judge([0, 1, 2].map(shifted), true);
    expect(summary(common)).toMatchObject({ repeats: false, cause: "common", moved: [], frame: "reference" });
    expect(Math.abs(common.shared!.v.slope - 2e-5)).toBeLessThan(1e-6);
    expect(common.perStation.every(({ test }) => test?.within)).toBe(true);
  });

  it("finds both at once from four stations on", () => {
    const vectors = [0, 1, 2, 3, 4]
      .map(shifted)
      .map(([h, v], i): Vector => (i === 3 ? [h, v + 0.09] : [h, v]));
    expect(summary(judge(vectors, true))).toEqual({
      repeats: false,
      cause: "common_and_station",
      moved: [3],
      frame: "reference",
      notices: ["axis_moved", "reference_moved_by_itself"],
    });
  });

  it("names several that moved by themselves", () => {
    const found = judge([still, [0.07, 0], still, [0, -0.08], still], true);
    expect(summary(found)).toMatchObject({ repeats: false, cause: "several", moved: [1, 3], frame: "fixed" });
  });

  it("does not pretend to tell where it cannot", () => {
    for (const vectors of [[[0.06, 0]], [[0.06, 0], still]] as Vector[][]) {
      expect(summary(judge(vectors, true))).toEqual({
        repeats: false,
        cause: "undetermined",
        moved: [],
        frame: "fixed",
        notices: ["two_references_cannot_tell"],
      });
    }
    // The end of three, off by little more than its limit: a tilt about the other end does as well.
    const small = judge(
      [
        [0, 0],
        [0.004, 0],
        [0.0155, 0],
      ],
      true,
    );
    expect(summary(small)).toMatchObject({ cause: "undetermined", notices: ["cause_undetermined"] });
  });

  it("proves nothing of stations without covariances, of none, or where some are missing", () => {
    const bare = judge([still, still, still], true, { changes: changed([still, still, still], null) });
    expect(summary(bare)).toMatchObject({ repeats: null, cause: null, notices: ["uncertainty_unknown"] });
    expect(bare.shared).not.toBeNull();
    expect(judge([], true).repeats).toBeNull();
    expect(judge([still, still], true, { someMissing: true }).repeats).toBeNull();
    expect(judge([still, [0.06, 0]], true, { someMissing: true }).repeats).toBe(false);
  });
});

describe("judgeReference, set up anew", () => {
  it("does not take the shift and tilt between set-ups for a change", () => {
    for (const count of [3, 4, 6]) {
      const found = judge(
        Array.from({ length: count }, (_, i) => shifted(i)),
        false,
      );
      expect(summary(found)).toMatchObject({ repeats: true, cause: "none", frame: "reference", notices: [] });
    }
  });

  it("proves nothing by two", () => {
    const found = judge(
      [
        [0.5, 0],
        [-3, 2],
      ],
      false,
    );
    expect(summary(found)).toEqual({
      repeats: null,
      cause: null,
      moved: [],
      frame: "reference",
      notices: ["two_references_prove_nothing"],
    });
    expect(found.perStation.map(({ deviation }) => deviation)).toEqual([
      { hMm: 0, vMm: 0 },
      { hMm: 0, vMm: 0 },
    ]);
  });

  it("shows by three that one moved, and not which", () => {
    const vectors = [0, 1, 2].map(shifted).map(([h, v], i): Vector => (i === 1 ? [h + 0.1, v] : [h, v]));
    const found = judge(vectors, false);
    expect(summary(found)).toMatchObject({
      repeats: false,
      cause: "undetermined",
      moved: [],
      notices: ["three_references_cannot_name"],
    });
    // Three residuals of a line have one freedom a plane: they stand out alike.
    const sizes = found.perStation.map(({ test }) => test!.statistic);
    expect(Math.max(...sizes) / Math.min(...sizes) - 1).toBeLessThan(1e-6);
  });

  it("names the one of four or more that moved, whichever it is, and leaves it out of the axis", () => {
    for (const count of [4, 5, 6]) {
      for (let which = 0; which < count; which += 1) {
        const vectors = Array.from({ length: count }, (_, i) => shifted(i)).map(([h, v], i): Vector =>
          i === which ? [h + 0.12, v - 0.09] : [h, v],
        );
        const found = judge(vectors, false);
        expect(summary(found)).toMatchObject({ repeats: false, cause: "station", moved: [which] });
        expect(found.frame.line?.through).not.toContain(which);
        expect(found.perStation.map(({ test }) => test?.within)).toEqual(vectors.map((_, i) => i !== which));
        const { deviation } = found.perStation[which]!;
        expect(Math.hypot(deviation.hMm - 0.12, deviation.vMm + 0.09)).toBeLessThan(0.005);
      }
    }
  });

  it("says that several moved where no single one explains it", () => {
    const vectors = [0, 1, 2, 3, 4, 5]
      .map(shifted)
      .map(([h, v], i): Vector => (i === 1 ? [h + 0.1, v] : i === 4 ? [h, v - 0.1] : [h, v]));
    expect(summary(judge(vectors, false))).toMatchObject({ repeats: false, cause: "several", moved: [] });
  });

  it("does not call a station proved whose change could not show", () => {
    const far = judge([still, still, still], false, {
      changes: [0, 0, 5000].map((zMm) => ({ ...changed([still])[0]!, zMm })),
    });
    expect(summary(far)).toMatchObject({ repeats: null, cause: null, notices: ["station_not_controlled"] });
    expect(() =>
      judge([still, still, still], false, {
        changes: changed([still, still, still]).map((each) => ({ ...each, zMm: 7 })),
      }),
    ).toThrow(expect.objectContaining({ code: "rank_deficient" }));
  });
});

describe("judgeReference, either way", () => {
  it("comes to the same whatever the order of the stations, and mirrored", () => {
    const vector = fc.tuple(fc.integer({ min: -40, max: 40 }), fc.integer({ min: -40, max: 40 }));
    fc.assert(
      fc.property(fc.array(vector, { minLength: 3, maxLength: 6 }), fc.boolean(), (sizes, sameSetUp) => {
        const vectors = sizes.map(([h, v]): Vector => [h / 1000, v / 1000]);
        const found = judge(vectors, sameSetUp);
        const back = judge(vectors, sameSetUp, { reference: vectors.map((_, i) => vectors.length - 1 - i) });
        expect([back.repeats, back.cause, [...back.moved].sort()]).toEqual([
          found.repeats,
          found.cause,
          [...found.moved].sort(),
        ]);
        const mirrored = judge(vectors, sameSetUp, {
          changes: changed(vectors).map(({ change, error, zMm }) =>
            changeOf({
              zMm,
              before: {
                centre: { hMm: 0, vMm: 0 },
                covariance: { ...known, hvMm2: -known.hvMm2 },
                dof: null,
              },
              after: {
                centre: { hMm: -change.hMm, vMm: change.vMm },
                covariance: error && { ...known, hvMm2: -known.hvMm2 },
                dof: null,
              },
            }),
          ),
        });
        expect([mirrored.repeats, mirrored.cause, mirrored.moved]).toEqual([
          found.repeats,
          found.cause,
          found.moved,
        ]);
      }),
    );
  });

  it("finds the station that moved, or says that it cannot, in drawings with a fixed seed", () => {
    const random = seededRandom(19);
    const wrong = { untouched: 0, anew: 0 };
    const draws = 400;
    for (let draw = 0; draw < draws; draw += 1) {
      const which = draw % 5;
      const noise = (): Vector => [u * Math.SQRT2 * random.normal(), u * Math.SQRT2 * random.normal()];
      const drawn = Array.from({ length: 5 }, noise).map(([h, v], i): Vector =>
        i === which ? [h + 0.08, v] : [h, v],
      );
      const untouched = judge(drawn, true);
      const anew = judge(
        drawn.map(([h, v], i) => [h + shifted(i)[0], v + shifted(i)[1]] as const),
        false,
      );
      if (untouched.cause === "station" && untouched.moved[0] !== which) wrong.untouched += 1;
      if (anew.cause === "station" && anew.moved[0] !== which) wrong.anew += 1;
      expect(anew.repeats).toBe(false);
      expect(untouched.repeats).toBe(false);
    }
    expect(wrong).toEqual({ untouched: 0, anew: 0 });
  });
});
