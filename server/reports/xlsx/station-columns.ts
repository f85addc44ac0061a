import type { ComputedSurvey } from "../../../shared/figures/job/compared-surveys.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { columnName, formulaCell, numberCell, textCell, type SheetCell } from "../../spreadsheets/cell.ts";
import { allowedBy, concessionOf, type Allowed, type SurveyedBore } from "../found-and-left.ts";
import { formatsOf } from "./number-formats.ts";
import { verdictLooks } from "./section.ts";

interface StationColumn {
  readonly heading: string;
  readonly width: number;
  /** `row` as a reader counts it, from 1. */
  readonly cell: (bore: SurveyedBore, row: number) => SheetCell;
}

/** The columns by name, in order: formulas refer to one another by these. */
const order = [
  "station",
  "reference",
  "z",
  "centreH",
  "centreV",
  "targetH",
  "targetV",
  "axisH",
  "axisV",
  "h",
  "v",
  "radial",
  "clock",
  "radius",
  "leastH",
  "mostH",
  "leastV",
  "mostV",
  "ratio",
  "uncertaintyH",
  "uncertaintyV",
  "uncertaintyRadial",
  "verdict",
  "check",
  "concession",
] as const;
type Name = (typeof order)[number];

const at = (name: Name, row: number): string => `${columnName(order.indexOf(name))}${row}`;

/** A limit met to the rounding of its digits is met: the slack that the service allows. */
const roundingSlack = "1E-12";

/** What is known as numbers, what follows as formulas; beside the service's verdict one that anybody can follow. */
export function stationColumns(record: JobRecord, computed: ComputedSurvey): StationColumn[] {
  const { axial, offset } = record.machine.units;
  const { along, across } = formatsOf(record);
  const entry = (heading: string, value: (bore: SurveyedBore) => number | null | undefined) => ({
    heading: `${heading} (${offset})`,
    width: 11,
    cell: (bore: SurveyedBore) => numberCell(value(bore), across),
  });
  const follows = (
    heading: string,
    formula: (row: number, bore: SurveyedBore) => string,
    value: (bore: SurveyedBore) => number,
  ) => ({
    heading: `${heading} (${offset})`,
    width: 11,
    cell: (bore: SurveyedBore, row: number) => formulaCell(formula(row, bore), value(bore), across),
  });
  const columns: Readonly<Record<Name, StationColumn>> = {
    station: {
      heading: "Station",
      width: 22,
      cell: ({ station }) => textCell(station.id, { wrap: true }),
    },
    reference: {
      heading: "Sets the axis",
      width: 12,
      cell: ({ answer }) => textCell(answer.reference ? "yes" : "no"),
    },
    z: { heading: `z (${axial})`, width: 12, cell: ({ answer }) => numberCell(answer.z, along) },
    centreH: entry("Centre h", ({ fit }) => fit.centre.h),
    centreV: entry("Centre v", ({ fit }) => fit.centre.v),
    targetH: entry("Target h", ({ target }) => target.h),
    targetV: entry("Target v", ({ target }) => target.v),
    axisH: follows(
      "Axis h at z",
      (row) => `axis_h_at0+axis_h_slope*${at("z", row)}`,
      ({ axis }) => axis.h,
    ),
    axisV: follows(
      "Axis v at z",
      (row) => `axis_v_at0+axis_v_slope*${at("z", row)}`,
      ({ axis }) => axis.v,
    ),
    h: follows(
      "Deviation h",
      (row) => `${at("centreH", row)}-${at("targetH", row)}-${at("axisH", row)}`,
      ({ answer }) => answer.deviation.h,
    ),
    v: follows(
      "Deviation v",
      (row) => `${at("centreV", row)}-${at("targetV", row)}-${at("axisV", row)}`,
      ({ answer }) => answer.deviation.v,
    ),
    radial: follows(
      "Radial",
      (row) => `SQRT(${at("h", row)}^2+${at("v", row)}^2)`,
      ({ answer }) => answer.deviation.radial,
    ),
    clock: {
      heading: "Clock (deg from up)",
      width: 11,
      cell: ({ answer }, row) => formulaCell(clockFormula(row), answer.deviation.clockDeg ?? "", "0.0"),
    },
    radius: entry("Tolerance, radial", ({ station }) => limits(station)?.radius),
    leastH: entry("Tolerance h, least", ({ station }) => limits(station)?.h?.[0]),
    mostH: entry("Tolerance h, most", ({ station }) => limits(station)?.h?.[1]),
    leastV: entry("Tolerance v, least", ({ station }) => limits(station)?.v?.[0]),
    mostV: entry("Tolerance v, most", ({ station }) => limits(station)?.v?.[1]),
    ratio: {
      heading: "Share of tolerance used",
      width: 11,
      cell: ({ station, answer }, row) => {
        const allowed = allowedBy(station);
        return allowed && answer.ratio !== null
          ? formulaCell(ratioFormula(allowed, row), answer.ratio, "0.00")
          : null;
      },
    },
    uncertaintyH: entry("U of h, expanded", ({ answer }) => answer.expandedUncertainty?.h),
    uncertaintyV: entry("U of v, expanded", ({ answer }) => answer.expandedUncertainty?.v),
    uncertaintyRadial: entry("U radial, expanded", ({ answer }) => answer.expandedUncertainty?.radial),
    verdict: {
      heading: "Verdict",
      width: 13,
      cell: ({ answer }) =>
        textCell(answer.verdict ?? "no tolerance", answer.verdict ? verdictLooks[answer.verdict] : {}),
    },
    check: {
      heading: "Simple rule, recomputed",
      width: 13,
      cell: ({ station, answer }, row) =>
        allowedBy(station) && answer.ratio !== null
          ? formulaCell(
              `IF(${at("ratio", row)}<=1+${roundingSlack},"conforms","exceeds")`,
              answer.ratio <= 1 + Number(roundingSlack) ? "conforms" : "exceeds",
              "General",
              { align: "center" },
            )
          : null,
    },
    concession: {
      heading: "Concession by",
      width: 24,
      cell: ({ station }) => textCell(concessionOf(record, computed, station.id)?.name, { wrap: true }),
    },
  };
  return order.map((name) => columns[name]);
}

function limits(station: SurveyedBore["station"]): {
  readonly radius?: number;
  readonly h?: readonly [number, number];
  readonly v?: readonly [number, number];
} | null {
  const allowed = allowedBy(station);
  if (allowed?.form === "radial") return { radius: allowed.radius };
  return allowed && { h: allowed.h, v: allowed.v };
}

/** ATAN2 takes x first: up is the x of a clock. A deviation of 0 points nowhere. */
function clockFormula(row: number): string {
  const [h, v] = [at("h", row), at("v", row)];
  return `IF(${at("radial", row)}=0,"",MOD(DEGREES(ATAN2(${v},${h})),360))`;
}

/** |d|/T; of a range, from its middle and over half its width; of two planes the larger. */
function ratioFormula(allowed: Allowed, row: number): string {
  if (allowed.form === "radial") return `${at("radial", row)}/${at("radius", row)}`;
  const share = (deviation: Name, least: Name, most: Name): string => {
    const [d, low, high] = [at(deviation, row), at(least, row), at(most, row)];
    return `ABS(${d}-(${low}+${high})/2)/((${high}-${low})/2)`;
  };
  return `MAX(${share("h", "leastH", "mostH")},${share("v", "leastV", "mostV")})`;
}
