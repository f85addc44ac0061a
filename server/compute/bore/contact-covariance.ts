import { ComputeError } from "../compute-error.ts";
import { worstVarianceMm2, type PlaneCovariance } from "../plane.ts";
import { factorCholesky, invertCholesky } from "./cholesky.ts";
import type { Contact, Contacts } from "./limiting-contacts.ts";

/** What the contacts, held fixed, pass on to the centre and to the mean of the limiting radii. */
export interface ContactSpread {
  readonly covariance: PlaneCovariance;
  readonly radiusVarianceMm2: number;
}

const pivotMin = 1e-12;

/**
 * Covariance of a limiting circle's centre and radius from the standard uncertainties of its contacts, which are held
 * to stay the contacts: the centre keeps each at its radius, so that an error ε of contact i moves it by u·δc + δR = ε
 * (u the direction of the contact); with more contacts than needed by weighted least squares of these. Two contacts
 * of a circumscribed circle leave its centre in the middle between them: each coordinate has (u₁² + u₂²)/4.
 * `uMm` null: every contact has 1.
 * @throws ComputeError rank_deficient
 */
export function contactSpread(
  { outer, inner }: Contacts,
  uMm: readonly number[] | null,
  member: string,
): ContactSpread {
  const both = outer.length > 0 && inner.length > 0;
  const size = both ? 4 : 3;
  const normal = new Float64Array(size * size);
  const add = ({ index, angleRad }: Contact, radiusAt: number) => {
    const row = new Float64Array(size);
    row[0] = Math.cos(angleRad);
    row[1] = Math.sin(angleRad);
    row[radiusAt] = 1;
    const weight = 1 / (uMm?.[index] ?? 1) ** 2;
    for (let i = 0; i < size; i++)
      for (let j = 0; j < size; j++) normal[i * size + j]! += weight * row[i]! * row[j]!;
  };
  for (const contact of outer) add(contact, 2);
  for (const contact of inner) add(contact, size - 1);
  const factor = new Float64Array(size * size);
  // Two opposite contacts along an axis leave rounding in the other's column: small beside all, not beside itself.
  const diagonal = Array.from({ length: size }, (_, k) => normal[k * size + k]!);
  const seen = Math.min(...diagonal) > pivotMin * Math.max(...diagonal);
  if (!seen || !factorCholesky(normal, size, factor, pivotMin)) {
    if (!both) return betweenTwo(outer, uMm);
    throw new ComputeError("rank_deficient", "The contacts do not determine the centre.", { at: [member] });
  }
  const inverse = invertCholesky(factor, size);
  const at = (row: number, column: number) => inverse[row * size + column]!;
  return {
    covariance: { hhMm2: at(0, 0), hvMm2: at(0, 1), vvMm2: at(1, 1) },
    radiusVarianceMm2: both ? (at(2, 2) + 2 * at(2, 3) + at(3, 3)) / 4 : at(2, 2),
  };
}

/**
 * The centre's worst standard uncertainty ÷ that of as many contacts evenly round one circle.
 * @throws ComputeError rank_deficient
 */
export function contactDilution(contacts: Contacts, member: string): number {
  const spread = contactSpread(contacts, null, member);
  const count = contacts.outer.length + contacts.inner.length;
  return Math.sqrt((worstVarianceMm2(spread.covariance) * count) / 2);
}

/** Contacts in two opposite directions. */
function betweenTwo(outer: readonly Contact[], uMm: readonly number[] | null): ContactSpread {
  const first = outer[0]!;
  const second = outer.reduce((best, one) =>
    Math.cos(one.angleRad - first.angleRad) < Math.cos(best.angleRad - first.angleRad) ? one : best,
  );
  const variance = ({ index }: Contact) => (uMm?.[index] ?? 1) ** 2;
  const quarter = (variance(first) + variance(second)) / 4;
  return { covariance: { hhMm2: quarter, hvMm2: 0, vvMm2: quarter }, radiusVarianceMm2: quarter };
}
