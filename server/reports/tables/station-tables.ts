import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type Cell,
  type FigureTable,
} from "../../../shared/figures/figure-table.ts";
import { computedSurveys, type ComputedSurvey } from "../../../shared/figures/job/compared-surveys.ts";
import {
  decimalsAcross,
  decimalsAlong,
  decimalsFor,
  writeNumber,
  writeSigned,
} from "../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import type { MachineDocument, MachineStation } from "../../../shared/schemas/machines.ts";
import { concessionOf } from "../found-and-left.ts";

/** Decimals that show every tolerance of a machine: as few as do, never more than a result has. */
function toleranceDecimals({ stations, units }: MachineDocument): number {
  const most = decimalsAcross(units.offset);
  const needed = stations.flatMap(({ tolerance }) =>
    tolerance
      ? Object.values(tolerance)
          .flat()
          .map((limit) => {
            const decimals = Array.from({ length: most }, (_, index) => index);
            return decimals.find((one) => Number(limit.toFixed(one)) === limit) ?? most;
          })
      : [],
  );
  return Math.max(0, ...needed);
}

/** A tolerance in words: "radial 0.12" is round, planes are half-widths or ranges. */
export function toleranceWords({ tolerance }: Pick<MachineStation, "tolerance">, decimals: number): string {
  const side = (one: number | readonly number[]): string =>
    typeof one === "number"
      ? `\u00b1${writeNumber(one, decimals)}`
      : `${writeSigned(one[0] ?? 0, decimals)} to ${writeSigned(one[1] ?? 0, decimals)}`;
  if (!tolerance) return "none";
  if ("radial" in tolerance) return `radial ${writeNumber(tolerance.radial, decimals)}`;
  const [h, v] = [side(tolerance.h), side(tolerance.v)];
  return h === v ? `h, v ${h}` : `h ${h}, v ${v}`;
}

/** The machine's stations as its document has them, with what sets the axis. */
export function tabulateStations({ machine, details }: JobRecord): FigureTable {
  const { axial, bore, offset } = machine.units;
  const reference = new Set(details.axis ? (details.axis.through ?? []) : (machine.reference ?? []));
  return {
    caption: "Stations of the machine",
    columns: [
      textColumn("station"),
      textColumn("called"),
      textColumn("kind"),
      textColumn("sets the axis"),
      numberColumn("z", axial),
      numberColumn("nominal diameter", bore),
      numberColumn("target h", offset),
      numberColumn("target v", offset),
      { heading: "tolerance", unit: offset, align: "start" },
    ],
    rows: machine.stations.map((station) => [
      textCell(station.id),
      textCell(station.label ?? "\u2013"),
      textCell(station.kind),
      textCell(reference.has(station.id) ? "yes" : "\u2013"),
      numberCell(station.z, decimalsAlong(axial)),
      numberCell(station.nominalDiameter, Math.min(3, decimalsAcross(bore))),
      signedCell(station.target?.h ?? 0, decimalsAcross(offset)),
      signedCell(station.target?.v ?? 0, decimalsAcross(offset)),
      textCell(toleranceWords(station, toleranceDecimals(machine))),
    ]),
  };
}

/**
 * Every station with a row for each computed survey, so that as found and as left stand over each other: centre, target,
 * deviation, its expanded uncertainty, tolerance, verdict, concession.
 */
export function tabulateFoundAndLeft(record: JobRecord): FigureTable {
  const surveys = computedSurveys(record);
  const { axial, offset } = record.machine.units;
  const decimals = decimalsFor(
    surveys.flatMap(({ result }) => [
      ...result.stations.flatMap(({ deviation }) => [deviation.h, deviation.v]),
      ...result.fits.flatMap(({ centre }) => [centre.h, centre.v]),
    ]),
    decimalsAcross(offset),
  );
  const tolerances = toleranceDecimals(record.machine);
  return {
    caption: "Every station, survey by survey",
    columns: [
      textColumn("station"),
      numberColumn("z", axial),
      numberColumn("target h", offset),
      numberColumn("target v", offset),
      { heading: "tolerance", unit: offset, align: "start" },
      textColumn("survey"),
      numberColumn("centre h", offset),
      numberColumn("centre v", offset),
      numberColumn("dev. h", offset),
      numberColumn("dev. v", offset),
      numberColumn("radial", offset),
      numberColumn("clock", "\u00b0"),
      numberColumn("U of h", offset),
      numberColumn("U of v", offset),
      numberColumn("U of radial", offset),
      numberColumn("of tol.", "%"),
      textColumn("verdict"),
      textColumn("concession"),
    ],
    rows: record.machine.stations.flatMap((station): Cell[][] => {
      const measured = surveys.filter(({ result }) => result.stations.some(({ id }) => id === station.id));
      const head: Cell[] = [
        textCell(""),
        numberCell(station.z, decimalsAlong(axial)),
        signedCell(station.target?.h ?? 0, decimals),
        signedCell(station.target?.v ?? 0, decimals),
        textCell(toleranceWords(station, tolerances)),
      ];
      const blank = head.map(() => textCell(""));
      return measured.map((survey, index) => {
        const answer = survey.result.stations.find(({ id }) => id === station.id);
        const name = textCell(answer?.reference ? `${station.id} (ref.)` : station.id);
        return [
          ...(index === 0 ? [name, ...head.slice(1)] : blank),
          ...surveyCells(survey, station.id, decimals),
          textCell(concessionOf(record, survey, station.id)?.name ?? "\u2013"),
        ];
      });
    }),
  };
}

function surveyCells({ name, result }: ComputedSurvey, id: string, decimals: number): Cell[] {
  const answer = result.stations.find((station) => station.id === id);
  const fit = result.fits.find((one) => one.id === id);
  const { deviation, expandedUncertainty: expanded, ratio, verdict } = answer ?? {};
  return [
    textCell(name),
    signedCell(fit?.centre.h, decimals),
    signedCell(fit?.centre.v, decimals),
    signedCell(deviation?.h, decimals),
    signedCell(deviation?.v, decimals),
    numberCell(deviation?.radial, decimals),
    numberCell(deviation?.clockDeg, 1),
    numberCell(expanded?.h, decimals),
    numberCell(expanded?.v, decimals),
    numberCell(expanded?.radial, decimals),
    numberCell(ratio === null || ratio === undefined ? null : ratio * 100, 0),
    verdict ? { kind: "verdict", verdict } : textCell("not judged"),
  ];
}
