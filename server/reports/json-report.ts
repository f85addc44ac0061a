import canonicalize from "canonicalize";
import type { ReportFormat } from "./report-format.ts";

/** The record itself, in RFC 8785 form, so that its bytes can be compared. */
export const jsonReport: ReportFormat = {
  extension: "json",
  mediaType: "application/json",
  write: (record, context) => Buffer.from(`${canonicalize({ ...context, record }) ?? ""}\n`, "utf8"),
};
