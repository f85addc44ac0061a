import { readDecimal } from "../../../lib/read-decimal.ts";
import { textOf } from "../../../lib/read-form.ts";

/** An instrument as typed. */
export interface InstrumentDraft {
  readonly id: string;
  readonly description: string;
  readonly calibratedOn: string;
  readonly calibrationDueOn: string;
  readonly readingUncertainty: string;
}

export const emptyInstrument: InstrumentDraft = {
  id: "",
  description: "",
  calibratedOn: "",
  calibrationDueOn: "",
  readingUncertainty: "",
};

/** Rows in which something was typed. */
export function sentInstruments(instruments: readonly InstrumentDraft[]): readonly InstrumentDraft[] {
  return instruments.filter((one) => Object.values(one).some((text) => (text as string).trim() !== ""));
}

/** The body that starts a job: what is missing or no number is left for the schema to refuse. */
export function jobBodyOf(
  machineId: string,
  data: FormData,
  instruments: readonly InstrumentDraft[],
): unknown {
  const method = textOf(data, "method");
  const through = data.getAll("through");
  const listed = sentInstruments(instruments);
  return {
    machineId,
    details: {
      title: textOf(data, "title"),
      ...stated({
        orderNumber: textOf(data, "orderNumber"),
        site: textOf(data, "site"),
        startsOn: textOf(data, "startsOn"),
        endsOn: textOf(data, "endsOn"),
      }),
      seen: textOf(data, "seen"),
      axis: { method, ...(method === "line_of_sight" ? {} : { through }) },
      ...(listed.length === 0 ? {} : { instruments: listed.map(instrumentOf) }),
    },
  };
}

function instrumentOf({ id, description, readingUncertainty, ...dates }: InstrumentDraft): unknown {
  const uncertainty = readDecimal(readingUncertainty);
  return {
    id: id.trim(),
    description,
    ...stated(dates),
    ...(uncertainty === null ? {} : { readingUncertainty: uncertainty }),
  };
}

function stated(texts: Readonly<Record<string, string>>): Record<string, string> {
  return Object.fromEntries(Object.entries(texts).filter(([, text]) => text.trim() !== ""));
}
