import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import type { Units } from "../../../../../shared/units.ts";
import type { ReadingDraft } from "./reading-draft.ts";

interface FieldsProps {
  draft: ReadingDraft;
  units: Units;
  fault: (pointer: string) => string | undefined;
  onChange: (change: Partial<ReadingDraft>) => void;
}

/** How a turned gauge reads. */
export function GaugeFields({ draft, units, fault, onChange }: FieldsProps) {
  return (
    <>
      <SelectField
        label="Sense"
        options={[
          { value: "larger_is_farther", words: "larger is farther" },
          { value: "larger_is_nearer", words: "larger is nearer" },
        ]}
        value={draft.sense}
        onChange={(event) => onChange({ sense: event.target.value })}
      />
      <SelectField
        label="Zero"
        options={[
          { value: "nominal", words: "at the nominal radius" },
          { value: "arbitrary", words: "anywhere" },
        ]}
        value={draft.zero}
        onChange={(event) => onChange({ zero: event.target.value })}
      />
      <TextField
        label={`Gauge sag, ${units.offset}`}
        inputMode="decimal"
        value={draft.gaugeSag}
        error={fault("/readings/0/gaugeSag")}
        onChange={(event) => onChange({ gaugeSag: event.target.value })}
      />
    </>
  );
}

/** What a wire's readings are taken to. */
export function WireFields({ draft, units, fault, onChange }: FieldsProps) {
  return (
    <>
      <SelectField
        label="Measured to"
        options={[
          { value: "surface", words: "the wire's surface" },
          { value: "centre", words: "the wire's centre" },
        ]}
        value={draft.measuredTo}
        onChange={(event) => onChange({ measuredTo: event.target.value })}
      />
      <TextField
        label={`Wire diameter, ${units.bore}`}
        inputMode="decimal"
        value={draft.wireDiameter}
        error={fault("/readings/0/wire/wireDiameter")}
        onChange={(event) => onChange({ wireDiameter: event.target.value })}
      />
      <TextField
        label={`Sag of the wire here, ${units.offset}`}
        inputMode="decimal"
        value={draft.sag}
        error={fault("/readings/0/wire/sag")}
        onChange={(event) => onChange({ sag: event.target.value })}
      />
    </>
  );
}
