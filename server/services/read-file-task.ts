import { readFile, unread, type ReadFile, type ReadingFile } from "../jobs/reading-files/read-file.ts";
import { readMachineWorkbook, type ReadMachine } from "../machines/workbook/read-machine-workbook.ts";
import { UnreadableWorkbook } from "../spreadsheets/unpack.ts";

/** A file as a thread is asked to read it. */
export type FileTask =
  | { readonly holds: "readings"; readonly file: ReadingFile }
  | { readonly holds: "machine"; readonly content: Uint8Array };

/** Why a file could not be read at all: an error's class does not come out of a thread. */
export interface Unreadable {
  readonly unreadable: { readonly code: "file_not_as_stated" | "call_too_large"; readonly detail: string };
}

/** What was read of a file, here and now. */
export async function readFileTask(task: FileTask): Promise<ReadFile | ReadMachine | Unreadable> {
  if (task.holds === "readings") return readFile(task.file);
  try {
    return await readMachineWorkbook(task.content);
  } catch (error) {
    if (!(error instanceof UnreadableWorkbook)) throw error;
    return { unreadable: { code: error.code, detail: error.detail } };
  }
}

/** What is answered of a file that takes longer to read than it may. */
export function tooSlow(task: FileTask, limitMs: number): ReadFile | Unreadable {
  const code = "call_too_large" as const;
  const detail = `The file takes more than ${limitMs / 1000} s to read: send less in one file.`;
  return task.holds === "readings"
    ? unread({ line: 1, column: null, code, detail })
    : { unreadable: { code, detail } };
}
