import type { FigureTable } from "../../../../../shared/figures/figure-table.ts";
import { decimalsAcross } from "../../../../../shared/figures/write-number.ts";
import type { AlignmentExample } from "../api/get-worked-example.ts";
import { tabulateChecks } from "./check.ts";
import { checkAxis, checkDeviation, verdictInWords } from "./work-axis.ts";
import { checkFit, gaugePoints, tabulatePoints } from "./work-bore.ts";
import { checkPrediction, checkStacks, componentOf } from "./work-moves.ts";

/** A documented call followed by hand at the station that uses most of its tolerance. */
export interface FollowedExample {
  readonly stationId: string;
  /** Place of its bore among those sent. */
  readonly boreIndex: number;
  readonly componentId: string | null;
  readonly points: FigureTable | null;
  readonly fit: FigureTable | null;
  readonly axis: readonly FigureTable[];
  readonly deviation: FigureTable | null;
  readonly verdict: string | null;
  readonly prediction: FigureTable | null;
  readonly stacks: FigureTable | null;
}

/** Null when no station of the example was judged, or none was read by a bore of it. */
export function followExample(example: AlignmentExample): FollowedExample | null {
  const { request, result } = example;
  const stationId = result.summary.worst?.id;
  const boreIndex = request.bores.findIndex(({ station }) => station === stationId);
  const [bore, fit] = [request.bores[boreIndex], result.fits[boreIndex]];
  if (stationId === undefined || !bore || !fit) return null;
  const { units } = request;
  const unit = units.offset;
  const decimals = decimalsAcross(unit);
  const points = gaugePoints(bore, units, request.seen);
  const part = componentOf(example, stationId);
  const { slopes, heights } = checkAxis(example, decimals);
  const table = (caption: string, checks: Parameters<typeof tabulateChecks>[1]) =>
    checks.length === 0 ? null : tabulateChecks(caption, checks, unit, decimals);
  return {
    stationId,
    boreIndex,
    componentId: part?.sent.id ?? null,
    points: points && tabulatePoints(points, units),
    fit: points && table(`Circle of ${stationId}`, checkFit(points, fit, decimals)),
    axis: [
      ...(slopes.length === 0
        ? []
        : [tabulateChecks("Slope of the axis", slopes, `${unit} per ${units.axial}`, decimals + 4)]),
      ...(heights.length === 0 ? [] : [tabulateChecks("Height of the axis", heights, unit, decimals)]),
    ],
    deviation: table(`Deviation of ${stationId}`, checkDeviation(example, stationId, decimals)),
    verdict: verdictInWords(example, stationId, decimals),
    prediction: table(`${stationId} as left, predicted`, checkPrediction(example, stationId, decimals)),
    stacks: part && table("What the ideal move asks of each stack", checkStacks(part, decimals)),
  };
}
