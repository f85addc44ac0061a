import type { BoreFitResult, BoreRequest } from "../../schemas/bore-fits.ts";
import type { Units } from "../../units.ts";
import { convertLength } from "../write-number.ts";
import type { BoreSectionModel, WallPoint } from "./bore-section-model.ts";

const methodWords: Record<BoreFitResult["method"], string> = {
  least_squares: "least-squares circle",
  minimum_zone: "minimum-zone circle",
  maximum_inscribed: "maximum inscribed circle",
  minimum_circumscribed: "minimum circumscribed circle",
  ellipse: "least-squares ellipse",
};

/**
 * The bore section of one bore of a call and its answer, all in the downstream view; `seen` is the call's. Null for a
 * form whose readings are not wall points in a plane.
 */
export function boreSectionOf(
  bore: BoreRequest,
  fit: BoreFitResult,
  units: Units,
  seen: "downstream" | "upstream",
): BoreSectionModel | null {
  const directions = directionsOf(bore, fit, units, bore.seen ?? seen);
  if (directions === null) return null;
  const contacts = new Set(fit.contacts ?? []);
  const points = directions.map((clockDeg, index): WallPoint => {
    const residual = fit.residuals[index];
    return {
      number: index + 1,
      clockDeg,
      residual: typeof residual === "number" ? residual : 0,
      used: fit.used[index] ?? true,
      contact: contacts.has(index),
    };
  });
  const { expandedUncertainty } = fit;
  return {
    id: fit.id,
    methodWords: methodWords[fit.method],
    offsetUnit: units.offset,
    boreUnit: units.bore,
    originWords: bore.form === "turned_gauge" ? "gauge's axis" : "points' origin",
    centre: fit.centre,
    uncertainty: expandedUncertainty && { h: expandedUncertainty.h, v: expandedUncertainty.v },
    diameter: fit.diameter,
    roundness: fit.roundness,
    points,
    arc: fit.arc,
  };
}

/** Clock angle of each reading as seen from the fitted centre, looking downstream. */
function directionsOf(
  bore: BoreRequest,
  fit: BoreFitResult,
  units: Units,
  seen: "downstream" | "upstream",
): number[] | null {
  const mirrored = seen === "upstream" ? -1 : 1;
  const centre = {
    h: convertLength(fit.centre.h, units.offset, units.bore),
    v: convertLength(fit.centre.v, units.offset, units.bore),
  };
  const direction = (h: number, v: number): number => clockOf(mirrored * h - centre.h, v - centre.v);
  switch (bore.form) {
    case "points":
      return bore.points.map(({ h, v }) => direction(h, v));
    case "turned_gauge": {
      const sense = bore.sense === "larger_is_farther" ? 1 : -1;
      const inBore = (offset: number): number => convertLength(offset, units.offset, units.bore);
      const sag = inBore(bore.gaugeSag ?? 0);
      return bore.readings.map(({ clockDeg, reading }) => {
        const radius = bore.nominalDiameter / 2 + sense * inBore(reading);
        const angleRad = (clockDeg * Math.PI) / 180;
        return direction(radius * Math.sin(angleRad), radius * Math.cos(angleRad) - sag);
      });
    }
    case "rotating_target":
    case "wire":
      return null;
  }
}

/** Clockwise from the top, in [0, 360). */
function clockOf(h: number, v: number): number {
  const clockDeg = (Math.atan2(h, v) * 180) / Math.PI;
  return clockDeg < 0 ? clockDeg + 360 : clockDeg;
}
