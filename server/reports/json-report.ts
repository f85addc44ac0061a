import canonicalize from "canonicalize";
import type { ReportFormat } from "./report-format.ts";

/** The record itself, in RFC 8785 form, so that its bytes can be compared: without the job's version, which goes on. */
export const jsonReport: ReportFormat = {
  extension: "json",
  mediaType: "application/json",
  write: ({ version: _goesOn, ...record }, context) =>
    Buffer.from(`${canonicalize({ ...context, record }) ?? ""}\n`, "utf8"),
};
