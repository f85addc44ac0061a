import type { Request } from "express";
import { limits } from "../../shared/limits.ts";
import { addedReadingFile, readingFileQuery, readingPreview } from "../../shared/schemas/reading-files.ts";
import { byOf } from "../http/call-parts.ts";
import { versionTag } from "../http/entity-tag.ts";
import { problemOfFaults } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import type { EntryDocuments } from "../jobs/job-log.ts";
import { readingMediaTypes, type ReadingMediaType } from "../jobs/reading-files/read-file.ts";
import { changeOnce } from "../services/change-once.ts";
import { surveyOf } from "../services/find-survey.ts";
import { appendEntries, loadJob, refuseSigned, type LoadedJob } from "../services/job-store.ts";
import { previewReadings } from "../services/read-reading-file.ts";
import { storeFile } from "../services/stored-files.ts";

const tag = "Jobs";
const file = { mediaTypes: readingMediaTypes, limitBytes: limits.readingFileBytes };
const layout =
  "One row a reading of the instrument, with a head row: station, form, taken at, clock (deg), reading (mm), h (mm), v (mm), …; rows of one station and moment are one reading. As CSV in UTF-8 (decimal point or comma; semicolon, tab or comma between cells), or as the first sheet of an XLSX workbook.";

const previewReadingFile = defineOperation({
  operationId: "previewReadingFile",
  method: "post",
  path: "/v1/jobs/{id}/surveys/{survey}/reading-previews",
  tag,
  summary: "Preview a file of readings",
  description: `${layout} Tells what each column is taken for, the readings, and every fault with its line. Stores nothing.`,
  query: readingFileQuery,
  file,
  response: { status: 200, description: "The preview.", schema: readingPreview },
  errors: [],
  handle: async (call) => {
    const loaded = await loadJob(call.deps, callerOf(call).organisation.id, call.params.id ?? "");
    const survey = call.params.survey ?? "";
    surveyOf(loaded.state.surveys, survey);
    return reply(
      200,
      await previewReadings(call.deps, loaded, survey, {
        ...call.query,
        mediaType: sentAs(call.request),
        content: call.bytes,
      }),
    );
  },
});

const addReadingFile = defineOperation({
  operationId: "addReadingFile",
  method: "post",
  path: "/v1/jobs/{id}/surveys/{survey}/reading-files",
  tag,
  summary: "Add a file of readings to a survey",
  description: `${layout} Taken only without a fault; the file itself is kept with its hash.`,
  query: readingFileQuery,
  file,
  response: { status: 201, description: "The readings, in the log.", schema: addedReadingFile },
  errors: [
    "job_signed",
    "too_many_items",
    "several_faults",
    "units_missing",
    "unknown_field",
    "wrong_type",
    "invalid_encoding",
  ],
  handle: async (call) => {
    const { deps, bytes, query } = call;
    const organisationId = callerOf(call).organisation.id;
    const survey = call.params.survey ?? "";
    const loaded = await loadJob(deps, organisationId, call.params.id ?? "");
    surveyOf(loaded.state.surveys, survey);
    refuseSigned(loaded.row);
    const mediaType = sentAs(call.request);
    const { readings, faults } = await previewReadings(deps, loaded, survey, {
      ...query,
      mediaType,
      content: bytes,
    });
    if (faults.length > 0) {
      throw problemOfFaults(
        faults.map(({ line, column, code, detail }) => ({
          pointer: `/lines/${line}${column === null ? "" : `/${column}`}`,
          code,
          detail,
        })),
      );
    }
    return changeOnce(deps, call, 201, async (transaction) => {
      const locked = await loadJob(deps, organisationId, call.params.id ?? "", { transaction });
      refuseSigned(locked.row);
      refuseMoreFiles(locked);
      const sent = { name: query.name, mediaType, content: bytes };
      const { id, name, sha256 } = await storeFile(deps, transaction, organisationId, sent);
      const entries = readings.map((reading) => ({
        kind: "reading" as const,
        document: { survey, reading, sourceFile: { id, name, sha256 } },
      }));
      const { ids, version, flags } = await appendEntries(deps, transaction, locked, entries, byOf(call));
      return {
        body: { ids, version, flags, file: { id, name, sha256 } },
        headers: { ETag: versionTag(version), Location: `/v1/jobs/${call.params.id ?? ""}` },
      };
    });
  },
});

/** @throws HttpProblem too_many_items: files are kept whole, those of withdrawn readings too */
function refuseMoreFiles({ entries }: LoadedJob): void {
  const files = new Set(
    entries.flatMap(({ kind, document }) => {
      const source = kind === "reading" ? (document as EntryDocuments["reading"]).sourceFile : null;
      return source ? [source.id] : [];
    }),
  );
  if (files.size < limits.readingFilesPerJob) return;
  const detail = `A job takes ${limits.readingFilesPerJob} files of readings.`;
  throw problemOfFaults([{ pointer: "", code: "too_many_items", detail }]);
}

/** Nothing else is let through to here. */
function sentAs(request: Request): ReadingMediaType {
  return readingMediaTypes.find((mediaType) => request.is(mediaType)) ?? "text/csv";
}

export const jobReadingFileOperations = [previewReadingFile, addReadingFile];
