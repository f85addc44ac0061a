import { computedSurveys } from "../../../../shared/figures/job/compared-surveys.ts";
import { tabulateAxis } from "../../../../shared/figures/plan-elevation/tabulate-axis.ts";
import { tabulateBoreFits } from "../../../../shared/figures/bore-section/tabulate-bore-fits.ts";
import type { FigureTable } from "../../../../shared/figures/figure-table.ts";
import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import {
  headingBlock,
  listBlock,
  tableBlocks,
  textBlock,
  type Block,
  type Section,
} from "../layout/blocks.ts";
import {
  tabulateChecks,
  tabulateDrift,
  tabulateReadings,
  tabulateSurveys,
  tabulateTemperatures,
  tabulateWarnings,
} from "../tables/condition-tables.ts";
import { tabulateAttachments, tabulateComments, tabulateRevisions } from "../tables/job-tables.ts";
import { tabulateFoundAndLeft, tabulateStations } from "../tables/station-tables.ts";

export function deviationSections(record: JobRecord): Section[] {
  const table = tabulateFoundAndLeft(record);
  const names = computedSurveys(record).map(({ name }) => name);
  if (table.rows.length === 0) return [];
  return [
    {
      title: `Deviations ${names.join(", ")}`,
      columns: 1,
      blocks: [
        { kind: "table", table },
        textBlock(
          `Deviation: centre less target less axis, positive to the right and up. U: expanded uncertainty at level ${record.details.level ?? 0.95}. Clock: direction of the deviation, clockwise from the top. (ref.): sets the axis.`,
          "muted",
        ),
      ],
    },
  ];
}

/** Under which conditions what was read, and what uncertainty it has. */
export function conditionSections(record: JobRecord): Section[] {
  const computed = computedSurveys(record);
  const { units } = record.machine;
  const named = (table: FigureTable, name: string): FigureTable => ({
    ...table,
    caption: `${table.caption}, ${name}`,
  });
  return [
    {
      title: "Conditions",
      columns: 1,
      blocks: [
        ...tableBlocks(tabulateChecks(record)),
        ...tableBlocks(tabulateSurveys(record)),
        ...tableBlocks(tabulateTemperatures(record)),
        ...tableBlocks(tabulateDrift(record)),
      ],
    },
    ...(record.surveys.some(({ readings }) => readings.length > 0)
      ? [
          {
            title: "Readings",
            columns: 1 as const,
            blocks: record.surveys.flatMap((survey) => [
              ...tableBlocks(tabulateReadings(record, survey)),
              ...(survey.flags.length === 0
                ? []
                : [
                    listBlock(
                      survey.flags.map(({ code, detail }) => `${code}: ${detail}`),
                      "signal",
                    ),
                  ]),
            ]),
          },
        ]
      : []),
    ...(computed.length > 0
      ? [
          {
            title: "Centres, axes and uncertainties",
            columns: 2 as const,
            blocks: [
              ...computed.flatMap(({ name, result }) => [
                ...tableBlocks(named(tabulateBoreFits(result.fits, units), name)),
                ...tableBlocks(named(tabulateAxis(result.axis, units), name)),
              ]),
              ...tableBlocks(tabulateWarnings(record)),
            ],
          },
        ]
      : []),
  ];
}

const remarks = (heading: string, text: string | null | undefined): Block[] =>
  text ? [headingBlock(heading), textBlock(text)] : [];

/** The machine as the job knows it, and what else belongs to the record. */
export function recordSection(record: JobRecord): Section {
  return {
    title: "Machine and record",
    columns: 1,
    blocks: [
      ...remarks("Remarks", record.details.remarks),
      ...remarks("Remarks on the machine", record.machine.remarks),
      ...tableBlocks(tabulateStations(record)),
      ...tableBlocks(tabulateComments(record)),
      ...tableBlocks(tabulateAttachments(record)),
      ...tableBlocks(tabulateRevisions(record)),
      headingBlock("Where the rest stands"),
      textBlock(
        `Every raw reading, the whole log and its hash: GET /v1/jobs/${record.id}/log. Every calculation can be read and replayed under its own id.`,
      ),
    ],
  };
}
