import { limits } from "../../shared/limits.ts";
import type {
  MeasurementPlanRequest,
  PlannedBoreRequest,
  ReachableRequest,
  WantedRequest,
} from "../../shared/schemas/measurement-plans.ts";
import type { Converter } from "../../shared/units.ts";
import type { PlaneTolerance } from "../compute/conformity/tolerance.ts";
import { distinctPlaces, placeKey, placesInRanges } from "../compute/planning/clock-places.ts";
import type { PlanInput, ReachablePlace, WantedUncertainty } from "../compute/planning/plan-input.ts";
import { readTolerance } from "./read-tolerance.ts";

/** What the call states for the bores that state nothing of their own. */
export type PlanCall = Pick<MeasurementPlanRequest, "level" | "readingUncertainty" | "wanted">;

const levelDefault = 0.95;
/** Half-width of a tolerance over expanded uncertainty (common practice, no source). */
const ratioDefault = 4;
/** Pairs of readings weighed by the exchange, of one bore and of a whole call. */
const exchangesPerBore = 300_000;
const exchangesPerCall = 4_000_000;

/**
 * A bore as the engine plans it, wanted and uncertainty known. `bores` is how many the call has.
 * @throws RangeError where no uncertainty is stated: a call is refused for that before
 */
export function planInputOf(
  bore: PlannedBoreRequest,
  wanted: WantedRequest,
  call: PlanCall,
  bores: number,
  offset: Converter,
): PlanInput {
  const stated = bore.readingUncertainty ?? call.readingUncertainty;
  if (typeof stated !== "number") throw new RangeError("No uncertainty of a reading is stated.");
  const uMm = offset.toMm(stated);
  return {
    form: bore.form === "rotating_target" ? "rotating_target" : "wall",
    taken: (bore.read ?? []).map(({ clockDeg, u }) => ({
      clockDeg,
      uMm: typeof u === "number" ? offset.toMm(u) : uMm,
      times: 1,
    })),
    places: reachableOf(bore),
    uMm,
    wanted: wantedOf(wanted, offset),
    level: call.level ?? levelDefault,
    addedMax: bore.addedMax ?? limits.addedPerBore,
    exchangesMax: Math.min(exchangesPerBore, Math.floor(exchangesPerCall / bores)),
  };
}

/** The places of a bore, each once, clockwise from 12 o'clock, with what may still be read there. */
function reachableOf({ reachable, read }: PlannedBoreRequest): ReachablePlace[] {
  if (!reachable) return [];
  const taken = new Map<number, number>();
  for (const { clockDeg } of read ?? []) {
    const key = placeKey(clockDeg);
    taken.set(key, (taken.get(key) ?? 0) + 1);
  }
  return placesOf(reachable)
    .sort((a, b) => a - b)
    .map((clockDeg) => ({
      clockDeg,
      readingsMax: Math.max(0, (reachable.readingsPerPlace ?? 1) - (taken.get(placeKey(clockDeg)) ?? 0)),
    }));
}

/** Each place that can be reached once; more than `limits.placesPerBore` where a range holds too many. */
export function placesOf(reachable: ReachableRequest): number[] {
  return distinctPlaces(
    "clockDegs" in reachable
      ? reachable.clockDegs
      : placesInRanges(reachable.ranges, reachable.stepDeg, limits.rangesPerBore * limits.placesPerBore),
  );
}

/** The expanded uncertainty wanted, of a tolerance by its ratio. */
export function wantedOf(wanted: WantedRequest, offset: Converter): WantedUncertainty {
  if ("expandedUncertainty" in wanted) {
    const { expandedUncertainty: expanded } = wanted;
    return "radial" in expanded
      ? { form: "radial", radialMm: offset.toMm(expanded.radial) }
      : { form: "planes", hMm: offset.toMm(expanded.h), vMm: offset.toMm(expanded.v) };
  }
  const { ratio = ratioDefault } = wanted;
  const tolerance = readTolerance(wanted.tolerance, offset);
  if (tolerance.form === "radial") return { form: "radial", radialMm: tolerance.halfWidthMm / ratio };
  const halfMm = ({ minMm, maxMm }: PlaneTolerance) => (maxMm - minMm) / 2 / ratio;
  return { form: "planes", hMm: halfMm(tolerance.h), vMm: halfMm(tolerance.v) };
}
