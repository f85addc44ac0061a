import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { adjusterSupport, sightStation } from "../../shared/schemas/sight-line-setups.ts";
import { combinationInvalid, duplicates, idsOf, listOf, membersOf, unitNotStated } from "./common-faults.ts";

/**
 * Every fault of the domain in a body, of its sound parts where others fail the schema: the same for a request that
 * passed its schema and for one that did not.
 */
export function sightLineFaults(body: unknown): Fault[] {
  const { units, stations, adjuster, sightPath } = membersOf(body);
  const supports = listOf(membersOf(adjuster)["supports"]);
  return [
    ...unitFaults(units, sightPath),
    ...duplicates(idsOf(listOf(stations)), (index) => ["stations", index, "id"]),
    ...stationFaults(listOf(stations)),
    ...duplicates(idsOf(supports), (index) => ["adjuster", "supports", index, "id"]),
    ...supportFaults(supports),
  ];
}

function unitFaults(units: unknown, sightPath: unknown): Fault[] {
  if (typeof units !== "object" || units === null || typeof sightPath !== "object" || sightPath === null) {
    return [];
  }
  return membersOf(units)["temperature"] === undefined ? [unitNotStated("temperature")] : [];
}

/** Two stations at one z leave the direction of the beam open. */
function stationFaults(stations: readonly unknown[]): Fault[] {
  const [first, second] = stations.map((station) => sightStation.safeParse(station).data);
  if (stations.length !== 2 || !first || !second || first.z !== second.z) return [];
  const detail = "A near and a far station stand at different z.";
  return [{ pointer: pointerOf(["stations", 1, "z"]), code: "stations_coincident", detail }];
}

/** Two supports at one z cannot tilt what they carry. */
function supportFaults(supports: readonly unknown[]): Fault[] {
  const [first, second] = supports.map((support) => adjusterSupport.safeParse(support).data);
  if (supports.length !== 2 || !first || !second || first.z !== second.z) return [];
  return [
    combinationInvalid(
      ["adjuster", "supports", 1, "z"],
      "Two supports that tilt the source stand at different z.",
    ),
  ];
}
