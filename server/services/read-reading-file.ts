import { createHash } from "node:crypto";
import { limits } from "../../shared/limits.ts";
import type { ReadingPreview } from "../../shared/schemas/reading-files.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { ReadFile, ReadingMediaType } from "../jobs/reading-files/read-file.ts";
import { readingColumns, type ReadingColumn } from "../jobs/reading-files/reading-columns.ts";
import type { TableFault } from "../jobs/reading-files/table.ts";
import { checkedReadings } from "./check-readings.ts";
import type { LoadedJob } from "./job-store.ts";

interface Sent {
  readonly name: string;
  readonly mediaType: ReadingMediaType;
  readonly columns?: string | undefined;
  readonly ignore?: string | undefined;
  readonly content: Buffer;
}

/**
 * Reads a file of readings as far as it can be read: what each column is taken for, the readings, and every fault with
 * its line, those that the engine finds among them. Nothing is stored.
 */
export async function previewReadings(
  deps: Deps,
  loaded: LoadedJob,
  surveyId: string,
  { name, mediaType, columns = "", ignore = "", content }: Sent,
): Promise<ReadingPreview> {
  const sha256 = createHash("sha256").update(content).digest("hex");
  const read = await deps.compute.readings({
    mediaType,
    content,
    names: namesOf(columns),
    ignored: listOf(ignore),
    units: loaded.machine.units,
  });
  const { lines: _lines, readings, faults, ...rest } = read;
  return {
    file: { name, bytes: content.length, sha256 },
    ...rest,
    readings: [...readings],
    faults: faults.length > 0 ? firstOf(faults) : await engineFaults(deps, loaded, surveyId, read),
  };
}

/** As many as a person looks through, and how many more there are. */
function firstOf(faults: readonly TableFault[]): TableFault[] {
  const listed = faults.slice(0, limits.faultsPerPreview);
  const more = faults.length - listed.length;
  if (more === 0) return listed;
  const detail = `${more} more faults are not listed: mend these, then look again.`;
  return [...listed, { line: listed.at(-1)?.line ?? 1, column: null, code: "too_many_items", detail }];
}

/** What the engine says of readings that can be read, at the line on which each begins. */
async function engineFaults(
  deps: Deps,
  loaded: LoadedJob,
  surveyId: string,
  { readings, lines }: Pick<ReadFile, "readings" | "lines">,
): Promise<TableFault[]> {
  if (readings.length > limits.readingsPerPost) {
    const detail = `A file holds at most ${limits.readingsPerPost} readings.`;
    return [{ line: 1, column: null, code: "too_many_items", detail }];
  }
  try {
    await checkedReadings(deps, loaded, surveyId, readings, null);
    return [];
  } catch (error) {
    if (!(error instanceof HttpProblem) || error.status !== 422) throw error;
    return (error.members.errors ?? []).map((fault) => {
      const pointer = "pointer" in fault ? fault.pointer : "";
      const [, , index = "", member = null] = pointer?.split("/") ?? [];
      return { line: lines[Number(index)] ?? 1, column: member, code: fault.code, detail: fault.detail };
    });
  }
}

const listOf = (text: string): string[] =>
  text
    .split(",")
    .map((part) => part.trim())
    .filter((part) => part !== "");

/** @throws HttpProblem invalid_parameter for a name that no column has */
function namesOf(columns: string): Map<string, ReadingColumn> {
  return new Map(
    listOf(columns).map((pair) => {
      const [ours = "", theirs = ""] = pair.split(/=(.*)/s).map((part) => part.trim());
      if (ours in readingColumns && theirs !== "") return [theirs, ours as ReadingColumn];
      const detail = `"${pair.slice(0, limits.echoedTextLength)}" is not of the form column=head; columns: ${Object.keys(readingColumns).join(", ")}.`;
      throw new HttpProblem("invalid_parameter", detail, {
        errors: [{ parameter: "columns", code: "invalid_parameter", detail }],
      });
    }),
  );
}
