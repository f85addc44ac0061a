import { inflateSync } from "node:zlib";

const headerBytes = 44;
const entryBytes = 20;

/**
 * A WOFF file as the OpenType font inside it: W3C "WOFF File Format 1.0", sections 3 to 5. The library that subsets fonts
 * reads past the end of a compressed table, and cannot subset letters with accents of WOFF2; of a plain font it can.
 * @throws RangeError where the file is no WOFF
 */
export function unpackWoff(file: Buffer): Buffer {
  if (file.toString("latin1", 0, 4) !== "wOFF") throw new RangeError("The file is not a WOFF font.");
  const count = file.readUInt16BE(12);
  const tables = Array.from({ length: count }, (_, index) => {
    const entry = headerBytes + index * entryBytes;
    const [offset, packed, plain, checksum] = [4, 8, 12, 16].map((at) => file.readUInt32BE(entry + at)) as [
      number,
      number,
      number,
      number,
    ];
    const bytes = file.subarray(offset, offset + packed);
    return {
      tag: file.subarray(entry, entry + 4),
      checksum,
      bytes: packed < plain ? inflateSync(bytes) : bytes,
    };
  });
  const font = Buffer.alloc(
    12 + count * 16 + tables.reduce((total, { bytes }) => total + padded(bytes.length), 0),
  );
  file.copy(font, 0, 4, 8);
  font.writeUInt16BE(count, 4);
  const power = Math.floor(Math.log2(count));
  font.writeUInt16BE(2 ** power * 16, 6);
  font.writeUInt16BE(power, 8);
  font.writeUInt16BE(count * 16 - 2 ** power * 16, 10);
  let offset = 12 + count * 16;
  tables.forEach(({ tag, checksum, bytes }, index) => {
    const entry = 12 + index * 16;
    tag.copy(font, entry);
    font.writeUInt32BE(checksum, entry + 4);
    font.writeUInt32BE(offset, entry + 8);
    font.writeUInt32BE(bytes.length, entry + 12);
    bytes.copy(font, offset);
    offset += padded(bytes.length);
  });
  return font;
}

const padded = (length: number): number => Math.ceil(length / 4) * 4;
