import { Unzip, UnzipInflate, unzipSync, strFromU8 } from "fflate";

/** A workbook that cannot be opened: no zip, no workbook in it, or larger than what is taken. */
export class UnreadableWorkbook extends Error {
  constructor(
    readonly code: "file_not_as_stated" | "call_too_large",
    readonly detail: string,
  ) {
    super(`${code}: ${detail}`);
    this.name = "UnreadableWorkbook";
  }
}

/** What a workbook may take once unpacked: parts of XML, and bytes in all of them together. */
export const unpackLimits = { parts: 500, bytes: 50 * 1024 * 1024 } as const;

/** So many packed bytes at a time: each brings at most about a thousand times as many. */
const pieceBytes = 8 * 1024;

/**
 * The XML parts of a workbook. What the zip's directory states is checked before anything is unpacked, and what comes
 * out is counted while it does, since a directory can lie.
 * @throws UnreadableWorkbook
 */
export function unpackWorkbook(bytes: Uint8Array): Map<string, string> {
  const stated = statedSizes(bytes);
  const parts = new Map<string, Uint8Array[]>();
  let left: number = unpackLimits.bytes;
  const unzip = new Unzip((file) => {
    if (!stated.has(file.name)) return;
    if (parts.has(file.name)) throw notAWorkbook("A part stands in it twice.");
    const chunks: Uint8Array[] = [];
    parts.set(file.name, chunks);
    file.ondata = (error, chunk) => {
      if (error) throw notAWorkbook("It cannot be unpacked.");
      left -= chunk.length;
      if (left < 0) throw tooLarge();
      chunks.push(chunk);
    };
    file.start();
  });
  unzip.register(UnzipInflate);
  for (let at = 0; at < bytes.length; at += pieceBytes) {
    const piece = bytes.subarray(at, at + pieceBytes);
    unpacking(() => unzip.push(piece, at + pieceBytes >= bytes.length));
  }
  return new Map(
    [...stated].map(([name, size]) => {
      const content = Buffer.concat(parts.get(name) ?? []);
      if (content.length !== size) throw notAWorkbook("It is not what its own directory says.");
      return [name, textOf(content)];
    }),
  );
}

/** Names and sizes of the XML parts, as the zip's directory has them. Links to other files are no part of the sheets. */
function statedSizes(bytes: Uint8Array): Map<string, number> {
  const sizes = new Map<string, number>();
  unpacking(() =>
    unzipSync(bytes, {
      filter: ({ name, originalSize }) => {
        if (/\.(xml|rels)$/.test(name) && !name.startsWith("xl/externalLinks/")) {
          if (sizes.has(name)) throw notAWorkbook("A part stands in it twice.");
          sizes.set(name, originalSize);
        }
        return false;
      },
    }),
  );
  const bytesInAll = [...sizes.values()].reduce((sum, size) => sum + size, 0);
  if (sizes.size > unpackLimits.parts || bytesInAll > unpackLimits.bytes) throw tooLarge();
  if (!sizes.has("xl/workbook.xml")) throw notAWorkbook("It holds no workbook.");
  return sizes;
}

function textOf(content: Uint8Array): string {
  const text = strFromU8(content);
  if (/<!(DOCTYPE|ENTITY)/i.test(text)) throw notAWorkbook("Its XML declares entities.");
  return text;
}

function unpacking(work: () => unknown): void {
  try {
    work();
  } catch (error) {
    if (error instanceof UnreadableWorkbook) throw error;
    throw notAWorkbook("It cannot be unpacked.");
  }
}

const notAWorkbook = (why: string) =>
  new UnreadableWorkbook("file_not_as_stated", `This is no XLSX workbook that can be read. ${why}`);
const tooLarge = () =>
  new UnreadableWorkbook(
    "call_too_large",
    `A workbook holds at most ${unpackLimits.bytes} bytes in ${unpackLimits.parts} parts once unpacked.`,
  );
