import { inverse, Matrix } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { contactDilution, contactSpread } from "./contact-covariance.ts";
import type { Contact, Contacts } from "./limiting-contacts.ts";

/** J⁻¹·diag(u²)·J⁻ᵀ with the rows (u, 1 outer, 1 inner), by the LU factors of ml-matrix. */
function plainSpread({ outer, inner }: Contacts, uMm: readonly number[]) {
  const both = outer.length > 0 && inner.length > 0;
  const row =
    (kind: number) =>
    ({ angleRad }: Contact) => [Math.cos(angleRad), Math.sin(angleRad), ...(both ? [kind, 1 - kind] : [1])];
  const jacobian = new Matrix([...outer.map(row(1)), ...inner.map(row(0))]);
  const errors = Matrix.diag([...outer, ...inner].map(({ index }) => uMm[index]! ** 2));
  const back = inverse(jacobian);
  const spread = back.mmul(errors).mmul(back.transpose()).to2DArray();
  const radius = both ? (spread[2]![2]! + 2 * spread[2]![3]! + spread[3]![3]!) / 4 : spread[2]![2]!;
  return { spread, radius };
}

describe("contactSpread", () => {
  it.each([
    { overRad: 6, within: 1e-9 },
    { overRad: 0.3, within: 1e-9 },
    { overRad: 0.01, within: 1e-5 }, // what the plain inverse keeps of its digits
  ])(
    "is the plain inverse of as many equations as unknowns, over $overRad radians",
    ({ overRad, within }) => {
      for (let k = 0; k < 40; k++) {
        const random = seededRandom(k + 1);
        const count = k % 2 ? 4 : 3;
        const fromRad = 7 * random.uniform() - 3;
        const contacts = Array.from({ length: count }, (_, index) => ({
          index,
          angleRad: fromRad + (overRad * (index + 0.5 * random.uniform())) / count,
        }));
        const uMm = contacts.map(() => 0.002 + 0.01 * random.uniform());
        const some: Contacts =
          count === 4
            ? { outer: [contacts[0]!, contacts[2]!], inner: [contacts[1]!, contacts[3]!] }
            : k % 4
              ? { outer: contacts, inner: [] }
              : { outer: [], inner: contacts };
        const { covariance, radiusVarianceMm2 } = contactSpread(some, uMm, "points");
        const { spread, radius } = plainSpread(some, uMm);
        const scale = spread[0]![0]! + spread[1]![1]!;
        expect(Math.abs(covariance.hhMm2 - spread[0]![0]!)).toBeLessThan(within * scale);
        expect(Math.abs(covariance.hvMm2 - spread[0]![1]!)).toBeLessThan(within * scale);
        expect(Math.abs(covariance.vvMm2 - spread[1]![1]!)).toBeLessThan(within * scale);
        expect(Math.abs(radiusVarianceMm2 - radius)).toBeLessThan(within * (scale + radius));
      }
    },
  );

  it("says of contacts evenly round what even readings have, and more of others", () => {
    const evenly = (count: number, overRad: number): Contact[] =>
      Array.from({ length: count }, (_, index) => ({ index, angleRad: (index * overRad) / count }));
    // Σu·uᵀ = (n/2)·I: a variance of 2/n.
    expect(
      Math.abs(contactDilution({ outer: evenly(3, 2 * Math.PI), inner: [] }, "points") - 1),
    ).toBeLessThan(1e-12);
    expect(contactDilution({ outer: evenly(3, 1), inner: [] }, "points")).toBeGreaterThan(10);
    // Outer and inner ones in two directions only.
    const [first, second] = [0.3, 0.3 + Math.PI];
    const crossed: Contacts = {
      outer: [
        { index: 0, angleRad: first },
        { index: 1, angleRad: second },
      ],
      inner: [
        { index: 2, angleRad: first },
        { index: 3, angleRad: second },
      ],
    };
    expect(() => contactSpread(crossed, null, "points")).toThrow("do not determine the centre");
  });
});
