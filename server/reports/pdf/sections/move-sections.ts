import { tabulateAsLeft } from "../../../../shared/figures/confirmation/tabulate-as-left.ts";
import {
  tabulateCommonChange,
  tabulateMoved,
  tabulateReference,
  tabulateUnmoved,
} from "../../../../shared/figures/confirmation/tabulate-changes.ts";
import { tabulateComponents } from "../../../../shared/figures/move-sheet/tabulate-components.ts";
import { tabulatePredicted } from "../../../../shared/figures/move-sheet/tabulate-predicted.ts";
import { tabulateStacks } from "../../../../shared/figures/move-sheet/tabulate-stacks.ts";
import { tabulateSteps, tabulateWatch } from "../../../../shared/figures/move-sheet/tabulate-steps.ts";
import { surveyName } from "../../../../shared/figures/job/compared-surveys.ts";
import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import {
  headingBlock,
  listBlock,
  tableBlocks,
  textBlock,
  type Block,
  type Section,
} from "../layout/blocks.ts";
import { outdatedWords, signWords } from "../../report-words.ts";
import { tabulateAdvice, tabulateLoggedMoves, tabulateOrder } from "../../tables/move-tables.ts";
import { writeMoment } from "../../tables/write-moment.ts";

/** The plans, and what was moved and confirmed; nothing of what a job does not have. */
export function moveSections(record: JobRecord): Section[] {
  return [
    ...record.plans.map((plan, index) => planSection(record, plan, index)),
    ...(record.moves.length + record.confirmations.length > 0
      ? [
          {
            title: "Moves made and confirmed",
            columns: 1 as const,
            blocks: [
              ...tableBlocks(tabulateLoggedMoves(record)),
              ...record.confirmations.flatMap((one) => confirmation(record, one)),
            ],
          },
        ]
      : []),
  ];
}

function planSection(record: JobRecord, plan: JobRecord["plans"][number], index: number): Section {
  const { result } = plan;
  const { machine, plans } = record;
  const { units } = machine;
  const number = plans.length > 1 ? ` ${index + 1}` : "";
  return {
    title: `Plan of moves${number}`,
    columns: 2,
    blocks: [
      textBlock(
        `From the survey ${nameOf(record, plan.survey)}, planned ${writeMoment(plan.createdAt)} UTC. Moves in h are done before moves in v; readings and moves are cumulative from where the component stood.`,
      ),
      ...outdated(plan, outdatedWords.plan),
      textBlock(`${signWords} Shims: positive is thickness added.`, "muted"),
      ...tableBlocks(tabulateAdvice(result)),
      ...tableBlocks(tabulateStacks(result, units)),
      ...tableBlocks(tabulateComponents(result, units)),
      ...tableBlocks(tabulateOrder(result)),
      ...tabulateSteps(result, units).flatMap(tableBlocks),
      ...tableBlocks(tabulateWatch(result, units)),
      ...(result.remeasure.length === 0
        ? []
        : [
            headingBlock("Re-measure after the last move, in this order"),
            textBlock(result.remeasure.join(", ")),
          ]),
      ...tableBlocks(
        tabulatePredicted({ units, reference: plan.from.reference, stations: plan.from.stations }, result),
      ),
    ],
  };
}

/** What a reader must know of something made from a survey that has changed since. */
function outdated({ current }: { readonly current: boolean }, words: string): Block[] {
  return current ? [] : [textBlock(words, "signal")];
}

function confirmation(record: JobRecord, entry: JobRecord["confirmations"][number]): Block[] {
  const { before, after, createdAt, result } = entry;
  const { units } = record.machine;
  const { reference, unexpected, outstanding, warnings } = result;
  const repeats =
    reference.repeats === null ? "not shown to repeat" : reference.repeats ? "repeat" : "do not repeat";
  return [
    headingBlock("Confirmation"),
    textBlock(
      `${capitalise(nameOf(record, after))} against ${nameOf(record, before)}, computed ${writeMoment(createdAt)} UTC. Reference stations ${repeats}.`,
      reference.repeats === true ? "ink" : "signal",
    ),
    ...outdated(entry, outdatedWords.confirmation),
    ...(unexpected.length === 0
      ? []
      : [textBlock(`Moved and not meant to: ${unexpected.join(", ")}.`, "signal")]),
    ...(outstanding.length === 0
      ? []
      : [textBlock(`Not measured since their last move: ${outstanding.join(", ")}.`, "signal")]),
    ...(warnings.length === 0 ? [] : [listBlock(warnings.map(({ code, detail }) => `${code}: ${detail}`))]),
    ...tableBlocks(tabulateReference(result, units)),
    ...tableBlocks(tabulateCommonChange(result, units)),
    ...tableBlocks(tabulateMoved(result, units)),
    ...tableBlocks(tabulateUnmoved(result, units)),
    textBlock(
      `${signWords} Statistic: the square of the change over its covariance; up to the limit, reading error alone explains it.`,
      "muted",
    ),
    // Where the axis was laid anew, the verdicts are not those of the survey by itself.
    ...(reference.repeats === true ? [] : tableBlocks(tabulateAsLeft(result, units))),
  ];
}

function nameOf({ surveys }: JobRecord, id: string): string {
  const survey = surveys.find((one) => one.id === id);
  return survey ? surveyName(survey) : "not in the record";
}

function capitalise(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}
