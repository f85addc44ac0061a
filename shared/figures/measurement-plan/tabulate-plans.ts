import type { BoreMeasurementPlan, CentrePredictionAnswer } from "../../schemas/measurement-plans.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  textCell,
  textColumn,
  type Cell,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsForSmallest } from "../significant-decimals.ts";
import { decimalsAcross } from "../write-number.ts";

const statusWords: Record<BoreMeasurementPlan["status"], string> = {
  suffices: "enough as read",
  suffices_when_added: "enough when added",
  out_of_reach: "out of reach",
  too_many_needed: "too many needed",
};

/** How the readings of each bore stand to what is wanted: those read, those to add, all that can be reached. */
export function tabulatePlans(plans: readonly BoreMeasurementPlan[], units: Units): FigureTable {
  const unit = units.offset;
  const decimals = decimalsForSmallest(
    plans.flatMap(({ wanted, now, after, best }) => [
      ...Object.values(wanted),
      ...[now, after, best].flatMap((prediction) => prediction?.expandedUncertainty.radial ?? []),
    ]),
    decimalsAcross(unit),
  );
  const prediction = (one: CentrePredictionAnswer | null): Cell[] => [
    numberCell(one?.readings, 0),
    numberCell(one?.expandedUncertainty.h, decimals),
    numberCell(one?.expandedUncertainty.v, decimals),
    numberCell(one?.expandedUncertainty.radial, decimals),
  ];
  const predictionColumns = (name: string) => [
    numberColumn(`${name}: readings`, null),
    numberColumn("U of h", unit),
    numberColumn("U of v", unit),
    numberColumn("U radial", unit),
  ];
  return {
    caption: "Readings and what they tell of the centre",
    columns: [
      textColumn("bore"),
      textColumn("outcome"),
      { heading: "wanted U", unit, align: "end" },
      ...predictionColumns("now"),
      numberColumn("to add", null),
      ...predictionColumns("then"),
      ...predictionColumns("all reachable"),
    ],
    rows: plans.map((plan) => [
      textCell(plan.id),
      textCell(statusWords[plan.status]),
      textCell(writeWanted(plan.wanted, decimals)),
      ...prediction(plan.now),
      numberCell(plan.addCount, 0),
      ...prediction(plan.after),
      ...prediction(plan.best),
    ]),
  };
}

function writeWanted(wanted: BoreMeasurementPlan["wanted"], decimals: number): string {
  if ("radial" in wanted) return `radial ${wanted.radial.toFixed(decimals)}`;
  return `h ${wanted.h.toFixed(decimals)}, v ${wanted.v.toFixed(decimals)}`;
}

/** Where to read, and how often; null when nothing is to be added. */
export function tabulateAdded(plans: readonly BoreMeasurementPlan[]): FigureTable | null {
  const added = plans.flatMap(({ id, add }) => add.map((place) => ({ id, ...place })));
  if (added.length === 0) return null;
  return {
    caption: "Readings to add, seen downstream",
    columns: [textColumn("bore"), numberColumn("clock angle", "\u00b0"), numberColumn("readings", null)],
    rows: added.map(({ id, clockDeg, readings }) => [
      textCell(id),
      numberCell(clockDeg, 1),
      numberCell(readings, 0),
    ]),
  };
}

const boundWords: Record<NonNullable<BoreMeasurementPlan["least"]>["by"], string> = {
  taken: "those read do not suffice",
  even_ring: "even ring",
  relaxation: "continuous relaxation",
};

/** The fewest readings that any choice needs, and how that is known. */
export function tabulateLeast(plans: readonly BoreMeasurementPlan[]): FigureTable {
  return {
    caption: "How few readings could do",
    columns: [
      textColumn("bore"),
      numberColumn("at least", null),
      textColumn("shown by"),
      textColumn("the count found"),
      numberColumn("evenly round, none read before", null),
    ],
    rows: plans.map(({ id, least, evenRingReadings }) => [
      textCell(id),
      numberCell(least?.count, 0),
      textCell(least === null ? "–" : boundWords[least.by]),
      textCell(least === null ? "none found" : least.proved ? "is the least" : "may not be the least"),
      numberCell(evenRingReadings, 0),
    ]),
  };
}
