import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { momentCell, numberCell, textCell, titleCell, type SheetCell } from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { authorName, signatureWords } from "../report-words.ts";
import { section } from "./section.ts";
import { formatsOf } from "./number-formats.ts";

/** Under what conditions, with what and by whom it was measured. */
export function conditionsSheet(record: JobRecord): Sheet {
  const rows: SheetCell[][] = [
    [titleCell(`Conditions: ${record.machineName}`)],
    [textCell(signatureWords(record), { fontWeight: "bold" })],
    [],
    ...checks(record),
    ...instruments(record),
    ...temperatures(record),
    ...readings(record),
  ];
  return {
    name: "Conditions",
    rows,
    widths: [36, 26, 22, 22, 20, 18, 14, 16, 30],
    frozen: { rows: 2, columns: 1 },
  };
}

const answers = { yes: "yes", no: "no", not_applicable: "not applicable" } as const;

function checks({ checks: all }: JobRecord): SheetCell[][] {
  return section(
    "Set-up checks",
    ["Check", "Answer", "By", "When (UTC)", "Remark"],
    "None.",
    all.map(({ text, answer, by, at, remark }) => [
      textCell(text, { wrap: true, alignVertical: "top" }),
      textCell(answer ? answers[answer] : "not answered"),
      textCell(by),
      momentCell(at),
      textCell(remark),
    ]),
  );
}

function instruments(record: JobRecord): SheetCell[][] {
  const { across } = formatsOf(record);
  return section(
    "Instruments",
    [
      "Instrument",
      "Description",
      "Calibrated on",
      "Calibration due",
      `Standard uncertainty of a reading (${record.machine.units.offset})`,
    ],
    "No instrument is named.",
    (record.details.instruments ?? []).map(
      ({ id, description, calibratedOn, calibrationDueOn, readingUncertainty }) => [
        textCell(id),
        textCell(description),
        textCell(calibratedOn),
        textCell(calibrationDueOn),
        numberCell(readingUncertainty, across),
      ],
    ),
  );
}

const stages = { as_found: "as found", after_step: "after a step", as_left: "as left" } as const;

export function surveyName({ survey: { stage, label } }: JobRecord["surveys"][number]): string {
  return label ? `${label} (${stages[stage]})` : stages[stage];
}

function temperatures({ surveys }: JobRecord): SheetCell[][] {
  const rows = surveys.flatMap((survey) => {
    const { conditions } = survey.survey;
    if (!conditions) return [];
    const { temperatureUnit, ambient, metal = [], remark } = conditions;
    const line = (place: string, value: number | null | undefined) =>
      value === null || value === undefined
        ? []
        : [
            [
              textCell(surveyName(survey)),
              textCell(place),
              numberCell(value, "0.0"),
              textCell(`°${temperatureUnit}`),
            ],
          ];
    return [
      ...line("air", ambient),
      ...metal.flatMap(({ place, value }) => line(place, value)),
      ...(remark ? [[textCell(surveyName(survey)), textCell("remark"), textCell(remark)]] : []),
    ];
  });
  return section("Temperatures", ["Survey", "Place", "Value", "Unit"], "None was noted.", rows);
}

function readings({ surveys }: JobRecord): SheetCell[][] {
  const rows = surveys.flatMap((survey) =>
    survey.readings.map(({ reading, author, counts, sourceFile }) => [
      textCell(surveyName(survey)),
      textCell(reading.station),
      momentCell(reading.takenAt),
      textCell(reading.person ?? authorName(author)),
      textCell(reading.instrument ?? survey.survey.instrument),
      textCell(reading.form.replaceAll("_", " ")),
      textCell(reading.upperHalf ?? null),
      textCell(`${counts ? "yes" : "no"}${reading.closing ? ", closing" : ""}`),
      textCell(sourceFile?.name),
    ]),
  );
  return section(
    "Readings",
    [
      "Survey",
      "Station",
      "Taken at (UTC)",
      "Person",
      "Instrument",
      "Form",
      "Upper half",
      "Counts",
      "From file",
    ],
    "No reading has been stored.",
    rows,
  );
}
