import type { ComputedSurvey } from "../../../shared/figures/job/compared-surveys.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import type { MachineStation } from "../../../shared/schemas/machines.ts";
import { writeCsv } from "../../spreadsheets/write-csv.ts";
import { allowedBy, boresOf, numberedName, reportedSurveys, type SurveyedBore } from "../found-and-left.ts";
import type { ReportContext, ReportFormat } from "../report-format.ts";
import { signatureWords } from "../report-words.ts";

/** One row a station, as found, every survey after a step and as left side by side, every number in full. */
export const csvReport: ReportFormat = {
  extension: "csv",
  mediaType: "text/csv; charset=utf-8",
  write: (record, context) => {
    const columns = columnsOf(record, context);
    const rows = record.machine.stations.map((station) => columns.map(({ value }) => value(station) ?? null));
    return Buffer.from(writeCsv([columns.map(({ heading }) => heading), ...rows]), "utf8");
  },
};

interface Column {
  readonly heading: string;
  readonly value: (station: MachineStation) => string | number | null | undefined;
}

function columnsOf(record: JobRecord, { recordHash, engineVersion }: ReportContext): Column[] {
  const { axial, bore, offset } = record.machine.units;
  const { found, others, left } = reportedSurveys(record);
  const always = (heading: string, value: string | number): Column => ({ heading, value: () => value });
  const least = (station: MachineStation, plane: "h" | "v", side: 0 | 1) => {
    const allowed = allowedBy(station);
    return allowed?.form === "planes" ? allowed[plane][side] : null;
  };
  return [
    { heading: "station", value: ({ id }) => id },
    { heading: "label", value: ({ label }) => label },
    { heading: "kind", value: ({ kind }) => kind },
    { heading: `z (${axial})`, value: ({ z }) => z },
    { heading: `nominal diameter (${bore})`, value: ({ nominalDiameter }) => nominalDiameter },
    { heading: `target h (${offset})`, value: ({ target }) => target?.h ?? 0 },
    { heading: `target v (${offset})`, value: ({ target }) => target?.v ?? 0 },
    {
      heading: `tolerance radial (${offset})`,
      value: (station) => {
        const allowed = allowedBy(station);
        return allowed?.form === "radial" ? allowed.radius : null;
      },
    },
    { heading: `tolerance h least (${offset})`, value: (station) => least(station, "h", 0) },
    { heading: `tolerance h most (${offset})`, value: (station) => least(station, "h", 1) },
    { heading: `tolerance v least (${offset})`, value: (station) => least(station, "v", 0) },
    { heading: `tolerance v most (${offset})`, value: (station) => least(station, "v", 1) },
    ...surveyColumns(record, "as found", found),
    ...others.flatMap((survey) => surveyColumns(record, numberedName(survey), survey)),
    ...surveyColumns(record, "as left", left),
    {
      heading: "concession",
      value: ({ id }) => {
        const granted = record.concessions.filter(({ station }) => station === id).at(-1);
        return granted && `${granted.name}: ${granted.reason}`;
      },
    },
    {
      heading: "flags",
      value: ({ id }) =>
        record.flags
          .filter(({ station }) => station === null || station === id)
          .map(({ detail }) => detail)
          .join(" "),
    },
    always("machine", record.machineName),
    always("job", record.id),
    always("revision", record.revision),
    always("status", signatureWords(record)),
    always("record hash", recordHash),
    always("engine version", engineVersion),
  ];
}

/** Empty where the survey was not computed, or has not this station. */
function surveyColumns(record: JobRecord, words: string, computed: ComputedSurvey | null): Column[] {
  const { offset, bore: diameterUnit } = record.machine.units;
  const bores = new Map(
    (computed ? boresOf(record, computed) : []).map((bore) => [bore.station.id, bore] as const),
  );
  const column = (heading: string, value: (bore: SurveyedBore) => string | number | null | undefined) => ({
    heading: `${words} ${heading}`,
    value: ({ id }: MachineStation) => {
      const bore = bores.get(id);
      return bore && value(bore);
    },
  });
  const length = (heading: string, value: (bore: SurveyedBore) => number | null | undefined) =>
    column(`${heading} (${offset})`, value);
  return [
    column("sets the axis", ({ answer }) => (answer.reference ? "yes" : "no")),
    length("centre h", ({ fit }) => fit.centre.h),
    length("centre v", ({ fit }) => fit.centre.v),
    column(`diameter (${diameterUnit})`, ({ fit }) => fit.diameter),
    length("axis h at z", ({ axis }) => axis.h),
    length("axis v at z", ({ axis }) => axis.v),
    length("deviation h", ({ answer }) => answer.deviation.h),
    length("deviation v", ({ answer }) => answer.deviation.v),
    length("deviation radial", ({ answer }) => answer.deviation.radial),
    column("deviation clock (deg)", ({ answer }) => answer.deviation.clockDeg),
    length("expanded uncertainty h", ({ answer }) => answer.expandedUncertainty?.h),
    length("expanded uncertainty v", ({ answer }) => answer.expandedUncertainty?.v),
    length("expanded uncertainty radial", ({ answer }) => answer.expandedUncertainty?.radial),
    column("share of tolerance", ({ answer }) => answer.ratio),
    column("verdict", ({ answer }) => answer.verdict),
  ];
}
