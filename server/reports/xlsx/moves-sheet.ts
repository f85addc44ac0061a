import {
  tabulateCommonChange,
  tabulateMoved,
  tabulateReference,
  tabulateUnmoved,
} from "../../../shared/figures/confirmation/tabulate-changes.ts";
import { tabulateAsLeft } from "../../../shared/figures/confirmation/tabulate-as-left.ts";
import { surveyName } from "../../../shared/figures/job/compared-surveys.ts";
import { tabulateComponents } from "../../../shared/figures/move-sheet/tabulate-components.ts";
import { tabulateStacks } from "../../../shared/figures/move-sheet/tabulate-stacks.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { textCell, titleCell, type SheetCell } from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { outdatedWords, signatureWords, signWords } from "../report-words.ts";
import { tabulateAdvice, tabulateLoggedMoves } from "../tables/move-tables.ts";
import { lineUnderTitle, section } from "./section.ts";

const widths = [24, 22, 20, 14, 20, 14, 14, 30, 20, 14, 14, 14];

/** What was planned, what was done, and what came of it. */
export function movesSheet(record: JobRecord): Sheet {
  const rows: SheetCell[][] = [
    [titleCell(`Moves: ${record.machineName}`)],
    lineUnderTitle(signatureWords(record), { fontWeight: "bold" }),
    lineUnderTitle(`${signWords} Shims: positive is thickness added.`),
    [],
    ...(record.plans.length === 0 ? [[textCell("No moves were planned.")], []] : []),
    ...record.plans.flatMap((plan, index) => planned(record, plan, index)),
    ...section(tabulateLoggedMoves(record), "No move was logged.", widths.length),
    ...(record.confirmations.length === 0 ? [[textCell("Nothing has been confirmed.")]] : []),
    ...record.confirmations.flatMap((one) => confirmed(record, one)),
  ];
  return { name: "Moves", rows, widths, frozen: { rows: 2, columns: 1 } };
}

const headed = (words: string): SheetCell[] => [textCell(words, { fontWeight: "bold", fontSize: 12 })];

function planned(
  record: JobRecord,
  { survey, current, result }: JobRecord["plans"][number],
  index: number,
): SheetCell[][] {
  const { units } = record.machine;
  return [
    headed(`Plan ${index + 1}, from ${surveyWords(record, survey)}`),
    ...(current ? [] : [lineUnderTitle(outdatedWords.plan)]),
    ...section(tabulateComponents(result, units), null, widths.length),
    ...section(tabulateStacks(result, units), null, widths.length),
    ...section(tabulateAdvice(result), null, widths.length),
  ];
}

function confirmed(
  record: JobRecord,
  { before, after, current, result }: JobRecord["confirmations"][number],
): SheetCell[][] {
  const { units } = record.machine;
  const { reference, unexpected, outstanding } = result;
  const repeat = reference.repeats === null ? "not shown" : reference.repeats ? "yes" : "no";
  return [
    headed(`Confirmation: ${surveyWords(record, after)} against ${surveyWords(record, before)}`),
    ...(current ? [] : [lineUnderTitle(outdatedWords.confirmation)]),
    ...(
      [
        ["Reference stations repeat", repeat],
        ["Moved unexpectedly", unexpected.join(", ") || "none"],
        ["To be measured still", outstanding.join(", ") || "none"],
      ] as const
    ).map(([name, words]) => [
      textCell(name, { wrap: true }),
      textCell(words, { wrap: true, columnSpan: widths.length - 1 }),
    ]),
    [],
    ...section(tabulateReference(result, units), null, widths.length),
    ...section(tabulateCommonChange(result, units), null, widths.length),
    ...section(tabulateMoved(result, units), null, widths.length),
    ...section(tabulateUnmoved(result, units), null, widths.length),
    ...(reference.repeats === true ? [] : section(tabulateAsLeft(result, units), null, widths.length)),
  ];
}

function surveyWords({ surveys }: JobRecord, id: string): string {
  const index = surveys.findIndex((one) => one.id === id);
  const survey = surveys[index];
  return survey ? `survey ${index + 1}, ${surveyName(survey)}` : "a survey not in the record";
}
