import type { BoreMeasurementPlan } from "../../schemas/measurement-plans.ts";
import type { Units } from "../../units.ts";
import { numberCell, numberColumn, textCell, textColumn, type FigureTable } from "../figure-table.ts";
import { decimalsForSmallest } from "../significant-decimals.ts";
import { decimalsAcross } from "../write-number.ts";

const statusWords: Record<BoreMeasurementPlan["status"], string> = {
  suffices: "enough as read",
  suffices_when_added: "enough when added",
  out_of_reach: "out of reach",
  too_many_needed: "too many needed",
};

const boundWords: Record<NonNullable<BoreMeasurementPlan["least"]>["by"], string> = {
  taken: "those read do not suffice",
  even_ring: "even ring",
  relaxation: "continuous relaxation",
};

/** Decimals of uncertainties: three figures of the smallest in the plans. */
function decimalsOf(plans: readonly BoreMeasurementPlan[], units: Units): number {
  return decimalsForSmallest(
    plans.flatMap(({ wanted, now, after, best }) => [
      ...Object.values(wanted),
      ...[now, after, best].flatMap((prediction) => prediction?.expandedUncertainty.radial ?? []),
    ]),
    decimalsAcross(units.offset),
  );
}

/** Whether the readings of each bore do, how many to add, and the fewest that any choice needs. */
export function tabulatePlans(plans: readonly BoreMeasurementPlan[], units: Units): FigureTable {
  const decimals = decimalsOf(plans, units);
  return {
    caption: "Whether the readings do",
    columns: [
      textColumn("bore"),
      textColumn("outcome"),
      { heading: "U wanted", unit: units.offset, align: "end" },
      numberColumn("to add", null),
      numberColumn("at least", null),
      textColumn("shown by"),
      textColumn("the count found"),
      numberColumn("evenly round, none read", null),
    ],
    rows: plans.map(({ id, status, wanted, addCount, least, evenRingReadings }) => [
      textCell(id),
      textCell(statusWords[status]),
      textCell(writeWanted(wanted, decimals)),
      numberCell(addCount, 0),
      numberCell(least?.count, 0),
      textCell(least === null ? "–" : boundWords[least.by]),
      textCell(least === null ? "none found" : least.proved ? "is the least" : "may not be the least"),
      numberCell(evenRingReadings, 0),
    ]),
  };
}

function writeWanted(wanted: BoreMeasurementPlan["wanted"], decimals: number): string {
  if ("radial" in wanted) return `radial ${wanted.radial.toFixed(decimals)}`;
  return `h ${wanted.h.toFixed(decimals)}, v ${wanted.v.toFixed(decimals)}`;
}

/** What the readings tell of each centre: those read, those with what is added, and all that can be reached. */
export function tabulatePredictions(plans: readonly BoreMeasurementPlan[], units: Units): FigureTable {
  const unit = units.offset;
  const decimals = decimalsOf(plans, units);
  return {
    caption: "What readings tell of the centre",
    columns: [
      textColumn("bore"),
      textColumn("by"),
      numberColumn("readings", null),
      numberColumn("U of h", unit),
      numberColumn("U of v", unit),
      numberColumn("U radial", unit),
      numberColumn("of that wanted", "%"),
      numberColumn("dilution", null),
    ],
    rows: plans.flatMap(({ id, now, after, best }) =>
      [
        { by: "those read", prediction: now },
        { by: "with those added", prediction: after },
        { by: "all that can be reached", prediction: best },
      ].map(({ by, prediction }) => [
        textCell(id),
        textCell(by),
        numberCell(prediction?.readings, 0),
        numberCell(prediction?.expandedUncertainty.h, decimals),
        numberCell(prediction?.expandedUncertainty.v, decimals),
        numberCell(prediction?.expandedUncertainty.radial, decimals),
        numberCell(prediction && prediction.ratio * 100, 0),
        numberCell(prediction?.evenRing.dilution, 2),
      ]),
    ),
  };
}

/** Where to read, and how often; null when nothing is to be added. */
export function tabulateAdded(plans: readonly BoreMeasurementPlan[]): FigureTable | null {
  const added = plans.flatMap(({ id, add }) => add.map((place) => ({ id, ...place })));
  if (added.length === 0) return null;
  return {
    caption: "Readings to add",
    columns: [textColumn("bore"), numberColumn("clock angle", "\u00b0"), numberColumn("readings", null)],
    rows: added.map(({ id, clockDeg, readings }) => [
      textCell(id),
      numberCell(clockDeg, 1),
      numberCell(readings, 0),
    ]),
  };
}
