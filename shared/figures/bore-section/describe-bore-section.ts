import { decimalsAcross, decimalsFor, writeNumber, writeSigned } from "../write-number.ts";
import type { BoreSectionModel } from "./bore-section-model.ts";

/** The bore section in sentences: what a reader who cannot see it needs to know. */
export function describeBoreSection(model: BoreSectionModel): string {
  const unit = model.offsetUnit;
  const decimals = decimalsFor([model.centre.h, model.centre.v], decimalsAcross(unit));
  const offset = (value: number): string => `${writeSigned(value, decimals)} ${unit}`;
  const used = model.points.filter((point) => point.used);
  const excluded = model.points.filter((point) => !point.used).map((point) => point.number);
  const contacts = model.points.filter((point) => point.contact).map((point) => point.number);
  const largest = used.reduce<(typeof used)[number] | undefined>(
    (most, point) => (most && Math.abs(most.residual) >= Math.abs(point.residual) ? most : point),
    undefined,
  );
  const sentences = [
    `Section of bore ${model.id} looking downstream: ${model.methodWords} through ${used.length} of ${model.points.length} readings.`,
    `Centre h ${offset(model.centre.h)}, v ${offset(model.centre.v)} from the ${model.originWords}.`,
    model.diameter === null
      ? "Diameter not known."
      : `Diameter ${writeNumber(model.diameter, decimalsAcross(model.boreUnit))} ${model.boreUnit}.`,
    model.roundness === null
      ? ""
      : `Roundness ${writeNumber(model.roundness, decimalsFor([model.roundness], decimalsAcross(unit)))} ${unit}.`,
    largest === undefined
      ? ""
      : `Largest residual ${writeSigned(largest.residual, decimalsFor([largest.residual], decimalsAcross(unit)))} ${unit} at reading ${largest.number}, clock angle ${writeNumber(largest.clockDeg, 1)} degrees.`,
    model.arc === null
      ? ""
      : `The readings cover ${writeNumber(model.arc.coverageDeg, 0)} degrees; the largest gap is ${writeNumber(model.arc.largestGapDeg, 0)} degrees.`,
    contacts.length === 0 ? "" : `Contacts: readings ${listNumbers(contacts)}.`,
    excluded.length === 0
      ? ""
      : `Excluded: ${excluded.length === 1 ? "reading" : "readings"} ${listNumbers(excluded)}.`,
  ];
  return sentences.filter((sentence) => sentence !== "").join(" ");
}

/** Enough to find them; a dense scan may hold thousands. */
function listNumbers(numbers: readonly number[]): string {
  const named = 20;
  const rest = numbers.length - named;
  return numbers.slice(0, named).join(", ") + (rest > 0 ? ` and ${rest} more` : "");
}
