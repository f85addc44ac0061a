import type { AxisStationRequest } from "../../shared/schemas/axis-deviations.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { AxisStation } from "../compute/axis/axis-input.ts";
import type { PlaneVector } from "../compute/plane.ts";
import { readCovariance } from "./read-covariance.ts";
import { readTolerance } from "./read-tolerance.ts";

/** A station as sent, in millimetres. An absent target is (0, 0), the axis itself; an absent uncertainty of it, exact. */
export function readAxisStation(
  station: AxisStationRequest,
  { axial, offset }: Record<Dimension, Converter>,
): AxisStation {
  const vector = ({ h, v }: { h: number; v: number }): PlaneVector => ({
    hMm: offset.toMm(h),
    vMm: offset.toMm(v),
  });
  return {
    zMm: axial.toMm(station.z),
    centre: vector(station.centre),
    covariance: station.covariance ? readCovariance(station.covariance, offset) : null,
    dof: station.dof ?? null,
    target: vector(station.target ?? { h: 0, v: 0 }),
    targetUncertainty: vector(station.targetUncertainty ?? { h: 0, v: 0 }),
    tolerance: station.tolerance ? readTolerance(station.tolerance, offset) : null,
    weight: station.weight ?? null,
  };
}
