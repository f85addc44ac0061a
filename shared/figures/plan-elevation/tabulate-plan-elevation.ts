import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsAlong, decimalsFor } from "../write-number.ts";
import type { PlanElevationModel, Survey } from "./plan-elevation-model.ts";

/** The numbers of plan and elevation, one table a survey, one row a station in the order sent. */
export function tabulatePlanElevation(model: PlanElevationModel): FigureTable[] {
  return model.surveys.map((survey) => tabulateSurvey(model, survey));
}

function tabulateSurvey(model: PlanElevationModel, survey: Survey): FigureTable {
  const planned = new Map(model.stations.map((station) => [station.id, station]));
  const unit = model.offsetUnit;
  const decimals = decimalsFor(
    survey.stations.flatMap(({ deviation }) => [deviation.h, deviation.v]),
    decimalsAcross(unit),
  );
  return {
    caption: `Deviations ${survey.name}`,
    columns: [
      textColumn("station"),
      textColumn("verdict"),
      numberColumn("z", model.axialUnit),
      numberColumn("target h", unit),
      numberColumn("target v", unit),
      numberColumn("h", unit),
      numberColumn("v", unit),
      numberColumn("radial", unit),
      numberColumn("U of h", unit),
      numberColumn("U of v", unit),
    ],
    rows: survey.stations.map((station) => {
      const plan = planned.get(station.id);
      return [
        textCell(plan?.reference ? `${station.id} (ref.)` : station.id),
        station.verdict === null ? textCell("not judged") : { kind: "verdict", verdict: station.verdict },
        numberCell(plan?.z, decimalsAlong(model.axialUnit)),
        signedCell(plan?.target.h, decimals),
        signedCell(plan?.target.v, decimals),
        signedCell(station.deviation.h, decimals),
        signedCell(station.deviation.v, decimals),
        numberCell(station.radial, decimals),
        numberCell(station.uncertainty?.h, decimals),
        numberCell(station.uncertainty?.v, decimals),
      ];
    }),
  };
}
