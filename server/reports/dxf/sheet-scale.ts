import { decimalsAlong, writeNumber } from "../../../shared/figures/write-number.ts";
import { millimetresPer, type LengthUnit } from "../../../shared/units.ts";
import { stepAtMost } from "../../../shared/figures/pick-step.ts";
import { Drawing } from "./drawing.ts";
import type { DrawnMachine, PlaneMm } from "./drawn-machine.ts";
import { scaleEndViews, type EndViewScale } from "./end-view-scale.ts";

/** Where everything stands. z is true to scale; what lies across it is drawn `exaggeration` times as large. */
export interface SheetScale {
  readonly zLow: number;
  readonly zHigh: number;
  /** The machine's length, or what stands for it where there is one station only. */
  readonly length: number;
  readonly exaggeration: number;
  /** Height of small lettering. */
  readonly letter: number;
  /** Half the height of a strip. */
  readonly reach: number;
  /** What the names over the elevation take, and the words under the plan. */
  readonly nameRoom: number;
  readonly wordRoom: number;
  readonly elevationY: number;
  readonly planY: number;
  /** Top left corner of the key. */
  readonly key: readonly [x: number, y: number];
  readonly endViews: EndViewScale;
  /** Top left corner of the title block, and its width. */
  readonly titleBlock: { readonly left: number; readonly top: number; readonly width: number };
}

/** Of one station alone: its sheet is as large as that of a machine of one metre. */
const lengthOfOne = 1000;

export function scaleSheet(machine: DrawnMachine, axialUnit: LengthUnit): SheetScale {
  const zs = machine.stations.map(({ zMm }) => zMm);
  const zLow = zs.reduce((least, z) => Math.min(least, z), Infinity);
  const zHigh = zs.reduce((most, z) => Math.max(most, z), -Infinity);
  const length = zHigh - zLow > 0 ? zHigh - zLow : lengthOfOne;
  const reach = length * 0.1;
  const letter = length / 160;
  const room = (words: readonly string[]) =>
    (3 + words.reduce((most, word) => Math.max(most, [...word].length), 0) * Drawing.signWidth) * letter;
  const nameRoom = room(machine.stations.map(({ id }) => id));
  const wordRoom = room(zs.map((zMm) => zWords(zMm, axialUnit)));
  const planY = -(2 * reach + 8 * letter);
  const width = length * 1.4;
  const endViews = scaleEndViews(
    machine,
    { left: zLow, top: planY - reach - wordRoom - 8 * letter },
    width,
    letter,
  );
  const rows = Math.ceil(machine.stations.length / endViews.columns);
  return {
    zLow,
    zHigh,
    length,
    exaggeration: stepAtMost(reach / (largestOffset(machine) || 0.1)),
    letter,
    reach,
    nameRoom,
    wordRoom,
    elevationY: 0,
    planY,
    key: [zHigh + length * 0.07, reach],
    endViews,
    titleBlock: { left: zLow, top: endViews.top - rows * endViews.row - 3 * letter, width },
  };
}

/** The farthest that anything drawn lies from the axis. */
function largestOffset({ stations, surveys }: DrawnMachine): number {
  const planes = ["h", "v"] as const;
  const offsets = [
    ...stations.flatMap(({ targetMm, allowedMm }) =>
      planes.flatMap((plane) => [0, ...(allowedMm?.[plane] ?? [])].map((limit) => targetMm[plane] + limit)),
    ),
    ...surveys.flatMap(({ bores }) =>
      bores.flatMap(({ station: { targetMm }, deviationMm, uncertaintyMm }) =>
        planes.flatMap((plane) => {
          const bar = uncertaintyMm?.[plane] ?? 0;
          const deviation = deviationMm[plane];
          return [targetMm[plane] + deviation + bar, targetMm[plane] + deviation - bar, deviation];
        }),
      ),
    ),
  ];
  return offsets.reduce((most, offset) => Math.max(most, Math.abs(offset)), 0);
}

/** Where a bore's centre lies off the axis. */
export function centreMm(target: PlaneMm, deviation: PlaneMm): PlaneMm {
  return { h: target.h + deviation.h, v: target.v + deviation.v };
}

/** In the machine's own unit, and in the drawing's where that is another. */
export function zWords(zMm: number, unit: LengthUnit): string {
  const mm = `${plain(zMm, "mm")} mm`;
  return unit === "mm" ? mm : `${plain(zMm / millimetresPer[unit], unit)} ${unit} (${mm})`;
}

const plain = (value: number, unit: LengthUnit): string =>
  writeNumber(value, decimalsAlong(unit)).replace("\u2212", "-");

/** A magnification in words: "1000 times". */
export const writeTimes = (factor: number): string => `${Number(factor.toPrecision(6))} times`;
