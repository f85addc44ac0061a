import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput, wallPoint } from "../../../tests/support/bore-inputs.ts";
import { codesOf, fitOrCode } from "../../../tests/support/criterion-inputs.ts";
import type { PointsInput, WallPoint } from "./bore-input.ts";
import { fitByCriterion, type CriterionMethod } from "./fit-criterion.ts";

const limiting = ["minimum_zone", "maximum_inscribed", "minimum_circumscribed"] as const;
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const origin = { hMm: 0, vMm: 0 };
const ringOf = (count: number, fromDeg: number, overDeg: number, off: (i: number) => number) =>
  clockAngles(count, fromDeg, overDeg).map((clockDeg, i) => onRing(origin, 100, clockDeg, off(i)));
const wave = (i: number) => 0.03 * Math.cos(5 * i * i);

describe("a limiting circle warns", () => {
  const codes = (points: readonly WallPoint[], method: CriterionMethod, rest: Partial<PointsInput> = {}) => {
    const fit = fitOrCode(pointsInput(points, rest), method);
    return typeof fit === "string" ? fit : codesOf(fit);
  };

  it("that a circumscribed circle does not suit less than half a bore", () => {
    expect(codes(ringOf(15, 20, 170, wave), "minimum_circumscribed")).toContain("criterion_unsuited_to_arc");
    expect(codes(ringOf(15, 20, 190, wave), "minimum_circumscribed")).toEqual([]);
    // So flat that there is no round centre to see it from.
    const flat = [0, 1, 2, 3, 4].map((i) => wallPoint(i, i % 2 ? 1e-8 : 0));
    expect(codes(flat, "minimum_circumscribed")).toContain("criterion_unsuited_to_arc");
  });

  it("of a weak arc, by how badly the contacts lie", () => {
    expect(codes(ringOf(40, 0, 60, wave), "minimum_zone")).toContain("weak_arc");
    expect(codes(ringOf(360, 0, 360, wave), "minimum_zone")).toEqual([]);
  });

  it("of a tie closer than the reading uncertainty", () => {
    // Two holes side by side, their largest circles 10 and 10 + 0.004 in radius.
    const holes = [
      ...clockAngles(24).map((t) => onRing({ hMm: -12, vMm: 0 }, 10, t)),
      ...clockAngles(24).map((t) => onRing({ hMm: 12, vMm: 0 }, 10, t, 0.004)),
    ];
    const u = (readingUncertaintyMm: number | null) => ({ readingUncertaintyMm });
    expect(codes(holes, "maximum_inscribed", u(0.005))).toContain("another_centre_as_good");
    expect(codes(holes, "maximum_inscribed", u(0.003))).not.toContain("another_centre_as_good");
    expect(codes(holes, "maximum_inscribed")).not.toContain("another_centre_as_good");
    near(fitByCriterion(pointsInput(holes), "maximum_inscribed").centre.hMm, 12, 1e-9);
    // An uncertainty so large that both are one place.
    expect(codes(holes, "maximum_inscribed", u(25))).not.toContain("another_centre_as_good");
    // To the last digit, without any uncertainty: a rhombus.
    const rhombus = [wallPoint(1.1, 0), wallPoint(-1.1, 0), wallPoint(0, 0.9), wallPoint(0, -0.9)];
    expect(codes(rhombus, "maximum_inscribed")).toContain("another_centre_as_good");
    // Two zones of one width about different centres.
    const crossed = [wallPoint(0, 0), wallPoint(1, 0), wallPoint(-1, 0), wallPoint(0, 1), wallPoint(0, -1)];
    expect(codes(crossed, "minimum_zone")).toContain("another_centre_as_good");
  });

  it("that nothing is left over, of coordinates at their resolution, and of another size than named", () => {
    const three = [wallPoint(0, 0), wallPoint(2, 0), wallPoint(1, 1.5)];
    for (const method of limiting) expect(codes(three, method)).toContain("no_redundancy");
    const far = ringOf(20, 0, 360, () => 0).map(({ hMm, vMm }) => wallPoint(hMm + 1e10, vMm));
    expect(codes(far, "minimum_zone")).toContain("readings_at_number_resolution");
    const named = { nominalDiameterMm: 100 };
    expect(codes(ringOf(20, 0, 360, wave), "minimum_zone", named)).toEqual(["diameter_far_from_nominal"]);
  });
});

describe("fitByCriterion refuses", () => {
  const code = (points: readonly WallPoint[], method: CriterionMethod, rest: Partial<PointsInput> = {}) => {
    const fit = fitOrCode(pointsInput(points, rest), method);
    return typeof fit === "string" ? fit : null;
  };

  it("an inscribed circle where the readings leave half the bore open, and no sooner", () => {
    expect(code(ringOf(15, 20, 170, wave), "maximum_inscribed")).toBe("no_inscribed_circle");
    expect(code(ringOf(15, 20, 200, wave), "maximum_inscribed")).toBeNull();
    // A right angle: the circle's centre lies on a side, its contacts leave 180°.
    const right = [wallPoint(0, 0), wallPoint(4, 0), wallPoint(0, 3)];
    expect(code(right, "maximum_inscribed")).toBe("no_inscribed_circle");
    const acute = [wallPoint(0, 0), wallPoint(4, 0), wallPoint(2, 3)];
    expect(code(acute, "maximum_inscribed")).toBeNull();
  });

  it("a zone no narrower than a straight strip", () => {
    const rows = Array.from({ length: 20 }, (_, i) => [wallPoint(i, 0), wallPoint(i, 1)]).flat();
    expect(code(rows, "minimum_zone")).toBe("arc_too_flat");
    expect(code(rows, "minimum_circumscribed")).toBeNull();
  });

  it.each([...limiting, "ellipse"] as const)("what no criterion can use: %s", (method) => {
    const line = [0, 1, 2, 3, 4, 5].map((i) => wallPoint(i, 2 * i));
    const place = [0, 1, 2, 3, 4, 5].map(() => wallPoint(3, 3));
    const ring = ringOf(12, 0, 360, wave);
    expect(code([], method)).toBe("too_few_points");
    expect(code(ring.slice(0, 2), method)).toBe("too_few_points");
    expect(code(line, method)).toBe("points_collinear");
    expect(code(place, method)).toBe("points_coincident");
    expect(
      code(
        ring.map((p, i) => ({ ...p, uMm: i ? 1 : null })),
        method,
      ),
    ).toBe("uncertainty_incomplete");
    const planes = ring.map((p, i) => ({ ...p, zMm: i % 2 ? 0 : 50 }));
    expect(code(planes, method)).toBe("combination_invalid");
    expect(code(planes, method, { taper: { form: "estimate" } })).toBe("combination_invalid");
    expect(code(ring, method, { taper: { form: "known", halfAngleDeg: 3 } })).toBe("combination_invalid");
    // One plane is one plane, whatever its z.
    expect(
      code(
        ring.map((p) => ({ ...p, zMm: 50 })),
        method,
      ),
    ).toBeNull();
  });

  it("a cone whose tip lies among the readings", () => {
    const ring = ringOf(12, 0, 360, wave).map((p, i) => ({ ...p, zMm: i % 2 ? 0 : 5 }));
    const steep = { taper: { form: "known", halfAngleDeg: 88.9 } } as const;
    expect(code(ring, "minimum_zone", steep)).toBe("radius_not_positive");
    expect(code(ring, "maximum_inscribed", steep)).toBe("radius_not_positive");
    // Round all readings there is room for such a cone: it touches those of one plane only.
    expect(code(ring, "minimum_circumscribed", steep)).toBeNull();
  });
});
