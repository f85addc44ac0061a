import type { Drawing, Place } from "./drawing.ts";
import { centreMm, writeTimes, type SheetScale } from "./sheet-scale.ts";
import type { DrawnMachine, DrawnSurvey } from "./drawn-machine.ts";

type Plane = "h" | "v";

interface Strip {
  readonly drawing: Drawing;
  readonly machine: DrawnMachine;
  readonly scale: SheetScale;
  readonly plane: Plane;
  /** Elevation: up is high. Plan, seen from above with downstream to the right: down is right. */
  readonly place: (zMm: number, offsetMm: number) => Place;
}

/** One plane over z: axis, targets, tolerance band, every survey's centres joined, with their uncertainties. */
export function drawStrip(drawing: Drawing, machine: DrawnMachine, scale: SheetScale, plane: Plane): void {
  const middle = plane === "v" ? scale.elevationY : scale.planY;
  const factor = (plane === "v" ? 1 : -1) * scale.exaggeration;
  const place = (zMm: number, offsetMm: number): Place => [zMm, middle + factor * offsetMm];
  const strip: Strip = { drawing, machine, scale, plane, place };
  const { zLow, zHigh, length, letter, reach } = scale;
  drawing.line("AXIS", [zLow - length * 0.03, middle], [zHigh + length * 0.03, middle]);
  drawing.text(
    "TEXT",
    [zLow, middle + reach + (plane === "v" ? scale.nameRoom : 0) + 2 * letter],
    `${plane === "v" ? "ELEVATION: v over z, up is high" : "PLAN: h over z, seen from above, down is right"}; downstream to the right; offsets ${writeTimes(scale.exaggeration)} as large`,
    { height: 1.6 * letter },
  );
  for (const { zMm } of machine.stations)
    drawing.line("STATIONS", [zMm, middle - reach], [zMm, middle + reach]);
  drawing.path(
    "TARGET",
    machine.stations.map(({ zMm, targetMm }) => place(zMm, targetMm[plane])),
  );
  drawTolerances(strip);
  for (const survey of machine.surveys) drawSurvey(strip, survey);
}

function drawTolerances({ drawing, machine, scale, plane, place }: Strip): void {
  const gates = machine.stations.flatMap(({ zMm, targetMm, allowedMm }) => {
    if (!allowedMm) return [];
    const [least, most] = allowedMm[plane];
    return [{ zMm, low: targetMm[plane] + least, high: targetMm[plane] + most }];
  });
  const half = gateHalfWidth(scale, machine);
  for (const { zMm, low, high } of gates) {
    drawing.box("TOLERANCE", place(zMm - half, low), place(zMm + half, high));
  }
  drawing.path(
    "TOLERANCE",
    gates.map(({ zMm, low }) => place(zMm, low)),
  );
  drawing.path(
    "TOLERANCE",
    gates.map(({ zMm, high }) => place(zMm, high)),
  );
}

/** Wide enough to be seen, and never as wide as the gap to the next station. */
function gateHalfWidth({ letter }: SheetScale, { stations }: DrawnMachine): number {
  const gaps = stations
    .map(({ zMm }, index) => zMm - (stations[index - 1]?.zMm ?? -Infinity))
    .filter((gap) => gap > 0);
  return Math.min(letter, 0.35 * Math.min(...gaps, Infinity));
}

function drawSurvey({ drawing, scale, plane, place }: Strip, { layer, bores }: DrawnSurvey): void {
  const mark = scale.letter * 0.4;
  const centres = bores.map(({ station, deviationMm, uncertaintyMm }) => ({
    zMm: station.zMm,
    offset: centreMm(station.targetMm, deviationMm)[plane],
    bar: uncertaintyMm?.[plane] ?? 0,
  }));
  drawing.path(
    layer,
    centres.map(({ zMm, offset }) => place(zMm, offset)),
  );
  for (const { zMm, offset, bar } of centres) {
    drawing.circle(layer, place(zMm, offset), mark);
    if (bar === 0) continue;
    const [low, high] = [place(zMm, offset - bar), place(zMm, offset + bar)];
    drawing.line("UNCERTAINTY", low, high);
    for (const [x, y] of [low, high]) drawing.line("UNCERTAINTY", [x - mark, y], [x + mark, y]);
  }
}
