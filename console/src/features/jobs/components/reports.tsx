import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { DownloadButton } from "../../../components/ui/download-button.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { reportFormats } from "./report-formats.ts";

/** The record in every form the service makes; a draft is marked as one until the job is signed. */
export function Reports({ record }: { record: JobRecord }) {
  const { id, revision, signature } = record;
  return (
    <section id="reports" aria-label="Reports" className="no-print">
      <SectionHeading>Reports</SectionHeading>
      <p className="mb-3 max-w-prose text-muted">
        {signature ? "Of the signed record." : "Marked as a draft until the job is signed."}
      </p>
      <ul className="flex flex-wrap gap-2">
        {reportFormats.map(({ extension, words }) => (
          <li key={extension}>
            <DownloadButton
              path={`${apiPaths.job(id)}/report.${extension}?revision=${revision}`}
              fileName={`job-${id}-revision-${revision}.${extension}`}
              label={`Download report, ${words}`}
            >
              {words}
            </DownloadButton>
          </li>
        ))}
      </ul>
    </section>
  );
}
