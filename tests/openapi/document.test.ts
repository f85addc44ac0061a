import { readFileSync } from "node:fs";
import { execFile } from "node:child_process";
import { promisify } from "node:util";
import { Ajv2020 } from "ajv/dist/2020.js";
import addFormats from "ajv-formats";
import { describe, expect, it } from "vitest";
import { buildDocument } from "../../openapi/build-document.ts";
import { operationAccess, type Access, type OperationId } from "../../shared/access.ts";
import { problemKinds, type ProblemCode } from "../../shared/error-codes.ts";
import { operations } from "../../server/routes/index.ts";

interface Example {
  summary: string;
  value: unknown;
}
interface Media {
  schema?: object;
  examples?: Record<string, Example | { $ref: string }>;
}
interface Answer {
  description: string;
  content?: Record<string, Media>;
}
interface PathOperation {
  operationId: string;
  summary: string;
  description: string;
  tags: string[];
  security: object[];
  requestBody?: { content: Record<string, Media> };
  responses: Record<string, Answer>;
}
interface Document {
  openapi: string;
  paths: Record<string, Record<string, PathOperation>>;
  components: {
    schemas: Record<string, object>;
    examples: Record<string, Example>;
    responses: Record<string, Answer>;
  };
}

const file = new URL("../../openapi/openapi.json", import.meta.url);
const text = readFileSync(file, "utf8");
const document = JSON.parse(text) as Document;
const described = Object.entries(document.paths).flatMap(([path, item]) =>
  Object.entries(item).map(([method, operation]) => ({
    path,
    method,
    ...operation,
    responses: Object.fromEntries(
      Object.entries(operation.responses).map(([status, answer]) => [status, resolvedAnswer(answer)]),
    ),
  })),
);

/** A response as it stands, or the component that it refers to. */
function resolvedAnswer(answer: Answer | { $ref: string }): Answer {
  if (!("$ref" in answer)) return answer;
  const found = document.components.responses[answer.$ref.replace("#/components/responses/", "")];
  if (!found) throw new Error(`${answer.$ref} refers to nothing.`);
  return found;
}

/** An example as it stands, or the component that it refers to. */
function resolved(example: Example | { $ref: string }): Example {
  if (!("$ref" in example)) return example;
  const found = document.components.examples[example.$ref.replace("#/components/examples/", "")];
  if (!found) throw new Error(`${example.$ref} refers to nothing.`);
  return found;
}

describe("the OpenAPI document", () => {
  it("stands in openapi/openapi.json as it is served: run `npm run openapi` after a change", () => {
    expect(JSON.parse(JSON.stringify(buildDocument(operations)))).toEqual(document);
  });

  it("describes every routed operation and nothing else", () => {
    const routed = operations.map(({ method, path, operationId }) => `${method} ${path} ${operationId}`);
    expect(
      described.map(({ method, path, operationId }) => `${method} ${path} ${operationId}`).sort(),
    ).toEqual(routed.sort());
  });

  it("stays small enough for a browser to render", () => {
    expect(Buffer.byteLength(JSON.stringify(document))).toBeLessThan(1_000_000);
  });

  it("passes a public linter", async () => {
    const bin = new URL("../../node_modules/@redocly/cli/bin/cli.js", import.meta.url).pathname;
    const config = new URL("../../.config/redocly.yaml", import.meta.url).pathname;
    const run = promisify(execFile)(
      process.execPath,
      [bin, "lint", file.pathname, "--config", config, "--format", "json"],
      {
        env: { ...process.env, REDOCLY_TELEMETRY: "off", REDOCLY_SUPPRESS_UPDATE_NOTICE: "true" },
        maxBuffer: 10 * 1024 * 1024,
      },
    );
    const { stdout } = await run.catch((error: { stdout: string }) => error);
    const report = JSON.parse(stdout.slice(stdout.indexOf("{"))) as {
      totals: { errors: number; warnings: number };
      problems: { ruleId: string; message: string }[];
    };
    expect(report.problems.map(({ ruleId, message }) => `${ruleId}: ${message}`)).toEqual([]);
  }, 60_000);

  describe.each(described.map((operation) => [operation.operationId, operation] as const))(
    "%s",
    (id, operation) => {
      const access: Access = operationAccess[id as OperationId];

      it("has summary, description, tag, and security exactly where its access asks for a credential", () => {
        expect(operation.summary.length).toBeGreaterThan(3);
        expect(operation.description.length).toBeGreaterThan(10);
        expect(operation.tags).toHaveLength(1);
        expect(operation.security.length > 0).toBe(access.by !== "anyone");
      });

      it("has an example of its request", () => {
        const body = operation.requestBody?.content["application/json"];
        if (body) expect(Object.keys(body.examples ?? {}).length).toBeGreaterThan(0);
        else if (operation.requestBody) expect(Object.keys(operation.requestBody.content)).not.toEqual([]);
      });

      it("has an example of each of its problems, true to the catalogue", () => {
        for (const [status, { content }] of Object.entries(operation.responses)) {
          if (status === "default" || Number(status) < 400) continue;
          const examples = Object.entries(content?.["application/problem+json"]?.examples ?? {}).map(
            ([code, example]) => [code, resolved(example)] as const,
          );
          expect(examples.length).toBeGreaterThan(0);
          for (const [code, { value }] of examples) {
            expect(value).toMatchObject({
              code,
              status: Number(status),
              title: problemKinds[code as ProblemCode].title,
            });
          }
        }
      });

      it("has examples that fit their schemas", () => {
        const media = [
          operation.requestBody?.content ?? {},
          ...Object.values(operation.responses).map(({ content }) => content ?? {}),
        ].flatMap((content) => Object.values(content));
        for (const { schema, examples = {} } of media) {
          if (!schema) continue;
          const validate = compile(schema);
          for (const [name, example] of Object.entries(examples)) {
            const { value } = resolved(example);
            expect(validate(value), `${name}: ${JSON.stringify(validate.errors)}`).toBe(true);
          }
        }
      });
    },
  );

  it("has an example of every successful answer of the computing operations", () => {
    for (const { operationId, responses } of described.filter(({ tags }) => tags[0] === "Calculations")) {
      const examples = responses["201"]?.content?.["application/json"]?.examples ?? {};
      expect(Object.keys(examples).length, operationId).toBeGreaterThan(0);
    }
  });
});

/** The schemas of the document refer to its components; they are validated with those at hand. */
function compile(schema: object) {
  const ajv = new Ajv2020({ strict: false, allErrors: true });
  const { default: add } = addFormats as unknown as { default: (to: Ajv2020) => void };
  add(ajv);
  ajv.addSchema({ $id: "document", components: document.components }, "document");
  return ajv.compile(
    JSON.parse(JSON.stringify(schema).replaceAll("#/components/", "document#/components/")) as object,
  );
}
