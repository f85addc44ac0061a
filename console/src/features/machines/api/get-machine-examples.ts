import { useQuery } from "@tanstack/react-query";
import { apiPaths } from "../../../config/paths.ts";
import { documentQuery, examplesAt } from "../../try-call/api/get-examples.ts";

/** Machines as the service's own document shows them. */
export function useMachineExamples() {
  return useQuery({ ...documentQuery, select: (document) => examplesAt(document, apiPaths.machines) });
}
