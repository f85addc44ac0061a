import { drawEndView } from "../../../../shared/figures/end-view/draw-end-view.ts";
import { endViewCapacity, reachOf } from "../../../../shared/figures/end-view/scale-end-view.ts";
import type { EndViewModel } from "../../../../shared/figures/end-view/end-view-model.ts";
import { endViewOfJob, planElevationOfJob } from "../../../../shared/figures/job/job-models.ts";
import { flagSentences } from "../../../../shared/figures/job/with-notes.ts";
import { drawPlanElevation } from "../../../../shared/figures/plan-elevation/draw-plan-elevation.ts";
import type { PlanElevationModel } from "../../../../shared/figures/plan-elevation/plan-elevation-model.ts";
import { scalePlanElevation } from "../../../../shared/figures/plan-elevation/scale-plan-elevation.ts";
import { convertLength } from "../../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import { concessionWords } from "../../report-words.ts";
import { listBlock, textBlock, type Block, type Section } from "../layout/blocks.ts";
import { figureScale } from "../layout/lay-out-sections.ts";
import { legibleLine } from "../layout/legible-text.ts";
import { heightOfTexts } from "../layout/text-metrics.ts";
import { areaHeight, areaWidth } from "../layout/sheet-geometry.ts";

/** Flags named on a figure's sheet; the cover has all of them. */
const flagsNamed = 4;
/** Of a sheet of end views: what their key and note take. */
const endViewKey = 26;

/** Plan and elevation and the end view, each with the flags of the record; none before a survey is computed. */
export function figureSections(record: JobRecord): Section[] {
  const planElevation = planElevationOfJob(record, legibleLine);
  const endView = endViewOfJob(record, legibleLine);
  if (!planElevation || !endView) return [];
  const names = planElevation.surveys.map(({ name }) => name).join(" and ");
  const columns = 1;
  return [
    { title: `Plan and elevation, ${names}`, columns, blocks: planAndElevation(planElevation, record) },
    { title: `End view, ${names}`, columns, blocks: endViews(endView, record) },
  ];
}

function planAndElevation(model: PlanElevationModel, record: JobRecord): Block[] {
  const flags = flagLines(record);
  const figure: Block = {
    kind: "figure",
    figure: drawPlanElevation(model, areaWidth),
    under: heightOfTexts(["", ...flags], areaWidth),
  };
  return [
    figure,
    ...scaleAlong(model, figureScale(figure, { width: areaWidth, height: areaHeight })),
    ...flagBlocks(flags),
  ];
}

/** The scale along z as it stands on the sheet at its full size; of one place there is none. */
function scaleAlong(model: PlanElevationModel, shrunk: number): Block[] {
  if (new Set(model.stations.map(({ z }) => z)).size < 2) return [];
  const { placeX } = scalePlanElevation(model, areaWidth);
  const scale = convertLength(1, model.axialUnit, "mm") / ((placeX(1) - placeX(0)) * shrunk);
  return [textBlock(`At A3, the size of this sheet, z is to scale 1 : ${writeScale(scale)}.`, "muted")];
}

const writeScale = (scale: number): string => (scale < 100 ? scale.toFixed(1) : scale.toFixed(0));

function endViews(model: EndViewModel, record: JobRecord): Block[] {
  const flags = flagLines(record);
  const under = heightOfTexts(flags, areaWidth);
  const height = areaHeight - endViewKey - under;
  const capacity = endViewCapacity(areaWidth, height);
  // Every sheet is drawn at the scale of the farthest station of all.
  const reach = reachOf(model);
  return Array.from({ length: Math.ceil(model.stations.length / capacity) }, (_, sheet): Block[] => {
    const stations = model.stations.slice(sheet * capacity, (sheet + 1) * capacity);
    const ids = new Set(stations.map(({ id }) => id));
    const surveys = model.surveys.map((survey) => ({
      ...survey,
      stations: survey.stations.filter(({ id }) => ids.has(id)),
    }));
    const figure = drawEndView({ ...model, stations, surveys }, areaWidth, { height, reach });
    return [
      ...(sheet > 0 ? [{ kind: "break" as const }] : []),
      { kind: "figure", figure, under },
      ...flagBlocks(flags),
    ];
  }).flat();
}

/** What is said under a figure: of flags and concessions a heading, then each. */
function flagLines(record: JobRecord): string[] {
  const conceded = concessionWords(record);
  const said = [
    ...flagSentences(record.flags, flagsNamed, "on the first sheets"),
    ...(conceded ? [conceded] : []),
  ];
  if (said.length === 0) return ["Flags of the record: none."];
  return ["Flags of the record:", ...said.map(legibleLine)];
}

function flagBlocks([first = "", ...rest]: readonly string[]): Block[] {
  return [
    textBlock(first, rest.length === 0 ? "muted" : "signal"),
    ...(rest.length === 0 ? [] : [listBlock(rest, "signal")]),
  ];
}
