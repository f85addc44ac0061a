import type { z } from "zod";
import type { deviationAnswer } from "../../shared/schemas/common.ts";
import type { Converter } from "../../shared/units.ts";
import { clockDegOf, radialMm, type PlaneVector } from "../compute/plane.ts";

/** A deviation as answered: its planes, its size and its direction. */
export function writeDeviation(deviation: PlaneVector, offset: Converter): z.infer<typeof deviationAnswer> {
  return {
    h: offset.fromMm(deviation.hMm),
    v: offset.fromMm(deviation.vMm),
    radial: offset.fromMm(radialMm(deviation)),
    clockDeg: clockDegOf(deviation),
  };
}
