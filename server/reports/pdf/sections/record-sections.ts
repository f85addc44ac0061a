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
  tabulateSurveys,
  tabulateTemperatures,
  tabulateWarnings,
} from "../../tables/condition-tables.ts";
import { tabulateReadings } from "../../tables/reading-tables.ts";
import { tabulateAttachments, tabulateComments, tabulateRevisions } from "../../tables/job-tables.ts";
import { tabulateFoundAndLeft, tabulateStations } from "../../tables/station-tables.ts";

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
          `Deviation: centre less target less axis, positive to the right and up, seen looking downstream. U: expanded uncertainty at level ${levelOf(record)}. Clock: direction of the deviation, clockwise from the top. Of tol.: share of the tolerance used, of a range from its middle. (ref.): sets the axis; where two stations alone do, each of them deviates by 0 without uncertainty, and what their readings are uncertain by is in the others' U.`,
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
        ...temperatures(record),
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
              textBlock(
                `Centres off the line of sight, positive to the right and up, seen looking downstream. U: expanded uncertainty of the fit alone at level ${levelOf(record)}. Roundness: peak to valley about the centre. Coverage: arc that was read. Used, of: readings.`,
                "muted",
              ),
            ],
          },
        ]
      : []),
  ];
}

const levelOf = ({ details }: JobRecord): number => details.level ?? 0.95;

/** Metal temperatures belong to a survey: that none was noted is said. */
function temperatures(record: JobRecord): Block[] {
  const table = tabulateTemperatures(record);
  if (table.rows.length > 0 || record.surveys.length === 0) return tableBlocks(table);
  return [headingBlock(table.caption), textBlock("None was noted.", "signal")];
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
