import type { ShimMoveResult } from "./schemas/shim-moves.ts";

type ComponentMove = Pick<ShimMoveResult["components"][number], "realised" | "roll">;

/**
 * How a plan moves the bores of a component, at the z of each support and in the plan's offset unit: as its supports,
 * and by what taking out a roll adds. That is what a line of sight sees, and what an indicator reads that points at the
 * bore: turned about the bore, a part comes no nearer to it (rigid body, small angles). Empty without a component.
 */
export function plannedBoreMoves(component: ComponentMove | undefined): ComponentMove["realised"] {
  const shift = component?.roll?.boreShift ?? { h: 0, v: 0 };
  return (component?.realised ?? []).map(({ support, h, v }) => ({
    support,
    h: h + shift.h,
    v: v + shift.v,
  }));
}
