import type { Fault } from "../../shared/error-codes.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import { listOf, membersOf } from "../calculations/common-faults.ts";
import { shimMoveFaults, shimMoveFaultsBesideSchema } from "../calculations/shim-move-faults.ts";

/**
 * Every fault of a machine that passed its schema: those of POST /v1/shim-moves for its stations, components, supports,
 * stacks, couplings and indicators, at the same pointers, since a job sends them there.
 */
export function machineFaults(document: MachineDocument): Fault[] {
  const { units, stations, components = [], reference = [], couplings, indicators } = document;
  const { axial, bore, offset } = units;
  return shimMoveFaults({
    units: { axial, bore, offset },
    stations: stations.map(({ id, z, tolerance }) => ({
      id,
      z,
      deviation: { h: 0, v: 0 },
      tolerance: tolerance ?? null,
    })),
    reference,
    components,
    ...(couplings ? { couplings } : {}),
    ...(indicators ? { indicators } : {}),
  });
}

/** The faults of the sound parts of a machine that failed its schema elsewhere. */
export function machineFaultsBesideSchema(body: unknown): Fault[] {
  const sent = membersOf(body);
  const stations = listOf(sent["stations"]).map((station) => {
    const { id, z, tolerance } = membersOf(station);
    return { id, z, deviation: { h: 0, v: 0 }, tolerance };
  });
  return shimMoveFaultsBesideSchema({ ...sent, stations });
}

/** The same faults where the document is a member of the body. */
export function under(member: string, faults: readonly Fault[]): Fault[] {
  return faults.map((fault) => ({ ...fault, pointer: `/${member}${fault.pointer}` }));
}
