import { drawArrow } from "../../../../../shared/figures/draw-arrow.ts";
import { textWidth, type Figure, type Shape } from "../../../../../shared/figures/shape.ts";
import { at, box, dimension, line, words } from "./pencil.ts";

const bores = [
  { id: "brg-1", share: 0.06, half: 6 },
  { id: "cas-2", share: 0.34, half: 14 },
  { id: "shr-1", share: 0.66, half: 18 },
  { id: "brg-2", share: 0.94, half: 7 },
] as const;
const axisY = 27;
const wall = 2.4;
const boreLength = 7;

/** The bores of a machine along z, from one common face. */
export function drawMachine(width: number): Figure {
  const left = 6;
  const right = width - 6;
  const placeX = (share: number): number => left + 2 + share * (right - left - 8);
  const dimensionY = (index: number): number => 54 + index * 6;
  const face = left;
  const shapes: Shape[] = [
    line("centre", at(left - 4, axisY), at(right + 4, axisY)),
    line("wide", at(face, 6), at(face, 74)),
    words(at(left, 84), "face, z = 0", "start", "muted"),
    ...bores.flatMap(({ id, share, half }, index) => {
      const x = placeX(share);
      return [
        box("wide", at(x - boreLength / 2, axisY - half - wall), boreLength, wall, "shade"),
        box("wide", at(x - boreLength / 2, axisY + half), boreLength, wall, "shade"),
        line("quiet", at(x, axisY + half + wall + 1), at(x, dimensionY(index) + 1)),
        words(at(x, axisY - half - wall - 1.6), id, "middle"),
        ...dimension(
          at(face, dimensionY(index)),
          at(x, dimensionY(index)),
          x - face > textWidth(`z of ${id}`) + 2 ? `z of ${id}` : "",
        ),
      ];
    }),
    ...drawArrow(at(left, 79), at(right, 79), "wide"),
    words(at(right, 84), "z, downstream", "end"),
  ];
  return {
    width,
    height: 87,
    shapes,
    title: "Stations along z",
    alternative:
      "A side view: four bores stand along one line. Each has a distance z from one common face at the left, increasing downstream to the right.",
  };
}
