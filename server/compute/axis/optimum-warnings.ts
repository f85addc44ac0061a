import type { AxisMethod } from "./axis-input.ts";
import type { AxisOptimum, LineEvidence, Warning } from "./axis-result.ts";

/** What a reader must know of an axis of minimum_zone or least_absolute: where the best was not the only one. */
export function optimumWarnings(
  method: AxisMethod,
  optimum: AxisOptimum,
  covarianceKnown: boolean,
): Warning[] {
  return partsOf(optimum).flatMap(({ where, part }) => [
    ...(part.unique ? [] : [notUnique(method, where)]),
    ...(part.spareContacts && covarianceKnown ? [spareContacts(method, where)] : []),
  ]);
}

function partsOf(optimum: AxisOptimum): { where: string; part: LineEvidence }[] {
  if (optimum.zone === "cylinder") return [{ where: "", part: optimum.both }];
  return [
    { where: "In h ", part: optimum.h },
    { where: "In v ", part: optimum.v },
  ];
}

function notUnique(method: AxisMethod, where: string): Warning {
  const detail =
    method === "minimum_zone"
      ? "all reference stations that touch the smallest zone stand at one z, so its slope is open: " +
        "the axis answered is that of least largest distance from the other reference stations."
      : "several axes have the same least sum: the axis answered is that of least sum of squares " +
        "among those through two reference stations.";
  return { code: "axis_not_unique", detail: sentence(where, detail) };
}

function spareContacts(method: AxisMethod, where: string): Warning {
  const detail =
    method === "minimum_zone"
      ? "more reference stations touch the zone than set it: the covariance is taken from one choice of them."
      : "the axis passes through more reference stations than set it: the covariance is taken from one choice of them.";
  return { code: "contacts_not_unique", detail: sentence(where, detail) };
}

const sentence = (where: string, detail: string): string =>
  where + (where === "" ? detail[0]!.toUpperCase() : detail[0]!) + detail.slice(1);
