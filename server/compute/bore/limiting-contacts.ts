import type { LimitingMethod } from "./circle-method.ts";

/** A contact as the criterion's centre sees it. */
export interface Contact {
  readonly index: number;
  /** Anticlockwise from the h axis. */
  readonly angleRad: number;
}

/** The readings on the outer and on the inner limiting circle; a criterion with one circle leaves the other empty. */
export interface Contacts {
  readonly outer: readonly Contact[];
  readonly inner: readonly Contact[];
}

const wholeTurn = 2 * Math.PI;
/** Angles nearer than this are rounding. */
const sameAngle = 1e-9;

/**
 * Whether the contacts prove the centre an optimum. Circumscribed: no gap over 180° between them, so that the circle
 * can shrink in no direction. Inscribed: every gap under 180°, so that it can grow in none. Minimum zone: outer and
 * inner ones interlace, O I O I at least, so that no direction leads from all outer and toward all inner ones; then no
 * small movement makes the zone narrower (for a global optimum every centre was compared before).
 */
export function contactsProve(method: LimitingMethod, { outer, inner }: Contacts): boolean {
  switch (method) {
    case "minimum_circumscribed":
      return largestGapRad(outer) <= Math.PI + sameAngle;
    case "maximum_inscribed":
      return largestGapRad(inner) < Math.PI - sameAngle;
    case "minimum_zone":
      return interlace(outer, inner);
  }
}

/** Largest angle between neighbouring contacts; a whole turn for one contact. */
function largestGapRad(contacts: readonly Contact[]): number {
  const angles = contacts.map(({ angleRad }) => angleRad).sort((a, b) => a - b);
  return angles.reduce((gap, angle, k) => {
    const next = k + 1 < angles.length ? angles[k + 1]! : angles[0]! + wholeTurn;
    return Math.max(gap, next - angle);
  }, 0);
}

function interlace(outer: readonly Contact[], inner: readonly Contact[]): boolean {
  const around = [
    ...outer.map(({ angleRad }) => ({ angleRad, kind: 1 })),
    ...inner.map(({ angleRad }) => ({ angleRad, kind: -1 })),
  ].sort((a, b) => a.angleRad - b.angleRad);
  let changes = 0;
  for (const [k, one] of around.entries()) {
    const next = around[(k + 1) % around.length]!;
    if (one.kind === next.kind) continue;
    changes++;
    const apart = Math.abs(next.angleRad - one.angleRad) % wholeTurn;
    // An outer and an inner contact in one direction: the zone is narrowest along it.
    if (Math.min(apart, wholeTurn - apart) <= sameAngle) return true;
  }
  return changes >= 4;
}
