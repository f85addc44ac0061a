import type { LengthUnit } from "../../../shared/units.ts";
import { stepAtMost } from "../../../shared/figures/pick-step.ts";
import type { Drawing, Place } from "./drawing.ts";
import type { DrawnMachine } from "./drawn-machine.ts";
import { zWords, type SheetScale } from "./sheet-scale.ts";

/** Station names over the elevation, their z under the plan, the whole length, and a scale for what lies across. */
export function drawDimensions(
  drawing: Drawing,
  { stations }: DrawnMachine,
  scale: SheetScale,
  axialUnit: LengthUnit,
): void {
  const { letter, reach, elevationY, planY, zLow, zHigh, length } = scale;
  const xs = spread(
    stations.map(({ zMm }) => zMm),
    1.5 * letter,
  );
  const under = planY - reach;
  stations.forEach(({ id, zMm }, index) => {
    const x = xs[index] ?? zMm;
    // The foot of a text that stands upright is on its right.
    const foot = x + letter / 2;
    const over = elevationY + reach;
    drawing.path("STATIONS", [
      [zMm, over],
      [x, over + 1.5 * letter],
    ]);
    drawing.text("STATIONS", [foot, over + 2 * letter], id, { height: letter, rotationDeg: 90 });
    drawing.path("DIMENSIONS", [
      [zMm, under],
      [x, under - 1.5 * letter],
    ]);
    drawing.text("DIMENSIONS", [foot, under - 2 * letter], zWords(zMm, axialUnit), {
      height: letter,
      rotationDeg: 90,
      align: "right",
    });
  });
  if (zHigh > zLow)
    drawLength(drawing, [zLow, zHigh], under - scale.wordRoom - 3 * letter, letter, axialUnit);
  drawAcrossScale(drawing, scale, [zLow - length * 0.06, elevationY]);
}

function drawLength(
  drawing: Drawing,
  [from, to]: readonly [number, number],
  y: number,
  letter: number,
  unit: LengthUnit,
): void {
  drawing.line("DIMENSIONS", [from, y], [to, y]);
  for (const x of [from, to])
    drawing.line("DIMENSIONS", [x - letter / 2, y - letter / 2], [x + letter / 2, y + letter / 2]);
  drawing.text("DIMENSIONS", [(from + to) / 2, y + letter / 2], zWords(to - from, unit), {
    height: letter,
    align: "middle",
  });
}

/** A rule beside the elevation: a round length across, as it looks when exaggerated. */
function drawAcrossScale(drawing: Drawing, { exaggeration, reach, letter }: SheetScale, [x, y]: Place): void {
  const lengthMm = stepAtMost(reach / exaggeration);
  const drawn = lengthMm * exaggeration;
  drawing.line("DIMENSIONS", [x, y], [x, y + drawn]);
  for (const end of [y, y + drawn]) drawing.line("DIMENSIONS", [x - letter / 2, end], [x + letter / 2, end]);
  drawing.text(
    "DIMENSIONS",
    [x - letter / 2, y + drawn / 2],
    `${Number(lengthMm.toPrecision(6))} mm across`,
    {
      height: letter,
      align: "middle",
      rotationDeg: 90,
    },
  );
}

/** Places in order, each at least `gap` after the one before, as near to where they belong as that lets them be. */
export function spread(places: readonly number[], gap: number): number[] {
  const forward: number[] = [];
  for (const place of places) forward.push(Math.max(place, (forward.at(-1) ?? -Infinity) + gap));
  return forward;
}
