import type { CrossedResult } from "../../shared/schemas/repeatability-answers.ts";
import type { CrossedStudyRequest } from "../../shared/schemas/repeatability-studies.ts";
import type { Converter } from "../../shared/units.ts";
import type { Tolerance } from "../compute/conformity/tolerance.ts";
import { worstVarianceMm2 } from "../compute/plane.ts";
import { analyseCrossedStudy, type AnovaLine } from "../compute/repeatability/crossed-study.ts";
import { shareOfTolerance, type ShareOfTolerance } from "../compute/repeatability/share-of-tolerance.ts";
import { sumOfComponents, type VarianceComponent } from "../compute/repeatability/variance-components.ts";
import { readVector } from "./read-vector.ts";
import { namesOf } from "./repeatability-study-faults.ts";
import { crossedWarnings } from "./repeatability-words.ts";
import { writeCovariance, writeVector } from "./write-plane.ts";

/** AIAG, Measurement Systems Analysis, from memory: as large an interaction by chance in one study of four. */
const poolAboveDefault = 0.25;

/** Several people at several stations: what repeats, people and their interaction add to a reading. */
export function crossedAnswer(
  { cells, pooling }: CrossedStudyRequest,
  level: number,
  tolerance: Tolerance | null,
  offset: Converter,
): CrossedResult {
  const [stations, people] = [namesOf(cells, "station"), namesOf(cells, "person")];
  const byName = new Map(cells.map((cell) => [JSON.stringify([cell.station, cell.person]), cell.readings]));
  const readings = stations.map((station) =>
    people.map((person) =>
      (byName.get(JSON.stringify([station, person])) ?? []).map((reading) => readVector(reading, offset)),
    ),
  );
  const poolAbove = pooling?.rule === "above" ? (pooling.probability ?? poolAboveDefault) : null;
  const found = analyseCrossedStudy({ readings, level, poolAbove });
  const { repeatability, person, interaction, station } = found.components;
  const reproducibility = sumOfComponents([person, interaction]);
  const reading = sumOfComponents([repeatability, reproducibility]);
  const percentOfTolerance = tolerance && {
    repeatability: shareOf(repeatability, tolerance),
    reproducibility: shareOf(reproducibility, tolerance),
    reading: shareOf(reading, tolerance),
  };
  return {
    form: "crossed",
    stations,
    people,
    repeats: found.repeats,
    table: {
      h: found.table.h.map((line) => writeLine(line, offset)),
      v: found.table.v.map((line) => writeLine(line, offset)),
    },
    interaction: {
      pooled: found.pooled,
      rule: poolAbove === null ? "never pooled" : `pooled above a probability of ${poolAbove} in h and in v`,
      pValue: found.interactionPValue,
    },
    components: {
      repeatability: writeComponent(repeatability, offset),
      person: writeComponent(person, offset),
      interaction: writeComponent(interaction, offset),
      reproducibility: writeComponent(reproducibility, offset),
      reading: writeComponent(reading, offset),
      station: writeComponent(station, offset),
    },
    dof: found.dof,
    personOffsets: found.personOffsets.map((of, index) => ({
      person: people[index] ?? "",
      ...writeVector(of, offset),
    })),
    percentOfTolerance,
    warnings: crossedWarnings(found, percentOfTolerance?.reading ?? null),
  };
}

function shareOf(
  { hVarianceMm2, vVarianceMm2, covariance }: VarianceComponent,
  tolerance: Tolerance,
): ShareOfTolerance {
  return shareOfTolerance({ hMm2: hVarianceMm2, vMm2: vVarianceMm2, covariance }, tolerance);
}

function writeLine(
  { name, sumOfSquaresMm2, meanSquareMm2, dof, f, pValue, significant }: AnovaLine,
  offset: Converter,
): CrossedResult["table"]["h"][number] {
  return {
    source: name,
    sumOfSquares: offset.squareFromMm2(sumOfSquaresMm2),
    dof,
    meanSquare: meanSquareMm2 === null ? null : offset.squareFromMm2(meanSquareMm2),
    f,
    pValue,
    significant,
  };
}

function writeComponent(
  { hVarianceMm2, vVarianceMm2, covariance }: VarianceComponent,
  offset: Converter,
): CrossedResult["components"]["person"] {
  return {
    h: offset.fromMm(Math.sqrt(hVarianceMm2)),
    v: offset.fromMm(Math.sqrt(vVarianceMm2)),
    radial: offset.fromMm(Math.sqrt(Math.max(0, worstVarianceMm2(covariance)))),
    covariance: writeCovariance(covariance, offset),
  };
}
