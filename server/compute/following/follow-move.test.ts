import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { followMove, type MoveReadings } from "./follow-move.ts";

/*
 * A rigid part moves by δ(z) = δ₀ + θ·(z − z̄) in each plane (statics of a rigid body); what an indicator or the line of
 * sight reads of it is built from that formula here, by hand, and given to the function.
 */
const supports = [
  { id: "forward", zMm: 0, blocked: [] },
  { id: "aft", zMm: 2000, blocked: [] },
] as const;
const wanted = [
  { supportId: "forward", hMm: 0.3, vMm: -0.2 },
  { supportId: "aft", hMm: 0.1, vMm: 0.4 },
];
const base: MoveReadings = { supports, wanted, indicators: [], sights: [], enoughMm: 0.02 };
const close = (actual: number | null, expected: number) =>
  expect(Math.abs((actual ?? Number.NaN) - expected)).toBeLessThan(1e-12); // mm

/** Shift at the forward end and at the aft one. */
const moveOf = (forward: number, aft: number) => (zMm: number) => forward + ((aft - forward) * zMm) / 2000;

describe("followMove", () => {
  it("finds shift and tilt in both planes from two sights", () => {
    const [h, v] = [moveOf(0.12, 0.04), moveOf(-0.05, 0.2)];
    const sights = [500, 1700].map((zMm) => ({ zMm, change: { hMm: h(zMm), vMm: v(zMm) } }));
    const { supports: found, done, past } = followMove({ ...base, sights });
    close(found[0]?.movedMm.h ?? null, 0.12);
    close(found[1]?.movedMm.v ?? null, 0.2);
    close(found[0]?.leftMm.h ?? null, 0.18);
    close(found[1]?.leftMm.v ?? null, 0.2);
    expect([done, past]).toEqual([false, []]);
  });

  it("finds the same from four indicators at oblique clock angles, inside ones reversed", () => {
    const [h, v] = [moveOf(0.12, 0.04), moveOf(-0.05, 0.2)];
    const indicators = [
      { zMm: 100, clockDeg: 45, contact: "outside" as const },
      { zMm: 100, clockDeg: 315, contact: "inside" as const },
      { zMm: 1900, clockDeg: 90, contact: "outside" as const },
      { zMm: 1900, clockDeg: 180, contact: "outside" as const },
    ].map((one) => {
      const angle = (one.clockDeg * Math.PI) / 180;
      const toward = Math.sin(angle) * h(one.zMm) + Math.cos(angle) * v(one.zMm);
      return { ...one, readingMm: one.contact === "outside" ? toward : -toward };
    });
    const { supports: found, residualsMm } = followMove({ ...base, indicators });
    close(found[0]?.movedMm.h ?? null, 0.12);
    close(found[0]?.movedMm.v ?? null, -0.05);
    close(found[1]?.movedMm.h ?? null, 0.04);
    close(found[1]?.movedMm.v ?? null, 0.2);
    expect(Math.max(...residualsMm.map(Math.abs))).toBeLessThan(1e-12); // mm
  });

  it("says unknown where readings leave a move open, and never the smallest that fits", () => {
    const atop = { zMm: 0, clockDeg: 0, contact: "outside" as const, readingMm: 0.1 };
    const { supports: found, done } = followMove({ ...base, indicators: [atop] });
    close(found[0]?.movedMm.v ?? null, 0.1);
    expect(found[0]?.movedMm.h).toBeNull();
    expect(found[1]?.movedMm).toEqual({ h: null, v: null });
    expect(done).toBe(false);
  });

  it("is done when every support is where it shall be, and unknown is not done", () => {
    const arrived = [0, 2000].map((zMm, index) => ({
      zMm,
      change: { hMm: (wanted[index]?.hMm ?? 0) + 0.01, vMm: (wanted[index]?.vMm ?? 0) - 0.015 },
    }));
    expect(followMove({ ...base, sights: arrived }).done).toBe(true);
    const vOnly = arrived.map(({ zMm, change }) => ({
      zMm,
      clockDeg: 0,
      contact: "outside" as const,
      readingMm: change.vMm,
    }));
    expect(followMove({ ...base, indicators: vOnly }).done).toBeNull();
  });

  it("tells which supports have gone past, also where no move was wanted", () => {
    const sights = [
      { zMm: 0, change: { hMm: 0.35, vMm: -0.2 } },
      { zMm: 2000, change: { hMm: 0.1, vMm: 0.4 } },
    ];
    expect(followMove({ ...base, sights }).past).toEqual(["forward"]);
    const still = { ...base, wanted: [], sights: [{ zMm: 0, change: { hMm: 0.1, vMm: 0 } }] };
    expect(followMove(still).past).toEqual(["forward"]);
  });

  it("shows readings that do not fit one rigid move", () => {
    const sights = [0, 1000, 2000].map((zMm, index) => ({
      zMm,
      change: { hMm: index === 1 ? 0.09 : 0, vMm: 0 },
    }));
    // Of a straight line through (0, 0), (1, 0.09), (2, 0) least squares leaves −0.03, 0.06, −0.03: by hand.
    const { residualsMm } = followMove({ ...base, sights });
    [-0.03, 0, 0.06, 0, -0.03, 0].forEach((expected, index) => close(residualsMm[index] ?? null, expected));
  });

  it("only shifts on one support, and does not move where it is blocked", () => {
    const one = { ...base, supports: [{ id: "seat", zMm: 300, blocked: ["h" as const] }], wanted: [] };
    const { supports: found } = followMove({ ...one, sights: [{ zMm: 900, change: { hMm: 0, vMm: 0.07 } }] });
    close(found[0]?.movedMm.v ?? null, 0.07);
    close(found[0]?.movedMm.h ?? null, 0);
  });

  it("gives back any rigid move that its readings are made from", () => {
    const millimetres = fc.double({ min: -2, max: 2, noNaN: true });
    fc.assert(
      fc.property(millimetres, millimetres, millimetres, millimetres, (h0, h1, v0, v1) => {
        const [h, v] = [moveOf(h0, h1), moveOf(v0, v1)];
        const sights = [100, 900, 1800].map((zMm) => ({ zMm, change: { hMm: h(zMm), vMm: v(zMm) } }));
        const { supports: found } = followMove({ ...base, sights });
        const moved = [found[0]?.movedMm.h, found[1]?.movedMm.h, found[0]?.movedMm.v, found[1]?.movedMm.v];
        [h0, h1, v0, v1].forEach(
          (expected, index) => expect(Math.abs((moved[index] ?? Number.NaN) - expected)).toBeLessThan(1e-10), // mm
        );
      }),
    );
  });

  it("refuses nothing read, and a component without supports", () => {
    expect(() => followMove(base)).toThrow(expect.objectContaining({ code: "too_few_points" }));
    const sights = [{ zMm: 0, change: { hMm: 0, vMm: 0 } }];
    expect(() => followMove({ ...base, supports: [], sights })).toThrow(
      expect.objectContaining({ code: "supports_insufficient" }),
    );
  });
});
