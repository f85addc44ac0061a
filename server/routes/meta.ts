import { readFileSync } from "node:fs";
import { z } from "zod";
import { cautions } from "../../shared/cautions.ts";
import { problemCodes, problemKinds, type ProblemCode } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import { metaSchema } from "../../shared/schemas/meta.ts";
import { problemKindSchema, problemListSchema } from "../../shared/schemas/problem.ts";
import { furtherUnitChoices, unitChoices } from "../../shared/units.ts";
import { engineVersion } from "../compute/version.ts";
import { apiVersion } from "../http/api-version.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { defineOperation, reply } from "../http/operation.ts";
import { problemPage } from "../http/problem-page.ts";

/** Shipped with the engine; read once. */
const engineChangelog = readFileSync(new URL("../compute/CHANGELOG.md", import.meta.url), "utf8");

const readMeta = defineOperation({
  operationId: "readMeta",
  method: "get",
  path: "/v1/meta",
  tag: "Service",
  summary: "Read what the service is",
  description: "Versions, limits, units and the cautions that every reader of an answer must see.",
  response: { status: 200, description: "What it is.", schema: metaSchema },
  errors: [],
  handle: ({ deps }) => {
    const selfTest = deps.selfTest.last;
    const units = { ...unitChoices, ...furtherUnitChoices };
    return reply(200, {
      service: "Borewright",
      apiVersion,
      engineVersion,
      engineChangelog,
      selfTest,
      limits,
      units,
      cautions,
    });
  },
});

const listProblems = defineOperation({
  operationId: "listProblems",
  method: "get",
  path: "/v1/problems",
  tag: "Service",
  summary: "List the codes of problems",
  description: "Every code the service can answer with, and what to do about it.",
  response: { status: 200, description: "The codes.", schema: problemListSchema },
  errors: [],
  handle: () => reply(200, { data: problemCodes.map(kindOf) }),
});

const readProblem = defineOperation({
  operationId: "readProblem",
  method: "get",
  path: "/v1/problems/{code}",
  tag: "Service",
  summary: "Read what a code means",
  description: "Where the `type` of a problem leads: a page in a browser, JSON to a program.",
  params: {
    code: z
      .string()
      .regex(/^[a-z_]{1,63}$/)
      .meta({ example: "points_collinear" }),
  },
  response: { status: 200, description: "What the code means.", schema: problemKindSchema },
  errors: ["not_found"],
  handle: ({ params, request }) => {
    const code = problemCodes.find((known) => known === params.code);
    if (!code) throw new HttpProblem("not_found", "There is no such code.");
    const html = request.accepts(["application/json", "text/html"]) === "text/html";
    return html
      ? reply(200, problemPage(kindOf(code)), { "Content-Type": "text/html; charset=utf-8", Vary: "Accept" })
      : reply(200, kindOf(code), { Vary: "Accept" });
  },
});

function kindOf(code: ProblemCode) {
  return { code, ...problemKinds[code] };
}

export const metaOperations = [readMeta, listProblems, readProblem];
