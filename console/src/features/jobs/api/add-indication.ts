import { indicationAnswer } from "../../../../../shared/schemas/indications.ts";
import { useChange } from "../../../lib/use-change.ts";

/** Sends what was read at one moment of a move. The job's record holds none of it, so nothing is read anew. */
export function useAddIndication() {
  return useChange(indicationAnswer, []);
}
