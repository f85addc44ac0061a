import { useMutation } from "@tanstack/react-query";
import { readingPreview } from "../../../../../shared/schemas/reading-files.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

const workbook = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet";

export interface ReadingFile {
  readonly file: File;
  /** What columns of other names stand for, and which to leave out: as the service takes them; empty for none. */
  readonly columns: string;
  readonly ignore: string;
}

/** Reads a file of readings without storing anything. */
export function usePreviewReadings(job: string, survey: string) {
  return useMutation({
    mutationFn: async (sent: ReadingFile) => {
      const answer = await callAsMember({
        method: "POST",
        path: readingFilePath(job, survey, "reading-previews", sent),
        file: fileOf(sent),
      });
      return readAnswer(readingPreview, answer);
    },
  });
}

export function readingFilePath(
  job: string,
  survey: string,
  what: "reading-previews" | "reading-files",
  { file, columns, ignore }: ReadingFile,
): string {
  const query = new URLSearchParams({ name: file.name });
  if (columns.trim() !== "") query.set("columns", columns.trim());
  if (ignore.trim() !== "") query.set("ignore", ignore.trim());
  return `${apiPaths.job(job)}/surveys/${encodeURIComponent(survey)}/${what}?${query.toString()}`;
}

/** Browsers name the type of such a file by what else is installed: the service is told by its name. */
export function fileOf({ file }: Pick<ReadingFile, "file">) {
  return {
    content: file,
    mediaType: file.name.toLowerCase().endsWith(".xlsx") ? workbook : "text/csv",
    name: file.name,
  };
}
