import { machineSchema } from "../../../../../shared/schemas/machines.ts";
import { useChange } from "../../../lib/use-change.ts";
import { machinesKey } from "./list-machines.ts";

/** Describes, changes, copies, archives or restores a machine: the path and method say which. */
export function useChangeMachine() {
  return useChange(machineSchema, [machinesKey]);
}
