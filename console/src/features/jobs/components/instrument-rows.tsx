import { Button } from "../../../components/ui/button.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { emptyInstrument, type InstrumentDraft } from "./start-job-body.ts";

interface InstrumentRowsProps {
  instruments: readonly InstrumentDraft[];
  /** The machine's offset unit. */
  unit: string;
  fault: (row: number, field: keyof InstrumentDraft) => string | undefined;
  onChange: (instruments: readonly InstrumentDraft[]) => void;
}

/** What is measured with, and until when its calibration is good. */
export function InstrumentRows({ instruments, unit, fault, onChange }: InstrumentRowsProps) {
  const set = (row: number, change: Partial<InstrumentDraft>): void =>
    onChange(instruments.map((one, index) => (index === row ? { ...one, ...change } : one)));
  return (
    <fieldset className="grid gap-4">
      <legend className="field-name mb-1">Instruments</legend>
      {instruments.map((instrument, row) => (
        <div key={row} className="grid gap-3 border-l border-rule pl-3 sm:grid-cols-2 lg:grid-cols-5">
          {fields.map(({ name, label, type }) => (
            <TextField
              key={name}
              label={`${name === "readingUncertainty" ? `${label}, ${unit}` : label}`}
              aria-label={`${label}, instrument ${row + 1}`}
              type={type}
              inputMode={name === "readingUncertainty" ? "decimal" : undefined}
              value={instrument[name]}
              error={fault(row, name)}
              onChange={(event) => set(row, { [name]: event.target.value })}
            />
          ))}
        </div>
      ))}
      <div>
        <Button onClick={() => onChange([...instruments, emptyInstrument])}>Add an instrument</Button>
      </div>
    </fieldset>
  );
}

const fields: readonly { name: keyof InstrumentDraft; label: string; type: "text" | "date" }[] = [
  { name: "id", label: "Id", type: "text" },
  { name: "description", label: "Description", type: "text" },
  { name: "calibratedOn", label: "Calibrated on", type: "date" },
  { name: "calibrationDueOn", label: "Calibration due", type: "date" },
  { name: "readingUncertainty", label: "u of a reading", type: "text" },
];
