import { createHash } from "node:crypto";
import { jobFigures } from "../../shared/figures/job/job-figures.ts";
import { figureId, jobFigureList } from "../../shared/schemas/job-figures.ts";
import { revisionQuery } from "../../shared/schemas/jobs.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply, type Call } from "../http/operation.ts";
import { writeJobFigure } from "../reports/svg/figure-sheet.ts";
import { readForReport } from "../services/make-report.ts";

const tag = "Jobs";
const mediaType = "image/svg+xml";

const listJobFigures = defineOperation({
  operationId: "listJobFigures",
  method: "get",
  path: "/v1/jobs/{id}/figures",
  tag,
  summary: "List a job's figures",
  description:
    "Plan and elevation and the end view, as found and as left together, and a section of every bore of every survey that was read on its wall.",
  query: revisionQuery,
  response: { status: 200, description: "Every figure.", schema: jobFigureList },
  errors: [],
  handle: async (call) => {
    const { record } = await read(call);
    const { revision } = call.query;
    const query = revision === undefined ? "" : `?revision=${revision}`;
    return reply(200, {
      data: jobFigures(record).map(({ id, title, survey, station }) => ({
        id,
        title,
        survey,
        station,
        href: `/v1/jobs/${record.id}/figures/${id}.svg${query}`,
      })),
    });
  },
});

const readJobFigure = defineOperation({
  operationId: "readJobFigure",
  method: "get",
  path: "/v1/jobs/{id}/figures/{figure}.svg",
  tag,
  summary: "Read a job's figure",
  description:
    "As SVG at true size in millimetres, with its text alternative, the job's flags and the hash of the record; the same record gives the same bytes.",
  params: { figure: figureId },
  query: revisionQuery,
  response: { status: 200, description: "The figure.", files: [mediaType] },
  errors: [],
  handle: async (call) => {
    const { record, context } = await read(call);
    const figure = jobFigures(record).find(({ id }) => id === call.params.figure);
    if (!figure) throw new HttpProblem("not_found", "The job has no figure with this id.");
    const bytes = Buffer.from(writeJobFigure(figure, record, context), "utf8");
    return reply(200, bytes, {
      "Content-Type": mediaType,
      "Content-Disposition": `inline; filename="${figure.id}.svg"`,
      ETag: `"${createHash("sha256").update(bytes).digest("hex")}"`,
      Vary: "Authorization",
      "Cache-Control": "private, no-cache",
    });
  },
});

function read(call: Pick<Call, "deps" | "caller" | "params"> & { query: { revision?: string | undefined } }) {
  const { revision } = call.query;
  return readForReport(call.deps, callerOf(call).organisation.id, {
    id: call.params.id ?? "",
    ...(revision === undefined ? {} : { revision: Number(revision) }),
  });
}

export const jobFigureOperations = [listJobFigures, readJobFigure];
