import type { Operation } from "../http/operation.ts";
import { alignmentOperations } from "./alignments.ts";
import { axisDeviationOperations } from "./axis-deviations.ts";
import { boreFitOperations } from "./bore-fits.ts";
import { calculationOperations } from "./calculations.ts";
import { coldTargetOperations } from "./cold-targets.ts";
import { confirmationOperations } from "./confirmations.ts";
import { documentOperation } from "./document.ts";
import { engineOperations } from "./engine.ts";
import { fewestMovesOperations } from "./fewest-moves.ts";
import { healthOperations } from "./health.ts";
import { keyOperations } from "./keys.ts";
import { jobAttachmentOperations } from "./job-attachments.ts";
import { jobEntryOperations } from "./job-entries.ts";
import { jobFigureOperations } from "./job-figures.ts";
import { jobIndicationOperations } from "./job-indications.ts";
import { jobMoveOperations } from "./job-moves.ts";
import { jobReadingFileOperations } from "./job-reading-files.ts";
import { jobReportOperations } from "./job-reports.ts";
import { jobSurveyOperations } from "./job-surveys.ts";
import { jobOperations } from "./jobs.ts";
import { machineHistoryOperations } from "./machine-history.ts";
import { machineWorkbookOperations } from "./machine-workbooks.ts";
import { machineOperations } from "./machines.ts";
import { memberOperations } from "./members.ts";
import { measurementPlanOperations } from "./measurement-plans.ts";
import { metaOperations } from "./meta.ts";
import { repeatabilityStudyOperations } from "./repeatability-studies.ts";
import { sessionOperations } from "./sessions.ts";
import { shimMoveOperations } from "./shim-moves.ts";
import { sightLineSetupOperations } from "./sight-line-setups.ts";
import { outboxOperations } from "./outbox.ts";
import { usageOperations } from "./usage.ts";
import { webhookDeliveryOperations } from "./webhook-deliveries.ts";
import { webhookOperations } from "./webhooks.ts";

/** Every operation of the service, in the order of the document. */
export const operations: readonly Operation[] = [
  ...boreFitOperations,
  ...axisDeviationOperations,
  ...shimMoveOperations,
  ...fewestMovesOperations,
  ...alignmentOperations,
  ...coldTargetOperations,
  ...confirmationOperations,
  ...repeatabilityStudyOperations,
  ...measurementPlanOperations,
  ...sightLineSetupOperations,
  ...calculationOperations,
  ...machineOperations,
  ...machineWorkbookOperations,
  ...machineHistoryOperations,
  ...jobOperations,
  ...jobSurveyOperations,
  ...jobReadingFileOperations,
  ...jobMoveOperations,
  ...jobIndicationOperations,
  ...jobEntryOperations,
  ...jobAttachmentOperations,
  ...jobReportOperations,
  ...jobFigureOperations,
  ...keyOperations,
  ...memberOperations,
  ...webhookOperations,
  ...webhookDeliveryOperations,
  ...outboxOperations,
  ...usageOperations,
  ...sessionOperations,
  ...metaOperations,
  ...engineOperations,
  ...healthOperations,
  documentOperation(() => operations),
];
