import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import type { Figure, Shape } from "../../../../../shared/figures/shape.ts";
import { at, circle, dot, line, lines, words } from "./pencil.ts";

/** Heights over the beam in sheet millimetres: each target is drawn as far under the axis as it is. */
const axisAtLeft = 10;
const axisAtRight = 24;
const stations = [
  { id: "brg-1 (ref.)", share: 0.08, target: -7, deviation: 0 },
  { id: "cas-2", share: 0.5, target: -4, deviation: -9 },
  { id: "brg-2 (ref.)", share: 0.92, target: -8, deviation: 0 },
] as const;
const beamY = 44;
/** Longer, the axis would hardly be seen to slope. */
const widest = 170;

/** Deviation = centre − target − axis, in one plane. */
export function drawDeviation(width: number): Figure {
  const drawn = Math.min(width, widest);
  const placeX = (share: number): number => 4 + share * (drawn - 8);
  const axisY = (share: number): number => beamY - (axisAtLeft + (axisAtRight - axisAtLeft) * share);
  const shapes: Shape[] = [
    line("dashed", at(0, beamY), at(drawn, beamY)),
    words(at(drawn, beamY + 4), "beam, or gauge's axis", "end", "muted"),
    line("centre", at(0, axisY(-0.04)), at(drawn, axisY(1.04))),
    words(at(drawn * 0.14, axisY(0.2) - 5), "reference axis"),
    ...stations.flatMap(({ id, share, target, deviation }) => {
      const x = placeX(share);
      const targetY = axisY(share) - target;
      const centre = at(x, targetY - deviation);
      const anchor = share < 0.1 ? "start" : share > 0.9 ? "end" : "middle";
      return [
        line("quiet", at(x, axisY(share)), at(x, targetY)),
        line("narrow", at(x - 3, targetY), at(x + 3, targetY)),
        ...(deviation === 0 ? [] : drawArrow(at(x + 5, targetY), at(x + 5, centre.y), "signal")),
        circle("wide", centre, 1.4, "paper"),
        dot(centre),
        words(at(share < 0.1 ? 0 : share > 0.9 ? drawn : x, beamY + 10), id, anchor),
      ];
    }),
    words(at(placeX(0.5) - 4, axisY(0.5) + 6.4), "target", "end", "muted"),
    words(at(placeX(0.5) + 7, axisY(0.5) + 9.5), "deviation"),
    words(at(placeX(0.5) - 3, axisY(0.5) + 14), "centre", "end"),
    ...lines(
      at(0, beamY + 17),
      ["deviation = centre − target − axis(z)", "positive: the bore is right, or high"],
      "start",
      "ink",
    ),
  ];
  return {
    width,
    height: beamY + 26,
    shapes,
    title: "Deviation from the reference axis",
    alternative:
      "A side view in one plane. The reference axis passes as far above each of the two reference bores as their targets say, not through their centres. The bore between them has its target under the axis; its centre lies lower still, and the arrow from the target to the centre is its deviation, here negative.",
  };
}
