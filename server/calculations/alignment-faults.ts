import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { boreFitKind } from "./bore-fit.ts";
import { duplicates, idsOf, listOf, membersOf, unknownReference } from "./common-faults.ts";
import { shimMoveKind } from "./shim-move.ts";

/** How bores and stations fail to fit each other: a bore at no station, two at one, a station without a bore. */
export function pairingFaults(bores: readonly unknown[], stations: readonly unknown[]): Fault[] {
  const named = bores.map((bore) => {
    const { station } = membersOf(bore);
    return typeof station === "string" ? station : null;
  });
  const ids = idsOf(stations);
  const [known, read] = [new Set(ids), new Set(named)];
  const complete = named.every((id) => id !== null);
  return [
    ...duplicates(named, (index) => ["bores", index, "station"]),
    ...named.flatMap((id, index) =>
      id === null || known.has(id) ? [] : [unknownReference(["bores", index, "station"], "station")],
    ),
    ...ids.flatMap((id, index) =>
      !complete || id === null || read.has(id) ? [] : [withoutBore(["stations", index, "id"])],
    ),
  ];
}

function withoutBore(at: readonly PropertyKey[]): Fault {
  return {
    pointer: pointerOf(at),
    code: "unknown_reference",
    detail: "No bore of this call names this station.",
  };
}

/** The domain faults of the sound parts of a body that failed its schema elsewhere. */
export function alignmentFaultsBesideSchema(body: unknown, schemaFaults: readonly Fault[]): Fault[] {
  const sent = membersOf(body);
  const bores = listOf(sent["bores"]);
  const stations = listOf(sent["stations"]);
  const fits = { ...sent, bores: bores.map((bore) => without(bore, ["station"])) };
  // The other calls of the chain take lengths alone.
  const lengths = without(sent["units"], ["temperature"]);
  const axis = {
    ...sent,
    units: lengths,
    stations: stations.map((station) => withMember(station, "centre")),
  };
  const own = ["target", "targetUncertainty", "weight"];
  const moves = {
    ...sent,
    units: lengths,
    stations: stations.map((station) => withMember(without(station, own), "deviation")),
    reference: membersOf(sent["axis"])["through"],
  };
  return distinct([
    ...pairingFaults(bores, stations),
    ...(boreFitKind.faultsBesideSchema?.(fits, schemaFaults) ?? []),
    ...(axisDeviationKind.faultsBesideSchema?.(axis, schemaFaults) ?? []),
    ...(shimMoveKind.faultsBesideSchema?.(moves, schemaFaults) ?? []).map(toAlignment),
  ]);
}

/** A fault of the moves' call at its place in the whole call. */
export function toAlignment(fault: Fault): Fault {
  return fault.pointer.startsWith("/reference/")
    ? { ...fault, pointer: `/axis/through/${fault.pointer.slice("/reference/".length)}` }
    : fault;
}

/** Each fault once: what two parts of the chain both find is one fault of the call. */
export function distinct(faults: readonly Fault[]): Fault[] {
  const seen = new Set<string>();
  return faults.filter(({ pointer, code }) => {
    const key = `${pointer} ${code}`;
    return seen.has(key) ? false : seen.add(key);
  });
}

function without(value: unknown, names: readonly string[]): unknown {
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(Object.entries(value).filter(([name]) => !names.includes(name)));
}

function withMember(value: unknown, name: string): unknown {
  return typeof value === "object" && value !== null ? { ...value, [name]: { h: 0, v: 0 } } : value;
}
