/**
 * The direction of a clock angle, degrees clockwise from 12 o'clock: h = sin, v = cos. Reduced by quarter turns first,
 * so that 90, 180 and 270 degrees give exact zeros and ones and a whole turn more changes nothing.
 */
export function clockDirection(clockDeg: number): { readonly h: number; readonly v: number } {
  const quarters = Math.round(clockDeg / 90);
  const restRad = ((clockDeg - quarters * 90) * Math.PI) / 180;
  const sin = Math.sin(restRad);
  const cos = Math.cos(restRad);
  switch (quarters & 3) {
    case 0:
      return { h: sin, v: cos };
    case 1:
      return { h: cos, v: -sin };
    case 2:
      return { h: -sin, v: -cos };
    default:
      return { h: -cos, v: sin };
  }
}
