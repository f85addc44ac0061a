import type { AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { Converter } from "../../shared/units.ts";
import type { AxisMethod } from "../compute/axis/axis-input.ts";
import type { AxisOptimum, LineEvidence } from "../compute/axis/axis-result.ts";

type AxisAnswer = AxisDeviationResult["axis"];

/** What an axis of minimum_zone or least_absolute attains and how that is proved, in the members of the answer. */
export function answerOptimum(
  method: AxisMethod,
  optimum: AxisOptimum,
  through: readonly string[],
  offset: Converter,
): Pick<AxisAnswer, "zoneWidth" | "sumAbsolute" | "contacts" | "optimality"> {
  const extent = (part: LineEvidence) => offset.fromMm(part.extentMm);
  const idOf = (place: number) => through[place]!;
  const contactsOf = ({ contacts }: LineEvidence) => contacts.map(idOf);
  const bounds = ({ objectiveMm, lowerBoundMm }: LineEvidence) => ({
    objective: offset.fromMm(objectiveMm),
    lowerBound: offset.fromMm(lowerBoundMm),
  });
  const named = (extents: number | { h: number; v: number }) =>
    method === "minimum_zone" ? { zoneWidth: extents } : { sumAbsolute: extents };
  if (optimum.zone === "cylinder") {
    const { both } = optimum;
    const multipliers = both.multipliers.map(({ place, h, v }) => ({ id: idOf(place), h, v }));
    return {
      ...named(extent(both)),
      contacts: contactsOf(both),
      optimality: { ...bounds(both), multipliers },
    };
  }
  const inPlane = (plane: "h" | "v") => ({
    ...bounds(optimum[plane]),
    multipliers: optimum[plane].multipliers.map((one) => ({ id: idOf(one.place), multiplier: one[plane] })),
  });
  return {
    ...named({ h: extent(optimum.h), v: extent(optimum.v) }),
    contacts: { h: contactsOf(optimum.h), v: contactsOf(optimum.v) },
    optimality: { h: inPlane("h"), v: inPlane("v") },
  };
}
