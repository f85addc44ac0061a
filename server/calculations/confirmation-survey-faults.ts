import type { Fault } from "../../shared/error-codes.ts";
import type { SurveyStationRequest } from "../../shared/schemas/confirmations.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import { addCovariances, isDefinite } from "../compute/confirmation/survey-change.ts";
import { findToleranceFaults } from "../compute/conformity/find-tolerance-faults.ts";
import { readAxisStation } from "./axis-deviation-input.ts";
import { faultOf } from "./collect-faults.ts";
import { asymmetry, combinationInvalid, notPositive } from "./common-faults.ts";
import { isCovariance } from "../compute/conformity/is-covariance.ts";
import { pointerOf } from "../../shared/pointer.ts";

type Place = readonly PropertyKey[];
type Converters = Record<Dimension, Converter>;

/** One z in two surveys differs by no more than its decimals were rounded, in millimetres and as a share of itself. */
const sameZMm = 1e-6;
const sameZShare = 1e-9;

/** What one station of one survey refuses by itself. */
export function surveyStationFaults(station: SurveyStationRequest, at: Place, convert: Converters): Fault[] {
  const { covariance, tolerance } = readAxisStation(station, convert);
  return [
    ...asymmetry(station.covariance, [...at, "covariance"]),
    ...notPositive(covariance, [...at, "covariance"]),
    ...(tolerance ? findToleranceFaults(tolerance).map((error) => faultOf(error, at)) : []),
  ];
}

/** What two surveys of one station refuse together: another z, or a change that would be exact in some direction. */
export function pairFaults(
  before: readonly (SurveyStationRequest | null)[],
  after: readonly (SurveyStationRequest | null)[],
  convert: Converters,
): Fault[] {
  const earlier = new Map<string, SurveyStationRequest>();
  // The first of an id that stands twice, which is a fault already.
  for (const station of before) if (station && !earlier.has(station.id)) earlier.set(station.id, station);
  return after.flatMap((station, index) => {
    const first = station && earlier.get(station.id);
    if (!station || !first) return [];
    const at = ["after", "stations", index];
    const [one, other] = [readAxisStation(first, convert), readAxisStation(station, convert)];
    const apartMm = Math.abs(one.zMm - other.zMm);
    const both = [one.covariance, other.covariance];
    const isExact =
      one.covariance !== null &&
      other.covariance !== null &&
      both.every((covariance) => covariance && isCovariance(covariance)) &&
      !isDefinite(addCovariances(one.covariance, other.covariance));
    return [
      ...(apartMm > sameZMm + sameZShare * Math.abs(one.zMm)
        ? [combinationInvalid([...at, "z"], "The earlier survey has the same station at another z.")]
        : []),
      ...(isExact ? [exactChange([...at, "covariance"])] : []),
    ];
  });
}

function exactChange(at: Place): Fault {
  return {
    pointer: pointerOf(at),
    code: "covariance_not_positive",
    detail:
      "Both surveys together have a variance above 0 in every direction: no change can be tested otherwise.",
  };
}
