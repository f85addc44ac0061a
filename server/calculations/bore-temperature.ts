import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { BoreRequest } from "../../shared/schemas/bore-fits.ts";
import {
  expansionConverter,
  furtherConverter,
  referenceTemperature,
  type FurtherUnit,
} from "../../shared/units.ts";
import {
  reductionFactor,
  reductionRefusals,
  type ReadingWarmth,
  type Warmth,
} from "../compute/bore/reduce-to-reference.ts";
import { materials } from "../compute/targets/materials.ts";
import { faultOf } from "./collect-faults.ts";
import { belowAbsoluteZero, combinationInvalid, membersOf, unitNotStated } from "./common-faults.ts";

type TemperatureUnit = FurtherUnit<"temperature">;
type Side = keyof ReadingWarmth;

/** What a bore is multiplied by to be that at 20 °C, and by which coefficients. */
export interface Reduction {
  readonly factor: number;
  /** As used, per degree of the call; null where that side states no temperature. */
  readonly gaugeCoefficient: number | null;
  readonly partCoefficient: number | null;
  readonly warnings: readonly { readonly code: string; readonly detail: string }[];
}

const sides: readonly Side[] = ["gauge", "part"];
const isPresent = <Value>(value: Value): value is NonNullable<Value> => value !== undefined && value !== null;

/** How a bore without faults is reduced to 20 °C; null where it states no temperature, or the call no unit for it. */
export function readReduction(bore: BoreRequest, unit: TemperatureUnit | undefined): Reduction | null {
  const warmth = { gauge: warmthOf(bore, "gauge", unit), part: warmthOf(bore, "part", unit) };
  if (warmth.gauge === null && warmth.part === null) return null;
  return {
    factor: reductionFactor(warmth),
    gaugeCoefficient: coefficientOf(bore, "gauge", unit),
    partCoefficient: coefficientOf(bore, "part", unit),
    warnings: oneSideWarnings(warmth),
  };
}

/** The faults of a bore's temperatures that no other bore has to do with. */
export function temperatureFaults(
  bore: BoreRequest,
  index: number,
  unit: TemperatureUnit | undefined,
): Fault[] {
  const at = ["bores", index];
  const faults = sides.flatMap((side) => sideFaults(bore, side, at, unit));
  if (faults.length > 0 || unit === undefined) return faults;
  const warmth = { gauge: warmthOf(bore, "gauge", unit), part: warmthOf(bore, "part", unit) };
  return reductionRefusals(warmth).map((refusal) => ({
    ...faultOf(refusal, []),
    pointer: pointerOf([...at, `${String(refusal.details.at?.[0])}Temperature`]),
  }));
}

/** Temperatures without their unit, in a body that may be anything. */
export function temperatureUnitFaults(bores: readonly object[], units: unknown): Fault[] {
  if (typeof units !== "object" || units === null || membersOf(units)["temperature"] !== undefined) return [];
  const stated = bores.some((bore) => sides.some((side) => isPresent(membersOf(bore)[`${side}Temperature`])));
  return stated ? [unitNotStated("temperature")] : [];
}

function sideFaults(
  bore: BoreRequest,
  side: Side,
  at: readonly PropertyKey[],
  unit: TemperatureUnit | undefined,
): Fault[] {
  const temperature = bore[`${side}Temperature`];
  const [coefficient, material] = [bore[`${side}Coefficient`], bore[`${side}Material`]];
  const expands = isPresent(coefficient) || isPresent(material);
  const place = (member: string) => [...at, `${side}${member}`];
  const required = (member: string, detail: string): Fault => ({
    pointer: pointerOf(place(member)),
    code: "required",
    detail,
  });
  return [
    ...(isPresent(coefficient) && isPresent(material)
      ? [combinationInvalid(place("Coefficient"), `Send ${side}Coefficient or ${side}Material, not both.`)]
      : []),
    ...(isPresent(temperature) && !expands
      ? [required("Coefficient", `${side}Temperature needs ${side}Coefficient or ${side}Material.`)]
      : []),
    ...(expands && !isPresent(temperature)
      ? [required("Temperature", `An expansion of the ${side} goes with its temperature.`)]
      : []),
    ...(isPresent(temperature) ? belowAbsoluteZero(temperature, unit, place("Temperature")) : []),
  ];
}

/** Null where the side states no temperature, or nothing that expands. */
function warmthOf(bore: BoreRequest, side: Side, unit: TemperatureUnit | undefined): Warmth | null {
  const temperature = bore[`${side}Temperature`];
  const coefficient = coefficientOf(bore, side, unit);
  if (!isPresent(temperature) || coefficient === null || unit === undefined) return null;
  return {
    expansionPerK: expansionConverter(unit).toInside(coefficient),
    aboveReferenceK: furtherConverter("temperature", unit).toInside(temperature - referenceTemperature[unit]),
  };
}

/** Per degree of the call. */
function coefficientOf(bore: BoreRequest, side: Side, unit: TemperatureUnit | undefined): number | null {
  const [coefficient, material] = [bore[`${side}Coefficient`], bore[`${side}Material`]];
  if (isPresent(coefficient)) return coefficient;
  if (!isPresent(material) || unit === undefined) return null;
  return expansionConverter(unit).fromInside(materials[material].expansionPerK);
}

function oneSideWarnings({ gauge, part }: ReadingWarmth): Reduction["warnings"] {
  if (gauge !== null && part !== null) return [];
  const detail =
    gauge === null
      ? "The gauge's temperature is not stated: its scale is taken as true as it was when the bore was read."
      : "The part's temperature is not stated: it is taken as at 20 °C.";
  return [{ code: "one_temperature_stated", detail }];
}
