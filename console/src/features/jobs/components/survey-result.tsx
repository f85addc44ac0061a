import { Link } from "react-router-dom";
import { surveyName } from "../../../../../shared/figures/job/compared-surveys.ts";
import { planElevationOf, surveyOf } from "../../../../../shared/figures/plan-elevation/plan-elevation-of.ts";
import { tabulateAxis } from "../../../../../shared/figures/plan-elevation/tabulate-axis.ts";
import { tabulatePlanElevation } from "../../../../../shared/figures/plan-elevation/tabulate-plan-elevation.ts";
import { decimalsAcross, writeSigned } from "../../../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import type { JobSurvey, SurveyResult as Result } from "../../../../../shared/schemas/job-surveys.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { VerdictSummary } from "../../results/components/verdict-summary.tsx";
import { Warnings, type PlacedWarning } from "../../results/components/warnings.tsx";
import { paths } from "../../../config/paths.ts";

interface SurveyResultProps {
  machine: JobRecord["machine"];
  survey: JobSurvey;
  result: Result;
}

/** What a survey's readings came to: verdicts, deviations with their uncertainty, the axis, the drift. */
export function SurveyResult({ machine: { units, stations }, survey, result }: SurveyResultProps) {
  const model = planElevationOf({ units, stations }, result);
  const tables = tabulatePlanElevation({ ...model, surveys: [surveyOf(surveyName(survey), result)] });
  return (
    <div className={result.current ? "sheet-stack" : "sheet-stack opacity-60"}>
      {!result.current && (
        <p className="font-semibold text-signal">Readings have changed since: compute the survey again.</p>
      )}
      <VerdictSummary summary={result.summary} />
      {tables.map((table) => (
        <NumberTable key={table.caption} table={table} />
      ))}
      <NumberTable table={tabulateAxis(result.axis, units)} />
      <p>
        {result.drift === null ? (
          <span className="text-muted">
            The drift is not known: no station was read once more at the end.
          </span>
        ) : (
          <>
            Drift at {result.drift.station}, closing less opening: h{" "}
            {writeSigned(result.drift.h, decimalsAcross(units.offset))}, v{" "}
            {writeSigned(result.drift.v, decimalsAcross(units.offset))} {units.offset}
          </>
        )}
      </p>
      <Warnings warnings={warningsOf(result)} />
      <p className="no-print flex flex-wrap gap-x-6 gap-y-1 text-xs text-muted">
        <Link className="link" to={paths.calculation(result.boreFit)}>
          Record of the bore fits
        </Link>
        <Link className="link" to={paths.calculation(result.axisDeviation)}>
          Record of the axis and deviations
        </Link>
        <span>engine {result.engineVersion}</span>
      </p>
    </div>
  );
}

function warningsOf({ axis, stations, fits }: Result): PlacedWarning[] {
  return [
    ...axis.warnings.map((warning) => ({ where: "axis", ...warning })),
    ...fits.flatMap(({ id, warnings }) => warnings.map((warning) => ({ where: id, ...warning }))),
    ...stations.flatMap(({ id, warnings }) => warnings.map((warning) => ({ where: id, ...warning }))),
  ];
}
