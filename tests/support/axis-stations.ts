import type { AxisInput, AxisMethod, AxisStation } from "../../server/compute/axis/axis-input.ts";

const exact = { hMm: 0, vMm: 0 };

/** A station at z with its centre at (h, v), measured without error, that should lie on the axis. */
export function stationAt(
  zMm: number,
  hMm: number,
  vMm: number,
  rest: Partial<AxisStation> = {},
): AxisStation {
  return {
    zMm,
    centre: { hMm, vMm },
    covariance: null,
    dof: null,
    target: exact,
    targetUncertainty: exact,
    tolerance: null,
    weight: null,
    ...rest,
  };
}

/** The same variance in h and v, without correlation. */
export const evenCovariance = (uMm: number) => ({ hhMm2: uMm * uMm, hvMm2: 0, vvMm2: uMm * uMm });

export function axisInput(
  method: AxisMethod,
  reference: readonly number[],
  stations: readonly AxisStation[],
  rest: Partial<AxisInput> = {},
): AxisInput {
  return { method, zone: "planes", reference, stations, level: 0.95, rule: "guarded", ...rest };
}

/** A published line y over x as stations, y in h and −y in v, all of them reference. */
export function stationsOnLine(
  x: readonly number[],
  y: readonly number[],
  u: readonly number[] | null,
): AxisStation[] {
  return x.map((z, i) =>
    stationAt(z, y[i]!, -y[i]!, u === null ? {} : { covariance: evenCovariance(u[i]!) }),
  );
}
