import { useMutation } from "@tanstack/react-query";
import { machineImport } from "../../../../../shared/schemas/machine-workbooks.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { useChange } from "../../../lib/use-change.ts";
import { machinesKey } from "./list-machines.ts";

const mediaType = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet";

/** A workbook as the service takes it. */
export function workbookOf(file: File) {
  return { content: file, mediaType, name: file.name };
}

/** Reads a workbook without storing anything. */
export function usePreviewWorkbook() {
  return useMutation({
    mutationFn: async (file: File) => {
      const call = { method: "POST", path: apiPaths.machineImports, file: workbookOf(file) } as const;
      return readAnswer(machineImport, await callAsMember(call));
    },
  });
}

/** Stores the machine that a workbook describes. */
export function useImportMachine() {
  return useChange(machineImport, [machinesKey]);
}
