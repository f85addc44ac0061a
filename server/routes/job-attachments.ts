import { z } from "zod";
import { limits } from "../../shared/limits.ts";
import { byOf } from "../http/call-parts.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { attachmentTypeOf, attachmentTypes } from "../jobs/attachment-kind.ts";
import { appendEntries, loadJob, refuseSigned } from "../services/job-store.ts";
import { readStoredFile, storeFile } from "../services/stored-files.ts";
import { added, change } from "./add-to-job.ts";

const tag = "Jobs";

export const fileName = z
  .string()
  .min(1)
  .max(limits.nameLength)
  .regex(/^[^\p{Cc}\p{Cf}/\\]+$/u, "A file name holds no slashes and no control characters.");

const addAttachment = defineOperation({
  operationId: "addAttachment",
  method: "post",
  path: "/v1/jobs/{id}/attachments",
  tag,
  summary: "Attach a file to a job",
  description: `A photograph or a calibration certificate: JPEG, PNG or PDF of at most ${limits.attachmentBytes} bytes, sent as the body. Its hash is kept and listed in reports.`,
  query: z.strictObject({
    name: fileName.meta({ description: "The file's name." }),
    caption: z.string().min(1).max(limits.nameLength).optional().meta({ description: "What it shows." }),
  }),
  file: { mediaTypes: attachmentTypes, limitBytes: limits.attachmentBytes },
  response: added("The attachment, in the log."),
  errors: ["job_signed", "file_not_as_stated", "too_many_items"],
  handle: async (call) => {
    const { deps, query, bytes } = call;
    const organisationId = callerOf(call).organisation.id;
    await loadJob(deps, organisationId, call.params.id ?? "");
    const mediaType = attachmentTypeOf(bytes);
    if (mediaType === null || !call.request.is(mediaType)) {
      throw problemOfFaults([
        { pointer: "", code: "file_not_as_stated", detail: "Its first bytes are of another kind of file." },
      ]);
    }
    return change(call, async (transaction) => {
      const loaded = await loadJob(deps, organisationId, call.params.id ?? "", { transaction });
      refuseSigned(loaded.row);
      // Those taken back count: their files are kept.
      const sent = loaded.entries.filter(({ kind }) => kind === "attachment");
      if (sent.length >= limits.attachmentsPerJob) {
        const detail = `A job takes ${limits.attachmentsPerJob} attachments, those taken back included.`;
        throw problemOfFaults([{ pointer: "", code: "too_many_items", detail }]);
      }
      const content = { name: query.name, mediaType, content: bytes };
      const file = await storeFile(deps, transaction, organisationId, content);
      const document = {
        file: file.id,
        name: query.name,
        mediaType,
        bytes: bytes.length,
        sha256: file.sha256,
        caption: query.caption ?? null,
      };
      return appendEntries(deps, transaction, loaded, [{ kind: "attachment", document }], byOf(call));
    });
  },
});

const readAttachment = defineOperation({
  operationId: "readAttachment",
  method: "get",
  path: "/v1/jobs/{id}/files/{file}",
  tag,
  summary: "Read a file of a job",
  description: "An attachment, or a file that readings came from, as it was sent.",
  params: { file: z.uuid() },
  response: {
    status: 200,
    description: "The file.",
    files: [
      ...attachmentTypes,
      "text/csv",
      "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet",
    ],
  },
  errors: [],
  handle: async (call) => {
    const organisationId = callerOf(call).organisation.id;
    const { entries } = await loadJob(call.deps, organisationId, call.params.id ?? "");
    const id = call.params.file ?? "";
    const isOfJob = entries.some(({ kind, document }) => {
      if (kind === "attachment") return (document as { file: string }).file === id;
      return kind === "reading" && (document as { sourceFile: { id: string } | null }).sourceFile?.id === id;
    });
    if (!isOfJob) throw new HttpProblem("not_found", "The job has no file with this id.");
    const { file, content } = await readStoredFile(call.deps, organisationId, id);
    return reply(200, content, {
      "Content-Type": file.mediaType,
      // Never shown inside the service's own origin: a file is somebody else's content.
      "Content-Disposition": `attachment; filename*=UTF-8''${encodeURIComponent(file.name)}`,
      "Content-Security-Policy": "sandbox; default-src 'none'",
      ETag: `"${file.sha256}"`,
    });
  },
});

export const jobAttachmentOperations = [addAttachment, readAttachment];
