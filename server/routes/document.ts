import { z } from "zod";
import { buildDocument } from "../../openapi/build-document.ts";
import { defineOperation, reply, type Operation } from "../http/operation.ts";

/** The operation that serves the document of all operations, itself among them: hence the list comes as a function. */
export function documentOperation(operations: () => readonly Operation[]): Operation {
  let document: string | undefined;
  return defineOperation({
    operationId: "readDocument",
    method: "get",
    path: "/openapi.json",
    tag: "Service",
    summary: "Read this document",
    description: "OpenAPI 3.1, made from the same literals that route the calls.",
    response: { status: 200, description: "OpenAPI 3.1.", schema: z.string(), mediaType: "application/json" },
    errors: [],
    handle: () => {
      document ??= JSON.stringify(buildDocument(operations()));
      return reply(200, document, {
        "Content-Type": "application/json",
        "Cache-Control": "public, max-age=300",
      });
    },
  });
}
