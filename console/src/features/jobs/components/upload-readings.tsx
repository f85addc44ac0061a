import { useState } from "react";
import type { ReadingPreview } from "../../../../../shared/schemas/reading-files.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { useAddReadingFile } from "../api/add-reading-file.ts";
import { fileOf, readingFilePath, usePreviewReadings } from "../api/preview-readings.ts";
import { PreviewTables } from "./preview-tables.tsx";

/** A file of readings: previewed first, stored only without a fault and when told to. */
export function UploadReadings({ job, survey }: { job: string; survey: string }) {
  const [file, setFile] = useState<File | null>(null);
  const [columns, setColumns] = useState("");
  const [ignore, setIgnore] = useState("");
  const preview = usePreviewReadings(job, survey);
  const store = useAddReadingFile();
  const show = (chosen: File): void => {
    store.reset();
    preview.mutate({ file: chosen, columns, ignore });
  };
  const choose = (chosen: File | null): void => {
    setFile(chosen);
    preview.reset();
    if (chosen) show(chosen);
  };
  const shown = preview.isSuccess && preview.variables.file === file ? preview : null;
  return (
    <div className="grid gap-4">
      <Field
        label="File of readings, CSV or XLSX"
        hint="A head row, then one row a reading of the instrument: station, form, taken at, clock (deg), reading (mm) and so on."
      >
        {(attributes) => (
          <input
            {...attributes}
            type="file"
            accept=".csv,.xlsx,text/csv"
            className="control"
            onChange={(event) => choose(event.target.files?.[0] ?? null)}
          />
        )}
      </Field>
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField
          label="Columns of other names"
          hint="As station=Place,reading=Dial (mm)"
          value={columns}
          onChange={(event) => setColumns(event.target.value)}
        />
        <TextField
          label="Columns to leave out"
          hint="With commas between them."
          value={ignore}
          onChange={(event) => setIgnore(event.target.value)}
        />
      </div>
      {file !== null && (
        <div>
          <Button busy={preview.isPending} onClick={() => show(file)}>
            Preview again
          </Button>
        </div>
      )}
      {preview.isPending && (
        <p role="status" className="late text-muted">
          Reading the file
        </p>
      )}
      {preview.isError && <Failure error={preview.error} what="The file could not be read." />}
      {shown !== null && <PreviewTables preview={shown.data} />}
      {shown !== null && !store.isSuccess && (
        <StoreButton
          preview={shown.data}
          busy={store.isPending}
          onStore={() =>
            // What was previewed is what is stored, whatever was typed since.
            store.mutate({
              path: readingFilePath(job, survey, "reading-files", shown.variables),
              file: fileOf(shown.variables),
            })
          }
        />
      )}
      {store.isError && <Failure error={store.error} what="The file was not stored." />}
      <p role="status">
        {store.isSuccess &&
          `${store.data.ids.length} readings of ${store.data.file.name} are stored. Compute the survey next.`}
      </p>
    </div>
  );
}

function StoreButton({
  preview: { readings, faults },
  busy,
  onStore,
}: {
  preview: ReadingPreview;
  busy: boolean;
  onStore: () => void;
}) {
  if (faults.length > 0) {
    return (
      <p className="font-semibold text-signal">
        Correct the file and choose it again: it is taken only without a fault.
      </p>
    );
  }
  return (
    <div>
      <Button look="main" busy={busy} disabled={readings.length === 0} onClick={onStore}>
        Store {readings.length} readings
      </Button>
    </div>
  );
}
