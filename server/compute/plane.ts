/** A vector in the cross-section seen looking downstream: h to the right, v up. */
export interface PlaneVector {
  readonly hMm: number;
  readonly vMm: number;
}

/** Covariance of a plane vector, mm². */
export interface PlaneCovariance {
  readonly hhMm2: number;
  readonly hvMm2: number;
  readonly vvMm2: number;
}

/** Length of the vector, without overflow or underflow of the squares. */
export function radialMm({ hMm, vMm }: PlaneVector): number {
  return Math.hypot(hMm, vMm);
}

/** Direction of the vector in degrees clockwise from 12 o'clock, [0, 360); null for the zero vector, which has none. */
export function clockDegOf({ hMm, vMm }: PlaneVector): number | null {
  if (hMm === 0 && vMm === 0) return null;
  const deg = (Math.atan2(hMm, vMm) * 180) / Math.PI;
  const turned = deg < 0 ? deg + 360 : deg;
  // Adding 0 drops the sign of a negative zero, as JSON does.
  return turned >= 360 ? 0 : turned + 0;
}

/** Larger eigenvalue of the 2 × 2 covariance, mm²: the variance in the worst direction. */
export function worstVarianceMm2({ hhMm2, hvMm2, vvMm2 }: PlaneCovariance): number {
  return (hhMm2 + vvMm2) / 2 + Math.hypot((hhMm2 - vvMm2) / 2, hvMm2);
}
