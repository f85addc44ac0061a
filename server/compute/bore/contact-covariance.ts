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
/** Contacts this near to one line through the centre lie on it: a diameter, or its ends. */
const sameLine = 1e-9;

/**
 * Covariance of a limiting circle's centre and radius from the standard uncertainties of its contacts, which are held
 * to stay the contacts: the centre keeps each at its radius, so that an error ε of contact i moves it by u·δc + δR = ε
 * (u the direction of the contact); with more contacts than needed by weighted least squares of these. Two contacts
 * of a circumscribed circle leave its centre in the middle between them: each coordinate has (u₁² + u₂²)/4.
 * `uMm` null: every contact has 1. Directions are taken from their mean, and the movement along it out of the radii,
 * so that a short arc loses no digits.
 * @throws ComputeError rank_deficient
 */
export function contactSpread(
  { outer, inner }: Contacts,
  uMm: readonly number[] | null,
  member: string,
): ContactSpread {
  const all = [...outer, ...inner];
  const both = outer.length > 0 && inner.length > 0;
  if (!both && onOneLine(all)) return betweenTwo(all, uMm);
  const size = both ? 4 : 3;
  const meanRad = Math.atan2(sumOf(all, Math.sin), sumOf(all, Math.cos));
  const normal = new Float64Array(size * size);
  const add = ({ index, angleRad }: Contact, radiusAt: number) => {
    const row = new Float64Array(size);
    const turn = angleRad - meanRad;
    row[0] = -2 * Math.sin(turn / 2) ** 2;
    row[1] = Math.sin(turn);
    row[radiusAt] = 1;
    const weight = 1 / (uMm?.[index] ?? 1) ** 2;
    for (let i = 0; i < size; i++)
      for (let j = 0; j < size; j++) normal[i * size + j]! += weight * row[i]! * row[j]!;
  };
  for (const contact of outer) add(contact, 2);
  for (const contact of inner) add(contact, size - 1);
  const factor = new Float64Array(size * size);
  if (!factorCholesky(normal, size, factor, pivotMin)) {
    throw new ComputeError("rank_deficient", "The contacts do not determine the centre.", { at: [member] });
  }
  const inverse = invertCholesky(factor, size);
  const at = (row: number, column: number) => inverse[row * size + column]!;
  // The unknowns were the movement along the mean direction, across it, and radii + the movement along.
  const [cos, sin] = [Math.cos(meanRad), Math.sin(meanRad)];
  const [along, mixed, across] = [at(0, 0), at(0, 1), at(1, 1)];
  const radius = both ? (at(2, 2) + 2 * at(2, 3) + at(3, 3)) / 4 : at(2, 2);
  const radiusAlong = both ? (at(0, 2) + at(0, 3)) / 2 : at(0, 2);
  return {
    covariance: {
      hhMm2: cos * cos * along - 2 * cos * sin * mixed + sin * sin * across,
      hvMm2: cos * sin * (along - across) + (cos * cos - sin * sin) * mixed,
      vvMm2: sin * sin * along + 2 * cos * sin * mixed + cos * cos * across,
    },
    radiusVarianceMm2: radius - 2 * radiusAlong + along,
  };
}

function sumOf(contacts: readonly Contact[], part: (angleRad: number) => number): number {
  return contacts.reduce((sum, { angleRad }) => sum + part(angleRad), 0);
}

function onOneLine(contacts: readonly Contact[]): boolean {
  const first = contacts[0]!.angleRad;
  return contacts.every(({ angleRad }) => Math.abs(Math.sin(angleRad - first)) <= sameLine);
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
function betweenTwo(contacts: readonly Contact[], uMm: readonly number[] | null): ContactSpread {
  const first = contacts[0]!;
  const second = contacts.reduce((best, one) =>
    Math.cos(one.angleRad - first.angleRad) < Math.cos(best.angleRad - first.angleRad) ? one : best,
  );
  const variance = ({ index }: Contact) => (uMm?.[index] ?? 1) ** 2;
  const quarter = (variance(first) + variance(second)) / 4;
  return { covariance: { hhMm2: quarter, hvMm2: 0, vvMm2: quarter }, radiusVarianceMm2: quarter };
}
