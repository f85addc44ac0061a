import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import type { ReportContext } from "../../report-format.ts";
import type { Section } from "../layout/blocks.ts";
import { coverSection } from "./cover-section.ts";
import { figureSections } from "./figure-sections.ts";
import { moveSections } from "./move-sections.ts";
import { conditionSections, deviationSections, recordSection } from "./record-sections.ts";

/** The whole report, part by part. */
export function sectionsOf(record: JobRecord, context: ReportContext): Section[] {
  return [
    coverSection(record, context),
    ...figureSections(record),
    ...deviationSections(record),
    ...moveSections(record),
    ...conditionSections(record),
    recordSection(record),
  ];
}
