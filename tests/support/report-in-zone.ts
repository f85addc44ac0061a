/** Writes sha256 of every form of the demo's report: run in a process of its own, under another clock's zone. */
import { createHash } from "node:crypto";
import { reportFormats } from "../../server/reports/index.ts";
import { fellgateReport } from "./job-record.ts";

const { record, context } = fellgateReport({ signed: true });
for (const { extension, write } of reportFormats) {
  const bytes = await write(record, context);
  process.stdout.write(`${extension} ${createHash("sha256").update(bytes).digest("hex")}\n`);
}
