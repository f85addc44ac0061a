import { stepAtMost } from "../../../shared/figures/pick-step.ts";
import type { Drawing, Place } from "./drawing.ts";
import type { DrawnMachine } from "./drawn-machine.ts";
import type { SheetScale } from "./sheet-scale.ts";

/** Seen looking downstream: how every bore lies off its target, the targets all at one point. */
export function drawEndView(drawing: Drawing, { stations, surveys }: DrawnMachine, scale: SheetScale): void {
  const { endView, exaggeration, reach, letter } = scale;
  const [x, y] = endView;
  const place = (h: number, v: number): Place => [x + exaggeration * h, y + exaggeration * v];
  drawing.line("AXIS", [x - reach, y], [x + reach, y]);
  drawing.line("AXIS", [x, y - reach], [x, y + reach]);
  drawing.text("TEXT", [x, y + reach + 5 * letter], "END VIEW: looking downstream", {
    height: 1.6 * letter,
    align: "middle",
  });
  const radii = new Set(stations.flatMap(({ allowedMm }) => allowedMm?.radius ?? []));
  for (const radius of radii) drawing.circle("TOLERANCE", endView, exaggeration * radius);
  const ring = stepAtMost(reach / exaggeration);
  drawing.circle("DIMENSIONS", endView, exaggeration * ring);
  drawing.text(
    "DIMENSIONS",
    [x, y - exaggeration * ring - 1.5 * letter],
    `circle: ${Number(ring.toPrecision(6))} mm off target`,
    {
      height: letter,
      align: "middle",
    },
  );
  for (const { layer, bores } of surveys) {
    for (const { station, deviationMm } of bores) {
      const tip = place(deviationMm.h, deviationMm.v);
      drawing.line(layer, endView, tip);
      drawing.circle(layer, tip, letter * 0.25);
      // At the middle names would lie upon one another.
      if (Math.hypot(tip[0] - x, tip[1] - y) > 2.5 * letter)
        drawing.text(layer, [tip[0] + letter * 0.4, tip[1]], station.id, { height: letter * 0.7 });
    }
  }
  surveys.forEach(({ layer, name }, index) => {
    const at = y - reach - (4 + 2.2 * index) * letter;
    drawing.line(layer, [x - 6 * letter, at + letter / 2], [x - letter, at + letter / 2]);
    drawing.text("TEXT", [x, at], name, { height: letter });
  });
}
