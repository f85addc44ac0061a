import { useState } from "react";
import { useNavigate } from "react-router-dom";
import { textCell, textColumn } from "../../../../../shared/figures/figure-table.ts";
import { Button } from "../../../components/ui/button.tsx";
import { DownloadButton } from "../../../components/ui/download-button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { apiPaths, paths } from "../../../config/paths.ts";
import { useImportMachine, usePreviewWorkbook, workbookOf } from "../api/import-machine.ts";

/** A machine from a filled-in workbook: previewed first, stored only without a fault and when told to. */
export function ImportWorkbook() {
  const navigate = useNavigate();
  const [file, setFile] = useState<File | null>(null);
  const preview = usePreviewWorkbook();
  const store = useImportMachine();
  const choose = (chosen: File | null): void => {
    setFile(chosen);
    store.reset();
    if (chosen) preview.mutate(chosen);
    else preview.reset();
  };
  const read = preview.isSuccess && preview.variables === file ? preview.data : null;
  return (
    <div className="grid gap-4">
      <div className="flex flex-wrap items-end gap-4">
        <Field label="Workbook (XLSX)">
          {(attributes) => (
            <input
              {...attributes}
              type="file"
              accept=".xlsx"
              className="control"
              onChange={(event) => choose(event.target.files?.[0] ?? null)}
            />
          )}
        </Field>
        <DownloadButton path={apiPaths.machineTemplate} fileName="machine-template.xlsx">
          Download an empty workbook
        </DownloadButton>
      </div>
      {preview.isPending && (
        <p role="status" className="late text-muted">
          Reading the workbook
        </p>
      )}
      {preview.isError && <Failure error={preview.error} what="The workbook could not be read." />}
      {read !== null && read.faults.length > 0 && (
        <>
          <p className="font-semibold text-signal">
            Correct the workbook and choose it again: it is taken only without a fault.
          </p>
          <NumberTable
            table={{
              caption: "Faults by cell",
              columns: ["sheet", "cell", "fault"].map(textColumn),
              rows: read.faults.map(({ sheet, cell, detail }) => [
                textCell(sheet),
                textCell(cell ?? "–"),
                textCell(detail),
              ]),
            }}
          />
        </>
      )}
      {read?.document && file && (
        <div className="grid justify-items-start gap-3">
          <p>
            {read.document.name}: {read.document.stations.length} stations,{" "}
            {(read.document.components ?? []).length} components.
          </p>
          <Button
            look="main"
            busy={store.isPending}
            onClick={() =>
              store.mutate(
                { path: `${apiPaths.machineImports}?store=true`, file: workbookOf(file) },
                { onSuccess: ({ machine }) => machine && void navigate(paths.machine(machine.id)) },
              )
            }
          >
            Store machine from workbook
          </Button>
        </div>
      )}
      {store.isError && <Failure error={store.error} what="The machine was not stored." />}
    </div>
  );
}
